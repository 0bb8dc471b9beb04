import { logit, sigmoid } from './logistic.ts';
import { normalCdf, normalQuantile } from './normal.ts';
import { normalMean } from './quadrature.ts';
import { findRoot } from './roots.ts';

/** Log-odds that are known up to a Gaussian error. */
export interface GaussianLogOdds {
  readonly mean: number;
  /** >= 0 */
  readonly sd: number;
}

/**
 * Class probability averaged over a Gaussian posterior of the log-odds.
 *
 * Uncertainty pulls the answer towards 0.5; sd 0 gives the plain logistic.
 *
 * @param mean - posterior mean of the log-odds, dimensionless
 * @param sd - posterior sd of the log-odds, >= 0
 * @returns probability in [0, 1]; absolute error below 1e-10
 * @throws {RangeError} if sd is negative or not a number
 * @example
 * averagedProbability(2, 2); // ~0.7752
 * averagedProbability(1, 0); // ~0.7311
 *
 * Source: trapezoidal rule as in `normalMean`. The nearest poles of the integrand lie pi / sd off
 * the real line, so a step of 0.7 / sd leaves an error of about exp(-2 pi^2 / 0.7) = 6e-13.
 */
export function averagedProbability(mean: number, sd: number): number {
  if (!(sd >= 0)) throw new RangeError(`sd must be >= 0, got ${sd}`);
  if (sd === 0) return sigmoid(mean);
  return normalMean((z) => sigmoid(mean + sd * z), Math.min(0.5, 0.7 / sd));
}

/**
 * Quantile of a probability whose log-odds are Gaussian: the logistic of their quantile.
 *
 * @param logOdds - mean and sd of the log-odds
 * @param p - which quantile, 0 to 1
 * @returns probability in [0, 1]
 * @example
 * probabilityQuantile({ mean: 0, sd: 1 }, 0.95); // ~0.8382
 */
export function probabilityQuantile({ mean, sd }: GaussianLogOdds, p: number): number {
  return sigmoid(sd === 0 ? mean : mean + sd * normalQuantile(p));
}

/** Nodes of the outer integral of the product's distribution, in z. */
const PRODUCT_STEP = 1 / 16;
/** Log-odds beyond which a probability is 0 or 1 to 1e-15. */
const FARTHEST_LOG_ODDS = 35;

/**
 * Quantile of the product of two independent probabilities with Gaussian log-odds.
 *
 * The distribution of the product is an integral over the less certain one's conditional normal
 * distribution; the quantile is its root, not the product of two quantiles.
 *
 * @param first - mean and sd of the first log-odds
 * @param second - mean and sd of the second, independent of the first
 * @param p - which quantile, 0 to 1 exclusive
 * @returns probability in [0, 1]; error below 1e-6 for sds of 0.05 to 6
 * @example
 * productQuantile({ mean: 1, sd: 0.5 }, { mean: 2, sd: 0 }, 0.5); // ~0.6439
 */
export function productQuantile(
  first: GaussianLogOdds,
  second: GaussianLogOdds,
  p: number,
): number {
  const [outer, inner] = first.sd < second.sd ? [first, second] : [second, first];
  if (inner.sd === 0) return sigmoid(outer.mean) * sigmoid(inner.mean);
  const share = (logOddsOfProduct: number) =>
    productCdf(sigmoid(logOddsOfProduct), outer, inner) - p;
  return sigmoid(findRoot(share, -FARTHEST_LOG_ODDS, FARTHEST_LOG_ODDS, 1e-9));
}

/** P(outer * inner <= product). */
function productCdf(product: number, outer: GaussianLogOdds, inner: GaussianLogOdds): number {
  const given = (z: number) => {
    const needed = product / sigmoid(outer.mean + outer.sd * z);
    return needed >= 1 ? 1 : normalCdf((logit(needed) - inner.mean) / inner.sd);
  };
  return outer.sd === 0 ? given(0) : normalMean(given, PRODUCT_STEP);
}
