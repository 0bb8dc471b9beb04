import type { Tile } from './archive.ts';
import { parseDecimal } from './decimal-mark.ts';

/** The column of firings.csv that a file of tiles alone may have as well. */
const PEAK_COLUMN = 'peak_c';

/**
 * The peak of its firing that a tile's own row tells. `peak_c` is no column of tiles.csv and is kept as
 * written, but in an archive of one file a cone that lost its zero shows in nothing else.
 *
 * @param other - cells of the columns that are not known, as written
 * @returns degrees C; undefined where there is no such cell or it holds no number
 */
export function ownPeakC(other: Tile['other']): number | undefined {
  const cell = Object.entries(other ?? {}).find(([name]) => name.toLowerCase() === PEAK_COLUMN);
  const text = cell?.[1].trim() ?? '';
  return parseDecimal(text, '.') ?? parseDecimal(text, ',');
}
