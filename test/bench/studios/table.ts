import { mean, median, sampleSd } from '../../../src/numeric/summary.ts';
import { ASKED_CONES, SURFACES } from './learner.ts';
import type { Held } from './measures.ts';
import type { LearnerTrial, Trial } from './trial.ts';

/**
 * The trials of one size in words: a row a learner, then its coverage by family, cone and surface.
 *
 * Ratios are those of each studio's excess to the first learner's, median and mean; `sums` is the ratio
 * of the mean excesses. `+-` is a standard error over studios.
 *
 * @param trials - of one size, at least one
 * @returns lines of text
 */
export function sizeTable(trials: readonly Trial[]): string[] {
  const [{ size }] = trials;
  const names = [...new Set(trials.flatMap(({ learners }) => learners.map((l) => l.learner)))];
  const first = ofLearner(trials, names[0]);
  const rows = names.map((name) => mainRow(name, ofLearner(trials, name), first));
  const held = names.flatMap((name) => heldRows(name, ofLearner(trials, name)));
  return [
    `${size} tiles, ${trials.length} studios`,
    '  learner    excess  +-     ratio: median mean  sums   held  +-    score  place  fit ms  ask ms',
    ...rows,
    ...(held.length > 0 ? ['  held, %:', ...held] : []),
  ];
}

interface OwnTrial extends LearnerTrial {
  readonly family: string;
  readonly seed: number;
}

function ofLearner(trials: readonly Trial[], name: string): OwnTrial[] {
  return trials.flatMap(({ family, seed, learners }) =>
    learners.filter((l) => l.learner === name).map((own) => ({ ...own, family, seed })),
  );
}

function mainRow(name: string, own: readonly OwnTrial[], first: readonly OwnTrial[]): string {
  const excess = own.map((t) => t.excess);
  const bySeed = new Map(first.map((t) => [`${t.family} ${t.seed}`, t.excess]));
  const paired = own.flatMap((t) => {
    const base = bySeed.get(`${t.family} ${t.seed}`);
    return base === undefined ? [] : [t.excess / base];
  });
  const shares = own.flatMap(({ held }) =>
    held && held.cells > 0 ? [held.held / held.cells] : [],
  );
  const scores = own.flatMap(({ intervalScore }) => intervalScore ?? []);
  const places = own.flatMap(({ placeError }) => placeError ?? []);
  const sums = mean(excess) / mean(first.map((t) => t.excess));
  return [
    `  ${name.padEnd(14)}`,
    cell(excess, mean, 4, 7),
    cell(excess, standardError, 4, 7),
    cell(paired, median, 3, 11),
    cell(paired, mean, 3, 6),
    (paired.length === own.length ? sums.toFixed(3) : '-').padStart(6),
    cell(shares.map(percent), mean, 1, 6),
    cell(shares.map(percent), standardError, 1, 4),
    cell(scores, mean, 3, 7),
    cell(places, mean, 3, 6),
    cell(
      own.map((t) => t.fitMs),
      mean,
      0,
      7,
    ),
    cell(
      own.map((t) => t.predictMs),
      mean,
      0,
      7,
    ),
  ].join('');
}

/** Mean coverage over studios, by family, cone, surface and at cones without a tile. */
function heldRows(name: string, own: readonly OwnTrial[]): string[] {
  if (own.every(({ held }) => held === null)) return [];
  const families = [...new Set(own.map(({ family }) => family))].sort();
  const part = (label: string, held: readonly (Held | null)[]) => {
    const shares = held.flatMap((h) => (h && h.cells > 0 ? [percent(h.held / h.cells)] : []));
    if (shares.length === 0) return `${label} -`;
    return `${label} ${mean(shares).toFixed(1)} (${standardError(shares).toFixed(1)})`;
  };
  const line = (parts: readonly string[]) => `    ${name.padEnd(12)}${parts.join('  ')}`;
  return [
    line(
      families.map((f) =>
        part(
          f,
          own.filter((t) => t.family === f).map((t) => t.held),
        ),
      ),
    ),
    line([
      ...ASKED_CONES.map((cone, c) =>
        part(
          `cone ${cone}`,
          own.map((t) => t.heldAt[c]),
        ),
      ),
      part(
        'cones without a tile',
        own.map((t) => t.heldUnseen),
      ),
    ]),
    line(
      SURFACES.map((surface, s) =>
        part(
          surface,
          own.map((t) => t.heldOf[s]),
        ),
      ),
    ),
    line(families.map((f) => `excess ${f} ${mean(excessOf(own, f)).toFixed(4)}`)),
  ];
}

const percent = (share: number) => 100 * share;

function excessOf(own: readonly OwnTrial[], family: string): number[] {
  return own.filter((t) => t.family === family).map((t) => t.excess);
}

function standardError(values: readonly number[]): number {
  return values.length < 2 ? NaN : sampleSd(values) / Math.sqrt(values.length);
}

function cell(
  values: readonly number[],
  statistic: (values: readonly number[]) => number,
  digits: number,
  columns: number,
): string {
  const text = values.length === 0 ? '-' : statistic(values).toFixed(digits);
  return text.padStart(columns);
}
