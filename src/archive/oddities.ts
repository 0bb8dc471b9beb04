import { median } from '../numeric/summary.ts';
import type { Firing, Recipe, Tile, WitnessReading } from './archive.ts';
import type { LoadTiles } from './inventory.ts';
import type { KilnAccount } from './kiln-account.ts';
import { oddCompositions } from './odd-compositions.ts';
import { driftingKilns, farFromSet, wildReadings } from './odd-firings.ts';
import { conesAgainstFiring, farCones, shelvesUnread } from './odd-heat.ts';
import { namesAlike } from './odd-names.ts';
import { peaksAgainstCones } from './odd-peaks.ts';
import { contraryVerdicts, dripsAgainstSurface, farOutTiles, uniformLoads } from './odd-tiles.ts';
import { farthest, printed } from './odd-words.ts';

/** What the odd things are looked for in. */
export interface Looked {
  readonly tiles: readonly Tile[];
  readonly recipes: readonly Recipe[];
  readonly kilns: readonly KilnAccount[];
  readonly loads: readonly LoadTiles[];
  readonly firings: readonly Firing[];
  readonly witness: readonly WitnessReading[];
}

/** So far from the hundred, a recipe of a studio that weighs by the hundred is a slip. */
const OFF_HUNDRED_PARTS = 2;

/**
 * What in an archive is worth a second look. Nothing of it is wrong for certain.
 *
 * What would mislead the fit most stands first: compositions and cones that cannot be right, then things
 * taken for two, then verdicts, then kilns and compositions that are merely unusual.
 *
 * @param looked - all that an archive holds, and its kilns and loads
 * @returns sentences, each with what was found and what to look at; the same in any order of rows
 *
 * Source of the limits, where none is given: common practice, no source.
 */
export function oddities(looked: Looked): string[] {
  const { tiles, kilns, witness } = looked;
  return [
    ...oddCompositions(tiles),
    ...peaksAgainstCones(looked),
    ...wildReadings(kilns, witness),
    ...farCones(looked),
    ...conesAgainstFiring(looked),
    ...farFromSet(kilns),
    ...namesAlike(looked),
    ...shelvesUnread(looked),
    ...contraryVerdicts(tiles),
    ...dripsAgainstSurface(tiles),
    ...driftingKilns(kilns),
    ...uniformLoads(looked.loads),
    ...farOutTiles(tiles),
    ...offHundred(looked.recipes),
  ];
}

function offHundred(recipes: readonly Recipe[]): string[] {
  const sums = recipes.map(({ recipe, lines }) => ({
    recipe,
    sum: lines.reduce((sum, { parts, over100 }) => sum + (over100 ? 0 : parts), 0),
  }));
  if (sums.length === 0) return [];
  const weighsByHundred =
    Math.abs(median(sums.map(({ sum }) => sum)) - 100) < OFF_HUNDRED_PARTS / 4;
  const off = sums.flatMap(({ recipe, sum }) => {
    // Rounded: sums of the same parts in another order differ by a rounding.
    const by = Number(Math.abs(sum - 100).toFixed(6));
    return by > OFF_HUNDRED_PARTS ? [{ words: `${printed(recipe)} (${sum.toFixed(1)})`, by }] : [];
  });
  if (!weighsByHundred || off.length === 0) return [];
  return [`recipes usually make 100 parts, but not ${farthest(off)}`];
}
