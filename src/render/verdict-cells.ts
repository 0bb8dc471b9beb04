import type { VerdictCounts } from '../archive/inventory.ts';
import { grouped } from './sentences.ts';

/**
 * Headings of verdict counts, underfired first. `other` is known to have melted and no more,
 * overfired, or not judged.
 *
 * @example
 * VERDICT_HEADINGS.length; // 4
 */
export const VERDICT_HEADINGS = ['under', 'matte', 'gloss', 'other'] as const;

/**
 * A count in a table; nought is a dot, so that it does not drown the rest.
 *
 * @param count - how many
 * @returns the cell
 * @example
 * countCell(0); // '.'
 * countCell(1200); // '1,200'
 */
export function countCell(count: number): string {
  return count === 0 ? '.' : grouped(count);
}

/**
 * Verdict counts as cells under `VERDICT_HEADINGS`.
 *
 * @param tiles - counts
 * @returns four cells
 * @example
 * const none = { underfired: 0, matte: 0, gloss: 0, melted: 0, overfired: 0, unjudged: 0, all: 0 };
 * verdictCells({ ...none, gloss: 12, unjudged: 1, all: 13 }); // ['.', '.', '12', '1']
 */
export function verdictCells(tiles: VerdictCounts): string[] {
  const { underfired, matte, gloss, melted, overfired, unjudged } = tiles;
  return [underfired, matte, gloss, melted + overfired + unjudged].map(countCell);
}
