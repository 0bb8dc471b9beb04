import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { drawStudioWithTruth } from './truth.ts';

/** Seed of the committed archive. */
const SEED = 1;
const folder = process.argv[2] ?? join('datasets', 'demo-studio');

const { files, truthFiles } = drawStudioWithTruth(SEED);
mkdirSync(join(folder, 'truth'), { recursive: true });
for (const [name, text] of files) writeFileSync(join(folder, name), text);
for (const [name, text] of truthFiles) writeFileSync(join(folder, 'truth', name), text);
