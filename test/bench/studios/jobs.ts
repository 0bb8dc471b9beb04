import { fork, type ChildProcess } from 'node:child_process';
import type { StudioAsked } from './studio.ts';
import { trial, type Trial } from './trial.ts';

/** A studio and who is to learn it. */
export interface Job {
  readonly asked: StudioAsked;
  readonly learners: readonly string[];
}

const WORKER = '--worker';

/** Whether this process was started by `runJobs`. */
export function isWorker(): boolean {
  return process.argv.includes(WORKER);
}

/** Answers the jobs that the parent sends, one at a time, until it hangs up. */
export function serveJobs(): void {
  process.on('message', (job) => {
    const { asked, learners } = job as Job;
    process.send!(trial(asked, learners));
  });
  process.on('disconnect', () => {
    process.exitCode = 0;
  });
}

/**
 * Runs jobs in worker processes: this same program, started anew.
 *
 * @param jobs - in the order in which they are begun
 * @param workers - processes at a time, at least 1
 * @param onDone - called with each trial as it comes
 * @returns once all are done
 * @throws {Error} if a worker dies
 */
export async function runJobs(
  jobs: readonly Job[],
  workers: number,
  onDone: (done: Trial) => void,
): Promise<void> {
  const open = [...jobs];
  const one = () =>
    new Promise<void>((resolve, reject) => {
      const worker = fork(process.argv[1], [WORKER]);
      worker.on('message', (done) => {
        onDone(done as Trial);
        sendNext(worker, open);
      });
      worker.on('error', reject);
      worker.on('exit', (code) => {
        if (code === 0) resolve();
        else reject(new Error(`a worker ended with code ${code}`));
      });
      sendNext(worker, open);
    });
  await Promise.all(Array.from({ length: Math.min(workers, jobs.length) }, one));
}

function sendNext(worker: ChildProcess, open: Job[]): void {
  const job = open.shift();
  if (job === undefined) worker.disconnect();
  else worker.send(job);
}
