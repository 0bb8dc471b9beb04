import { median } from '../../../src/numeric/summary.ts';
import { BARE, fitName } from './plan.ts';
import type { Timing } from './timing.ts';

const WIDTHS = [35, 9, 9, 8, 6, 25] as const;
const HEADER = ['command', 'median s', 'least s', 'x bare', 'MiB', 'bar'];

/**
 * How long each command took beside what it is asked to reach.
 *
 * @param timings - `node -e 0` among them
 * @returns lines of a table: medians and the least of the runs, as a multiple of `node -e 0`, memory, and whether
 *   the median passes
 */
export function speedTable(timings: readonly Timing[]): string[] {
  const medianOf = (name: string) => {
    const found = timings.find(({ job }) => job.name === name);
    return found === undefined ? Infinity : median(found.seconds);
  };
  const bare = medianOf(BARE.name);
  const tenth = medianOf(fitName(10_000));
  return [
    line(HEADER),
    ...timings.map((timing) => {
      const seconds = median(timing.seconds);
      return line([
        timing.job.name,
        seconds.toFixed(seconds < 1 ? 3 : 2),
        Math.min(...timing.seconds).toFixed(seconds < 1 ? 3 : 2),
        (seconds / bare).toFixed(2),
        timing.mebibytes.toFixed(0),
        verdict(timing, seconds, bare, tenth),
      ]);
    }),
  ];
}

function verdict(
  { job: { bar }, mebibytes }: Timing,
  seconds: number,
  bare: number,
  tenth: number,
): string {
  if (bar === undefined) return '';
  const passes = seconds <= bar.seconds(bare, tenth) && mebibytes <= (bar.mebibytes ?? Infinity);
  return `${passes ? 'pass' : 'SHORT'}: ${bar.text}`;
}

function line(cells: readonly string[]): string {
  const last = cells.length - 1;
  return cells
    .map((cell, i) => (i === 0 || i === last ? cell.padEnd(WIDTHS[i]) : cell.padStart(WIDTHS[i])))
    .join('  ')
    .trimEnd();
}
