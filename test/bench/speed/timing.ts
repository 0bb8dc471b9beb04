import { spawnSync } from 'node:child_process';
import { closeSync, openSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { MAIN, type Job } from './plan.ts';

/** How long one command took. */
export interface Timing {
  readonly job: Job;
  /** Wall time of each run. */
  readonly seconds: readonly number[];
  /** Largest resident memory of a run of its own. */
  readonly mebibytes: number;
}

/** Where commands run. */
export interface Place {
  readonly folder: string;
  /** The built program. */
  readonly main: string;
}

/** Loaded before the program: writes down how much memory it took. */
const WITNESS = `process.on('exit', () => {
  require('node:fs').writeFileSync(process.env.BENCH_MEMORY, String(process.resourceUsage().maxRSS));
});
`;

/** As many runs as fit in this time, within the bounds. */
const SECONDS_A_JOB = 10;

/**
 * Times whole commands.
 *
 * @param job - what to start
 * @param place - where
 * @param runs - least and most
 * @returns wall time of each run, and memory of one more
 * @throws {Error} if a run does not end with 0
 */
export function timed(job: Job, place: Place, runs: readonly [number, number]): Timing {
  const [least, most] = runs;
  const seconds: number[] = [];
  const spent = () => seconds.reduce((sum, one) => sum + one, 0);
  while (seconds.length < least || (seconds.length < most && spent() < SECONDS_A_JOB)) {
    seconds.push(run(job, place, {}));
  }
  return { job, seconds, mebibytes: peakMemory(job, place) };
}

function peakMemory(job: Job, place: Place): number {
  const [hook, memory] = ['witness.cjs', 'memory.txt'].map((name) => join(place.folder, name));
  writeFileSync(hook, WITNESS);
  const { href } = pathToFileURL(hook);
  run(job, place, { NODE_OPTIONS: `--import=${href}`, BENCH_MEMORY: memory });
  return Number(readFileSync(memory, 'utf8')) / 1024;
}

function run(job: Job, { folder, main }: Place, env: NodeJS.ProcessEnv): number {
  const args = job.args.map((arg) => (arg === MAIN ? main : arg));
  const out = openSync(join(folder, 'answer.txt'), 'w');
  const began = performance.now();
  const { status, stderr } = spawnSync(process.execPath, args, {
    cwd: folder,
    env: { ...process.env, ...env },
    stdio: ['ignore', out, 'pipe'],
    encoding: 'utf8',
  });
  const seconds = (performance.now() - began) / 1000;
  closeSync(out);
  if (status !== 0) throw new Error(`${job.name} ended with ${status}: ${stderr}`);
  return seconds;
}
