import type { Verdict } from './archive.ts';
import { VERDICT_OF_SURFACE } from './tile-columns.ts';

/**
 * What the fit takes a tile for.
 *
 * Semi-matte counts as matte. An unmelted drip at the dip line marks a tile as underfired whatever the
 * rest looks like, and whatever the word says.
 *
 * @param surface - the word of the `surface` column; undefined where it is blank
 * @param drip - the drip, where it was looked at
 * @returns the verdict
 * @example
 * verdictOf('semi-matte', undefined); // 'matte'
 * verdictOf('gloss', 'unmelted'); // 'underfired'
 */
export function verdictOf(
  surface: keyof typeof VERDICT_OF_SURFACE | undefined,
  drip: 'melted' | 'unmelted' | undefined,
): Verdict {
  if (drip === 'unmelted') return 'underfired';
  return surface === undefined ? 'unjudged' : VERDICT_OF_SURFACE[surface];
}
