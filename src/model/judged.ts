import type { Heat, Tile } from '../archive/archive.ts';

/** What the fit can take a tile for. */
export type FittedVerdict = 'underfired' | 'matte' | 'gloss' | 'melted';

/** A tile that is judged and whose heat is known. */
export interface JudgedTile extends Tile {
  readonly verdict: FittedVerdict;
  readonly heat: Heat;
}

/**
 * Whether a tile says something of gloss.
 *
 * @param tile - judged tile
 * @returns true if it is matte or gloss
 */
export function isGlossOrMatte({ verdict }: JudgedTile): boolean {
  return verdict === 'matte' || verdict === 'gloss';
}

/**
 * Whether the fit uses a tile: judged, not overfired, its heat known.
 *
 * @param tile - a tile of an archive
 * @returns true if the tile is fitted
 */
export function isJudged(tile: Tile): tile is JudgedTile {
  return tile.heat !== undefined && tile.verdict !== 'unjudged' && tile.verdict !== 'overfired';
}
