import type { StageWeights } from '../model/log-odds.ts';
import { choleskyFactor, dot, lowerIndex } from '../numeric/linalg.ts';
import { seededGenerator } from '../numeric/random.ts';

/** Draws of the weights of a stage from its posterior. */
export interface StageDraws {
  readonly count: number;
  readonly columns: readonly string[];
  /** [draws][columns] */
  readonly weights: Float64Array;
}

/** Enough that the end of a 90 % interval lies within 0.5 % of its share of the posterior. */
const DRAWS = 2000;
/** One seed for each stage, always the same: the same question has the same answer. */
const SEEDS = { melt: 1, gloss: 2 } as const;

/**
 * Draws of both stages' weights.
 *
 * @param model - both stages
 * @returns draws, the same for the same model
 */
export function posteriorDraws(model: {
  readonly melt: StageWeights;
  readonly gloss: StageWeights;
}): { readonly melt: StageDraws; readonly gloss: StageDraws } {
  return {
    melt: stageDraws(model.melt, SEEDS.melt),
    gloss: stageDraws(model.gloss, SEEDS.gloss),
  };
}

function stageDraws({ columns, mean, covarianceLower }: StageWeights, seed: number): StageDraws {
  const size = columns.length;
  const factor = choleskyFactor(Float64Array.from(covarianceLower), size);
  const { normal } = seededGenerator(seed);
  const weights = new Float64Array(DRAWS * size);
  for (let draw = 0; draw < DRAWS; draw++) {
    const z = Float64Array.from({ length: size }, normal);
    for (let j = 0; j < size; j++) {
      const row = factor.subarray(lowerIndex(j, 0), lowerIndex(j + 1, 0));
      weights[draw * size + j] = mean[j]! + dot(row, z.subarray(0, j + 1));
    }
  }
  return { count: DRAWS, columns, weights };
}

/** Design rows of points on a line, [points][columns], for many draws. */
export interface LineRows {
  readonly points: number;
  readonly values: Float64Array;
}

/**
 * Design rows laid end to end.
 *
 * @param rows - [points][columns]
 * @returns the same numbers, quick to read
 */
export function lineRows(rows: readonly (readonly number[])[]): LineRows {
  return { points: rows.length, values: Float64Array.from(rows.flat()) };
}

/**
 * Log-odds of a stage along a line of points, for one draw.
 *
 * @param draws - draws of the stage
 * @param draw - which draw
 * @param rows - design rows of the points
 * @returns log-odds per point
 */
export function logOddsAlong(
  { columns, weights }: StageDraws,
  draw: number,
  { points, values }: LineRows,
): Float64Array {
  const size = columns.length;
  const logOdds = new Float64Array(points);
  for (let i = 0; i < points; i++) {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += values[i * size + j]! * weights[draw * size + j]!;
    logOdds[i] = sum;
  }
  return logOdds;
}
