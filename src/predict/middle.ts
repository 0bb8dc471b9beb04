import type { JudgedTile } from '../model/stages.ts';
import type { Point } from './answers.ts';
import { experienceOf, squaredSteps } from './experience.ts';

/** The centre of the model's scale, where there are no tiles. */
const USUAL_MIDDLE: Point = {
  point: 'a usual cone 6 glaze, since there is no judged tile',
  unity: { SiO2: 3.2, Al2O3: 0.42, B2O3: 0.18, Na2O: 0.15, K2O: 0.15, MgO: 0.06, CaO: 0.64 },
};

/**
 * The middle of an archive: the tile with the smallest total distance to all others, a glaze that was
 * really made, not an average that nobody could weigh.
 *
 * @param tiles - judged tiles
 * @returns its composition, named by where it comes from
 */
export function middleComposition(tiles: readonly JudgedTile[]): Point {
  const experience = experienceOf(sampled(tiles));
  let best = { total: Infinity, tile: undefined as JudgedTile | undefined };
  for (const tile of sampled(tiles)) {
    const total = squaredSteps(experience, tile.unity).reduce((sum, d) => sum + Math.sqrt(d), 0);
    if (total < best.total) best = { total, tile };
  }
  if (!best.tile) return USUAL_MIDDLE;
  const { tile, recipe, unity } = best.tile;
  const glaze = recipe === undefined ? `tile ${tile}` : `tile ${tile}, ${recipe}`;
  return { point: `the middle of the archive (${glaze})`, unity };
}

/** All pairs of a thousand tiles are quick; of more, every k-th stands for the rest. */
const MOST_COMPARED = 1000;

function sampled(tiles: readonly JudgedTile[]): JudgedTile[] {
  const sorted = [...tiles].sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const every = Math.ceil(tiles.length / MOST_COMPARED);
  return sorted.filter((_, i) => i % every === 0);
}
