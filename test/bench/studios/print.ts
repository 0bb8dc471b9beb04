/**
 * Prints how learners do on invented studios. Arguments, all optional:
 * `--sizes 40,100,300,1000`, `--studios 12` a size, `--seed 1` of the first, `--families curved,planes`
 * (`development`, the default, is all but the one held back; `all` is all), `--learners start,current` (ratios are
 * to the first), `--wrong 0.05` instead of a share drawn from 0 to 5 %, `--workers 2`, `--json FILE` for
 * the trials, `--exchange DIR` to take part in the comparison with peers (see `exchange.ts`).
 */
import { writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { peerTrial, writeStudio } from './exchange.ts';
import { DEVELOPMENT_FAMILIES, FAMILIES } from './families.ts';
import { isWorker, runJobs, serveJobs } from './jobs.ts';
import { sizeTable } from './table.ts';
import type { StudioAsked } from './studio.ts';
import type { Trial } from './trial.ts';

if (isWorker()) serveJobs();
else await main();

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      sizes: { type: 'string', default: '40,100,300,1000' },
      studios: { type: 'string', default: '12' },
      seed: { type: 'string', default: '1' },
      families: { type: 'string', default: 'development' },
      learners: { type: 'string', default: 'start,current' },
      wrong: { type: 'string' },
      workers: { type: 'string', default: '2' },
      json: { type: 'string' },
      exchange: { type: 'string' },
      'write-only': { type: 'boolean', default: false },
    },
  });
  const families = familiesAsked(values.families);
  const learners = values.learners.split(',');
  const wrongShare = values.wrong === undefined ? undefined : Number(values.wrong);
  const all: Trial[] = [];
  for (const size of values.sizes.split(',').map(Number)) {
    const asked = Array.from({ length: Number(values.studios) }, (_, i): StudioAsked => {
      const seed = Number(values.seed) + i;
      const family = families[seed % families.length];
      return { family, seed, size, ...(wrongShare === undefined ? {} : { wrongShare }) };
    });
    if (values['write-only']) {
      for (const one of asked) writeStudio(values.exchange!, one);
      continue;
    }
    const trials = await trialsOf(asked, learners, Number(values.workers), values.exchange);
    all.push(...trials);
    process.stdout.write(`${sizeTable(trials).join('\n')}\n\n`);
    if (values.json !== undefined) writeFileSync(values.json, JSON.stringify(all));
  }
}

async function trialsOf(
  asked: readonly StudioAsked[],
  learners: readonly string[],
  workers: number,
  exchange: string | undefined,
): Promise<Trial[]> {
  const trials: Trial[] = [];
  const jobs = asked.map((one) => ({ asked: one, learners }));
  await runJobs(jobs, workers, (done) => {
    trials.push(exchange === undefined ? done : peerTrial(exchange, done));
    process.stderr.write(`${done.size} tiles: ${trials.length} of ${asked.length}\n`);
  });
  return trials.sort((a, b) => a.seed - b.seed);
}

function familiesAsked(text: string): readonly string[] {
  if (text === 'development') return DEVELOPMENT_FAMILIES;
  const names = text === 'all' ? Object.keys(FAMILIES) : text.split(',');
  const unknown = names.filter((name) => !Object.hasOwn(FAMILIES, name));
  if (unknown.length > 0) throw new RangeError(`no family ${unknown.join(', ')}`);
  return names;
}
