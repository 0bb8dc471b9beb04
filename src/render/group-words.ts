import type { HeldOut } from '../model/model.ts';
import { countOf } from './sentences.ts';

/** Groups that had to share a fold: their kind, the number of the fold, how many it holds. */
const PACKED = /^(load|glaze)s (\d+) \((\d+)\)$/;

/**
 * The groups of tiles that one account left out, by name.
 *
 * @param account - of the validation
 * @returns a name for each part; where groups were put together: which lot, and of how many
 * @example
 * const parts = [{ leftOut: 'glazes 2 (8)', tiles: 24, logScore: -0.7, baseRateLogScore: -1 }];
 * groupNames({ parts }); // ['lot 2: 8 glazes']
 */
export function groupNames({ parts }: Pick<HeldOut, 'parts'>): string[] {
  const lots = parts.map(({ leftOut }) => PACKED.exec(leftOut));
  // A load may be called so by its studio: only if all are, they are lots.
  if (lots.some((lot) => lot === null)) return parts.map(({ leftOut }) => leftOut);
  return lots.map((lot) => `lot ${lot?.[2] ?? ''}: ${countOf(Number(lot?.[3]), lot?.[1] ?? '')}`);
}

/**
 * How many loads or glazes an account left out in all, where several shared a turn.
 *
 * @param account - of the validation
 * @returns their number, undefined where each had a turn of its own
 * @example
 * const part = { tiles: 24, logScore: -0.7, baseRateLogScore: -1 };
 * groupsTogether({ parts: [{ ...part, leftOut: 'glazes 1 (3)' }, { ...part, leftOut: 'glazes 2 (8)' }] }); // 11
 */
export function groupsTogether({ parts }: Pick<HeldOut, 'parts'>): number | undefined {
  const counts = parts.map(({ leftOut }) => Number(PACKED.exec(leftOut)?.[3] ?? Number.NaN));
  const sum = counts.reduce((total, count) => total + count, 0);
  return counts.length === 0 || Number.isNaN(sum) ? undefined : sum;
}
