import type { UnvalidatedModel } from '../model/fit.ts';
import { isJudged } from '../model/stages.ts';
import type { NearTile, Point, PointShift, Shift } from './answers.ts';
import {
  EDGE_STEPS,
  experienceOf,
  squaredSteps,
  tilesWithin,
  type Experience,
} from './experience.ts';
import { normalTable } from './path-draws.ts';
import { coneAnswers, judgedExperience, modelStamp } from './predict.ts';
import { turns } from './turns.ts';
import { shiftInWords } from './words.ts';

/** Turns are looked for so far outside the cones asked about. */
const CONES_BEYOND = 1;

/**
 * How each point moves between cones, and where its surface turns.
 *
 * Turns are looked for from one cone below the coolest asked cone to one above the hottest. An
 * answer depends on its own point only.
 *
 * @param model - fitted model
 * @param points - compositions
 * @param coneIndexes - cones as numbers, at least one, in any order
 * @returns one answer a point, its cones from cool to hot
 */
export function shift(
  model: UnvalidatedModel,
  points: readonly Point[],
  coneIndexes: readonly number[],
): Shift {
  const cones = [...new Set(coneIndexes)].sort((a, b) => a - b);
  const [coolest = Number.NaN] = cones;
  const hottest = cones.at(-1) ?? Number.NaN;
  if (!(hottest >= coolest)) throw new RangeError('expected at least one cone, got none');
  const lookedAt = [coolest - CONES_BEYOND, hottest + CONES_BEYOND] as const;
  const judged = judgedExperience(model);
  const overfired = experienceOf(
    model.archive.tiles.filter((tile) => tile.verdict === 'overfired' && !isJudged(tile)),
  );
  const tables = { melt: normalTable('melt'), gloss: normalTable('gloss') };
  return {
    schema: 'coneshift.shift/1',
    model: modelStamp(model),
    points: points.map((point): PointShift => {
      const answers = coneAnswers(model, judged, point, cones);
      return {
        point: point.point,
        unity: point.unity,
        cones: answers,
        turns: turns(model, tables, point.unity, lookedAt),
        lookedAt,
        words: shiftInWords(answers),
        overfiredNear: overfiredNear(overfired, point, cones),
      };
    }),
  };
}

/** Overfired tiles within the edge radius of the point at one of the cones. */
function overfiredNear(
  experience: Experience,
  { unity }: Point,
  cones: readonly number[],
): NearTile[] {
  const squares = squaredSteps(experience, unity);
  const near = new Map<string, NearTile>();
  for (const cone of cones) {
    for (const tile of tilesWithin(experience, squares, cone, EDGE_STEPS)) {
      const known = near.get(tile.tile);
      if (known && known.distance <= tile.distance) continue;
      near.set(tile.tile, tile);
    }
  }
  return [...near.values()].sort((a, b) => a.distance - b.distance);
}
