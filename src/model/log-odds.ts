import { dot, quadraticForm } from '../numeric/linalg.ts';
import { averagedProbability, type GaussianLogOdds } from '../numeric/logistic-normal.ts';
import type { Unity } from '../chemistry/unity.ts';
import { HERMITE_NODES, HERMITE_SHARES } from './label-noise.ts';
import { columnValues, scaledInputs } from './inputs.ts';
import type { LoadSpread, Stage, SurfaceProbability } from './model.ts';
import { radialPlace, radialValues } from './radial.ts';

/** What the log-odds of a stage are computed from. */
export type StageWeights = Pick<
  Stage,
  'columns' | 'radial' | 'mean' | 'covarianceLower' | 'residual'
>;

/** One row of a fitted stage's design. */
export interface StageRow {
  readonly values: readonly number[];
  /** Variance of the smooth departure that the radial columns do not hold. */
  readonly leftOverVariance: number;
}

/**
 * The row of a composition at a cone.
 *
 * @param stage - fitted stage
 * @param unity - unity formula
 * @param coneIndex - heat work, cone as a number
 * @returns columns, then radial columns
 */
export function stageRow(stage: StageWeights, unity: Unity, coneIndex: number): StageRow {
  const inputs = scaledInputs(unity, coneIndex);
  const { values, leftOver } = radialValues(stage.radial, radialPlace(inputs));
  return {
    values: [...columnValues(inputs, stage.columns), ...values],
    leftOverVariance: leftOver * stage.residual.sd ** 2,
  };
}

/**
 * Posterior of the log-odds of one stage for a composition at a cone.
 *
 * @param stage - fitted stage
 * @param unity - unity formula
 * @param coneIndex - heat work of the load, cone as a number
 * @param loadSd - a load's own intercept, log-odds; 0 for a load that truly reaches that cone
 * @returns mean and sd of the log-odds
 */
export function stageLogOdds(
  stage: StageWeights,
  unity: Unity,
  coneIndex: number,
  loadSd = 0,
): GaussianLogOdds {
  const { values, leftOverVariance } = stageRow(stage, unity, coneIndex);
  const variance = quadraticForm(stage.covarianceLower, values) + leftOverVariance + loadSd ** 2;
  return { mean: dot(stage.mean, values), sd: Math.sqrt(Math.max(0, variance)) };
}

/**
 * Probability of each surface, averaged over the posterior of both stages.
 *
 * The stages share no more than the heat of the loads, which ties their log-odds by a correlation of
 * less than 0.1: they are taken as independent, and the mean of the product is the product of the means.
 *
 * @param melt - log-odds of melted
 * @param gloss - log-odds of gloss given melted
 * @returns probabilities that sum to 1
 * @example
 * surfaceProbability({ mean: 0, sd: 1 }, { mean: 0, sd: 1 }).matte; // 0.25
 */
export function surfaceProbability(
  melt: GaussianLogOdds,
  gloss: GaussianLogOdds,
): SurfaceProbability {
  const melted = averagedProbability(melt.mean, melt.sd);
  const underfired = averagedProbability(-melt.mean, melt.sd);
  return {
    underfired,
    matte: melted * averagedProbability(-gloss.mean, gloss.sd),
    gloss: melted * averagedProbability(gloss.mean, gloss.sd),
  };
}

/**
 * Probability of each surface in a load not seen, averaged over how far its heat may be from the cone
 * on paper and over its own intercept of gloss.
 *
 * @param model - both stages and the loads' spread
 * @param unity - unity formula
 * @param coneIndex - the cone on paper
 * @returns probabilities that sum to 1
 */
export function newLoadProbability(
  model: {
    readonly melt: StageWeights;
    readonly gloss: StageWeights;
    readonly loadSpread: LoadSpread;
  },
  unity: Unity,
  coneIndex: number,
): SurfaceProbability {
  const { offsetSdCones, glossSd } = model.loadSpread;
  const sum = { underfired: 0, matte: 0, gloss: 0 };
  const add = (offset: number, share: number) => {
    const cone = coneIndex + offset;
    const here = surfaceProbability(
      stageLogOdds(model.melt, unity, cone),
      stageLogOdds(model.gloss, unity, cone, glossSd),
    );
    sum.underfired += share * here.underfired;
    sum.matte += share * here.matte;
    sum.gloss += share * here.gloss;
  };
  add(0, HERMITE_SHARES[0]!);
  for (let k = 1; k < HERMITE_NODES.length; k++) {
    for (const side of [-1, 1]) add(side * offsetSdCones * HERMITE_NODES[k]!, HERMITE_SHARES[k]!);
  }
  return sum;
}
