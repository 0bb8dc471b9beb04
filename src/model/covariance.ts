import { lowerIndex } from '../numeric/linalg.ts';
import type { Design } from './design.ts';
import { groupDepartures, PSEUDO_OBSERVATIONS, type Scales } from './scales.ts';
import { sdsOf } from './units.ts';

/**
 * Adds what the sds' own uncertainty does to the weights, to first order.
 *
 * @param design - both stages
 * @param scales - sds
 * @param theta - weights of both stages in units of the prior
 * @param covariance - their covariance at fixed sds, lower triangle
 * @returns the wider covariance
 *
 * Source: R. E. Kass and D. Steffey, Journal of the American Statistical Association 84 (1989) 717-726.
 */
export function withScalesSpread(
  design: Design,
  scales: Scales,
  theta: Float64Array,
  covariance: Float64Array,
): Float64Array {
  const widened = Float64Array.from(covariance);
  let first = 0;
  for (const stage of design.stages) {
    const base = first;
    const departures = groupDepartures(stage, theta, covariance, base);
    departures.forEach(({ determined }, g) => {
      if (g > scales[stage.name].groups.length) return;
      const members = stage.groupOf.flatMap((of, j) => (of === g ? [base + j] : []));
      addOuter(widened, movesWithSd(members, theta, covariance), determined);
    });
    first += stage.size;
  }
  return widened;
}

/** Move of the weights as the logarithm of their group's sd grows, in units of the prior. */
function movesWithSd(
  members: readonly number[],
  theta: Float64Array,
  covariance: Float64Array,
): Float64Array {
  return theta.map((_, i) =>
    members.reduce((sum, j) => {
      const cell = i > j ? lowerIndex(i, j) : lowerIndex(j, i);
      return sum + 2 * theta[j]! * covariance[cell]!;
    }, 0),
  );
}

/** The logarithm of an sd has a variance of about 1 / (2 observations). */
function addOuter(covariance: Float64Array, moves: Float64Array, determined: number): void {
  const variance = 1 / (2 * (PSEUDO_OBSERVATIONS + determined));
  let cell = 0;
  for (let i = 0; i < moves.length; i++) {
    for (let j = 0; j <= i; j++) covariance[cell++]! += variance * moves[i]! * moves[j]!;
  }
}

/**
 * Covariance of each stage's own weights.
 *
 * @param design - both stages
 * @param scales - sds
 * @param covariance - of all weights in units of the prior, lower triangle
 * @returns per stage, lower triangle
 */
export function stageCovariances(
  design: Design,
  scales: Scales,
  covariance: Float64Array,
): Float64Array[] {
  let first = 0;
  return design.stages.map((stage) => {
    const sds = sdsOf(stage, scales);
    const own = new Float64Array(lowerIndex(stage.size, 0));
    sds.forEach((sd, i) => {
      const row = lowerIndex(first + i, first);
      for (let j = 0; j <= i; j++) {
        own[lowerIndex(i, j)] = covariance[row + j]! * sd * sds[j]!;
      }
    });
    first += stage.size;
    return own;
  });
}
