/**
 * Prints how long whole commands take, beside what they are asked to reach. Arguments, all optional:
 * `--sizes 40,300,3000,10000,100000` of the archives that are fitted, `--parts start,fit,ask`, `--runs 3,9`: least and most
 * runs of each command. On a machine that does other work besides, the least of the runs tells more than the median.
 */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { parseArgs } from 'node:util';
import { mapPoints, speedArchive, speedPoints } from './inputs.ts';
import { ASKED_TILES, BARE, fitJobs, HELP_JOB, QUESTION_JOBS, SIZES, type Job } from './plan.ts';
import { speedTable } from './table.ts';
import { timed, type Place, type Timing } from './timing.ts';

const { values } = parseArgs({
  options: {
    sizes: { type: 'string', default: SIZES.join(',') },
    parts: { type: 'string', default: 'start,fit,ask' },
    runs: { type: 'string', default: '3,9' },
  },
});
const sizes = values.sizes.split(',').map(Number);
const parts = values.parts.split(',');
const [least, most] = values.runs.split(',').map(Number);
const place: Place = {
  folder: mkdtempSync(join(tmpdir(), 'coneshift-speed-')),
  main: resolve('dist/cli/main.js'),
};

try {
  const timings = jobsAsked().map((job): Timing => {
    process.stderr.write(`${job.name} ...\n`);
    return timed(job, place, [least, most]);
  });
  process.stdout.write(`${speedTable(timings).join('\n')}\n`);
} finally {
  rmSync(place.folder, { recursive: true });
}

function jobsAsked(): Job[] {
  const jobs = [BARE, ...(parts.includes('start') ? [HELP_JOB] : [])];
  const fitted = parts.includes('fit') ? sizes : [];
  for (const size of new Set([...fitted, ASKED_TILES]))
    write(`tiles-${size}.csv`, speedArchive(size));
  jobs.push(...fitJobs(fitted));
  if (!parts.includes('ask')) return jobs;
  // Fitted once beforehand, where it is not among those that are timed.
  if (!fitted.includes(ASKED_TILES)) jobs.push(...fitJobs([ASKED_TILES]));
  write('points-1000.csv', speedPoints(1000));
  write('points-100000.csv', speedPoints(100_000));
  write('map-200.csv', mapPoints(200));
  return [...jobs, ...QUESTION_JOBS];
}

function write(name: string, text: string): void {
  writeFileSync(join(place.folder, name), text);
}
