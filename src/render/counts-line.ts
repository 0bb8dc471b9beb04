import type { TileCounts } from '../archive/archive.ts';
import { countOf, grouped } from './sentences.ts';

/**
 * What became of every row of tiles.csv.
 *
 * @param counts - of an archive
 * @returns one line: the parts sum to what was read
 * @example
 * countsLine({ read: 9, fitted: 6, unjudged: 1, setAside: 0, refused: 2 });
 * // '9 tiles read = 6 fitted + 1 unjudged + 0 set aside + 2 refused'
 */
export function countsLine({ read, fitted, unjudged, setAside, refused }: TileCounts): string {
  const parts = [
    `${grouped(fitted)} fitted`,
    `${grouped(unjudged)} unjudged`,
    `${grouped(setAside)} set aside`,
    `${grouped(refused)} refused`,
  ];
  return `${countOf(read, 'tile')} read = ${parts.join(' + ')}`;
}
