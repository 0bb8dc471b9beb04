/**
 * Prints how near the model comes to the best that can be learnt from the same tiles. Arguments, all optional:
 * `--sizes 40,100,300,1000,3000`, `--studios 10` a size, `--seed 4001`, `--sweeps 3000`, `--families ...` as for
 * `bench:studios`.
 */
import { parseArgs } from 'node:util';
import { mean } from '../../../src/numeric/summary.ts';
import { DEVELOPMENT_FAMILIES } from '../studios/families.ts';
import { divergence } from '../studios/measures.ts';
import { drawStudio } from '../studios/studio.ts';
import { trial, truthsOf } from '../studios/trial.ts';
import { bestAnswers } from './best-learner.ts';

const { values } = parseArgs({
  options: {
    sizes: { type: 'string', default: '40,100,300,1000,3000' },
    studios: { type: 'string', default: '10' },
    seed: { type: 'string', default: '4001' },
    sweeps: { type: 'string', default: '3000' },
    families: { type: 'string', default: DEVELOPMENT_FAMILIES.join(',') },
  },
});

const families = values.families.split(',');
const sweeps = Number(values.sweeps);
const length = { learning: Math.round(sweeps / 3), sweeps, every: 10 };
process.stdout.write(
  'tiles  studios  start   model   best    best/start  model/start  model/best  between two chains\n',
);
for (const size of values.sizes.split(',').map(Number)) {
  const rows = Array.from({ length: Number(values.studios) }, (_, i) => {
    const seed = Number(values.seed) + i;
    const asked = { family: families[seed % families.length], seed, size };
    const studio = drawStudio(asked);
    const truths = truthsOf(studio, seed);
    const chains = [1, 2].map((chain) => bestAnswers(asked, studio, chain, length).probability);
    const both = chains[0].map((one, k) => averaged(one, chains[1][k]));
    const { learners } = trial(asked, ['start', 'current']);
    const row = {
      start: learners[0].excess,
      model: learners[1].excess,
      best: mean(truths.map((truth, k) => divergence(truth, both[k]))),
      between: mean(chains[0].map((one, k) => divergence(one, chains[1][k]))),
    };
    process.stderr.write(`${asked.family} ${seed} ${JSON.stringify(row)}\n`);
    return row;
  });
  const of = (key: keyof (typeof rows)[number]) => mean(rows.map((row) => row[key]));
  const cells = [
    String(size).padStart(5),
    String(rows.length).padStart(7),
    ...(['start', 'model', 'best'] as const).map((key) => of(key).toFixed(4)),
    (of('best') / of('start')).toFixed(2).padStart(10),
    (of('model') / of('start')).toFixed(2).padStart(11),
    (of('model') / of('best')).toFixed(2).padStart(10),
    of('between').toFixed(4).padStart(18),
  ];
  process.stdout.write(`${cells.join('  ')}\n`);
}

function averaged<T extends Readonly<Record<'underfired' | 'matte' | 'gloss', number>>>(
  a: T,
  b: T,
) {
  return {
    underfired: (a.underfired + b.underfired) / 2,
    matte: (a.matte + b.matte) / 2,
    gloss: (a.gloss + b.gloss) / 2,
  };
}
