import { dot, quadraticForm } from '../numeric/linalg.ts';
import { averagedProbability, type GaussianLogOdds } from '../numeric/logistic-normal.ts';
import type { Unity } from '../chemistry/unity.ts';
import { columnValues, scaledInputs } from './inputs.ts';
import type { Stage, SurfaceProbability } from './model.ts';

/** What the log-odds of a stage are computed from. */
export type StageWeights = Pick<Stage, 'columns' | 'mean' | 'covarianceLower'>;

/**
 * Posterior of the log-odds of one stage for a composition at a cone.
 *
 * @param stage - fitted stage
 * @param unity - unity formula
 * @param coneIndex - heat work of the load, cone as a number
 * @param loadSd - error of the load, log-odds; 0 for a load that truly reaches that cone
 * @returns mean and sd of the log-odds
 */
export function stageLogOdds(
  stage: StageWeights,
  unity: Unity,
  coneIndex: number,
  loadSd = 0,
): GaussianLogOdds {
  const row = columnValues(scaledInputs(unity, coneIndex), stage.columns);
  const variance = quadraticForm(stage.covarianceLower, row) + loadSd ** 2;
  return { mean: dot(stage.mean, row), sd: Math.sqrt(Math.max(0, variance)) };
}

/**
 * Probability of each surface, averaged over the posterior of both stages.
 *
 * The stages are fitted apart, so their log-odds are independent and the mean of the product is the
 * product of the means.
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
