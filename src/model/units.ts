import type { Design, StageDesign } from './design.ts';
import type { Unknowns } from './latent.ts';
import { sdOfGroup, type Scales } from './scales.ts';

/**
 * Sd of a load's unknown: they alternate between heat and gloss.
 *
 * @param scales - sds
 * @param k - place of the unknown
 * @param stretch - how much wider than usual each load's heat is taken to spread; 1 where absent
 * @returns cones or log-odds
 */
export function loadSd({ loads }: Scales, k: number, stretch?: Float64Array): number {
  return k % 2 === 0 ? loads.offsetCones * (stretch?.[k / 2] ?? 1) : loads.gloss;
}

/**
 * The loads' heat and intercepts, from their unknowns.
 *
 * @param scales - sds
 * @param unknowns - [loads][2], in units of the prior
 * @param stretch - per load
 * @returns [loads][2], cones and log-odds
 */
export function loadsAt(
  scales: Scales,
  unknowns: Float64Array,
  stretch?: Float64Array,
): Float64Array<ArrayBuffer> {
  return Float64Array.from(unknowns, (u, k) => u * loadSd(scales, k, stretch));
}

/**
 * Prior sd of each weight of a stage.
 *
 * @param stage - design
 * @param scales - sds
 * @returns per weight
 */
export function sdsOf({ name, groupOf }: StageDesign, scales: Scales): number[] {
  return groupOf.map((g) => sdOfGroup(scales[name], g));
}

/**
 * Weights and loads in units of the prior.
 *
 * @param design - both stages
 * @param scales - sds
 * @param weights - per stage
 * @param loads - [loads][2], cones and log-odds
 * @param stretch - per load
 * @returns the unknowns of the problem
 */
export function unknownsAt(
  design: Design,
  scales: Scales,
  weights: readonly Float64Array[],
  loads: Float64Array,
  stretch?: Float64Array,
): Unknowns {
  const theta = design.stages.flatMap((stage, s) =>
    sdsOf(stage, scales).map((sd, j) => (weights[s]![j]! - stage.priorMean[j]!) / sd),
  );
  return {
    theta: Float64Array.from(theta),
    loads: loads.map((value, k) => value / loadSd(scales, k, stretch)),
  };
}

/**
 * Weights from their unknowns.
 *
 * @param design - both stages
 * @param scales - sds
 * @param theta - weights of both stages in units of the prior
 * @returns per stage, log-odds per unit of the column
 */
export function weightsAt(design: Design, scales: Scales, theta: Float64Array): Float64Array[] {
  let first = 0;
  return design.stages.map((stage) => {
    const base = first;
    first += stage.size;
    const sds = sdsOf(stage, scales);
    return Float64Array.from(sds, (sd, j) => stage.priorMean[j]! + sd * theta[base + j]!);
  });
}

/**
 * Largest difference between two sets of weights.
 *
 * @param a - per stage
 * @param b - per stage
 * @returns largest absolute difference
 */
export function largestDifference(a: readonly Float64Array[], b: readonly Float64Array[]): number {
  return a.reduce(
    (most, own, s) =>
      own.reduce((big, value, j) => Math.max(big, Math.abs(value - b[s]![j]!)), most),
    0,
  );
}
