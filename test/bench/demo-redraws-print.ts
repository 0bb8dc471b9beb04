import { redraw, redrawTable } from './demo-redraws.ts';

const count = Number(process.argv[2] ?? 20);
const redraws = Array.from({ length: count }, (_, i) => redraw(i + 1));
process.stdout.write(`${redrawTable(redraws).join('\n')}\n`);
