import type { Unity } from '../chemistry/unity.ts';
import { scaledInputs } from '../model/inputs.ts';
import { stageRow, type StageRow, type StageWeights } from '../model/log-odds.ts';
import { kernel, radialPlace } from '../model/radial.ts';
import type { StageName } from '../model/stages.ts';
import { dot, quadraticForm, symmetricTimes } from '../numeric/linalg.ts';
import { seededGenerator } from '../numeric/random.ts';

/** A composition at a cone. */
export interface PathPoint {
  readonly unity: Unity;
  readonly coneIndex: number;
}

/** Draws of a stage's log-odds over the points of a path, whole paths at a time. */
export interface PathDraws {
  readonly count: number;
  /** Log-odds at every point in one draw. */
  readonly logOdds: (draw: number) => Float64Array;
}

/** Standard normal numbers: [directions][draws]. */
export type NormalTable = readonly Float64Array[];

/** Enough that the end of a 90 % interval lies within 0.5 % of its share of the posterior. */
export const DRAWS = 2000;
/** Directions in which smooth log-odds can vary over a path; 5 to 15 are usual. */
const MOST_DIRECTIONS = 40;
/** Share of the largest variance that may be left out. */
const LEFT_OUT = 1e-7;
/** One seed for each stage, always the same: the same question has the same answer. */
const SEEDS: Readonly<Record<StageName, number>> = { melt: 1, gloss: 2 };

/**
 * The normal numbers that all paths of a stage are drawn with.
 *
 * @param stage - which stage
 * @returns the same numbers every time
 */
export function normalTable(stage: StageName): NormalTable {
  const { normal } = seededGenerator(SEEDS[stage]);
  return Array.from({ length: MOST_DIRECTIONS }, () =>
    Float64Array.from({ length: DRAWS }, () => normal()),
  );
}

/**
 * Draws of the log-odds of a stage over a path from its posterior.
 *
 * The covariance between the points is factored until next to nothing is left, so that a path costs
 * as many normal numbers as there are directions in which it can vary.
 *
 * @param stage - fitted stage
 * @param path - points
 * @param table - normal numbers
 * @returns the draws
 *
 * Source: pivoted Cholesky factorisation; H. Harbrecht, M. Peters and R. Schneider, Applied Numerical
 * Mathematics 62 (2012) 428-440.
 */
export function pathDraws(
  stage: StageWeights,
  path: readonly PathPoint[],
  table: NormalTable,
): PathDraws {
  const rows = path.map(({ unity, coneIndex }) => stageRow(stage, unity, coneIndex));
  const mean = Float64Array.from(rows, ({ values }) => dot(stage.mean, values));
  const factors = pathFactors(stage, path, rows);
  return {
    count: DRAWS,
    logOdds: (draw) => {
      const logOdds = Float64Array.from(mean);
      for (let k = 0; k < factors.length; k++) {
        const factor = factors[k]!;
        const z = table[k]![draw]!;
        for (let i = 0; i < logOdds.length; i++) logOdds[i]! += z * factor[i]!;
      }
      return logOdds;
    },
  };
}

function pathFactors(
  stage: StageWeights,
  path: readonly PathPoint[],
  rows: readonly StageRow[],
): Float64Array[] {
  const column = covarianceColumns(stage, path, rows);
  const left = Float64Array.from(
    rows,
    ({ values, leftOverVariance }) =>
      quadraticForm(stage.covarianceLower, values) + leftOverVariance,
  );
  const enough = LEFT_OUT * left.reduce((a, b) => Math.max(a, b), 0);
  const factors: Float64Array[] = [];
  while (factors.length < MOST_DIRECTIONS) {
    const pivot = left.reduce((best, value, i) => (value > left[best]! ? i : best), 0);
    if (!(left[pivot]! > enough)) break;
    const root = Math.sqrt(left[pivot]!);
    const factor = column(pivot);
    for (const earlier of factors) {
      const share = earlier[pivot]!;
      for (let i = 0; i < factor.length; i++) factor[i]! -= share * earlier[i]!;
    }
    for (let i = 0; i < factor.length; i++) {
      factor[i]! /= root;
      left[i]! -= factor[i]! ** 2;
    }
    factors.push(factor);
  }
  return factors;
}

/** Covariance of the log-odds of one point with those of all. */
function covarianceColumns(
  { covarianceLower, columns, residual }: StageWeights,
  path: readonly PathPoint[],
  rows: readonly StageRow[],
): (pivot: number) => Float64Array {
  const places = path.map(({ unity, coneIndex }) => radialPlace(scaledInputs(unity, coneIndex)));
  const radial = rows.map(({ values }) => values.slice(columns.length));
  const variance = residual.sd ** 2;
  return (pivot) => {
    const image = symmetricTimes(covarianceLower, rows[pivot]!.values);
    return Float64Array.from(rows, ({ values }, i) => {
      const unexplained = kernel(places[i]!, places[pivot]!) - dot(radial[i]!, radial[pivot]!);
      return dot(image, values) + variance * unexplained;
    });
  };
}
