import { log1pExp, sigmoid } from './logistic.ts';
import { normalCdf, normalDensity, normalQuantile } from './normal.ts';
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

/**
 * Quantile of the product of two independent probabilities with Gaussian log-odds.
 *
 * It is the root of the product's distribution, not the product of two quantiles.
 *
 * @param first - mean and sd of the first log-odds
 * @param second - mean and sd of the second, independent of the first
 * @param p - which quantile, 0 to 1 exclusive
 * @returns probability in [0, 1]; absolute error below 1e-8 for sds from 0.02 to 20;
 *   within [0, 1] for any
 * @example
 * productQuantile({ mean: 1, sd: 0.5 }, { mean: 2, sd: 0 }, 0.5); // ~0.6439
 */
export function productQuantile(
  first: GaussianLogOdds,
  second: GaussianLogOdds,
  p: number,
): number {
  const [outer, inner] = first.sd < second.sd ? [first, second] : [second, first];
  if (outer.sd === 0) return sigmoid(outer.mean) * probabilityQuantile(inner, p);
  const excess = (logOddsOfProduct: number) => productCdf(logOddsOfProduct, outer, inner) - p;
  // P(XY < xy) <= P(X < x) + P(Y < y): the quantile lies between these two products.
  const bound = (each: number) => {
    const z = normalQuantile(each);
    return productLogOdds(outer.mean + outer.sd * z, inner.mean + inner.sd * z);
  };
  return sigmoid(findRoot(excess, bound(p / 2), bound((1 + p) / 2), 1e-9));
}

/** From here on a probability is 1 in double precision. */
const SURE_LOG_ODDS = 745;

/** Log-odds of the product of two probabilities, from theirs; finite also where the product underflows. */
function productLogOdds(first: number, second: number): number {
  const logProduct = -log1pExp(-first) - log1pExp(-second);
  return Math.min(logProduct - Math.log(-Math.expm1(logProduct)), SURE_LOG_ODDS);
}

/** Beyond so many sds of the outer log-odds there is nothing left to integrate. */
const FARTHEST_SDS = 8;
/** The integrand falls as exp(v) towards lower v: 4e-11 is left. */
const LOWEST_V = -24;
/**
 * Poles lie pi off the real line: a step of 0.6 leaves exp(-2 pi^2 / 0.6) = 5e-15. Beyond an sd of 60 a
 * hundredth of the sd will do, since what bends within a cone's width then hardly weighs.
 */
const WIDEST_STEP = 0.6;

/**
 * P(X Y <= q) = P(X <= q) + the integral over X > q of P(Y <= q / X).
 *
 * With v = ln((X - q) / (1 - X)) the log-odds of X are ln((q + e^v) / (1 - q)) and those of q / X are
 * ln(q (1 + e^-v) / (1 - q)): both smooth, so the trapezoidal rule converges exponentially.
 */
function productCdf(logOddsOfQ: number, outer: GaussianLogOdds, inner: GaussianLogOdds): number {
  const logQ = -log1pExp(-logOddsOfQ);
  const log1MinusQ = -log1pExp(logOddsOfQ);
  const below = normalCdf((logOddsOfQ - outer.mean) / outer.sd);
  // All in logarithms: log-odds far from 0 would overflow or vanish as odds.
  const vAt = (logOdds: number) => {
    const sum = logOdds + log1MinusQ;
    return sum > logQ ? sum + Math.log1p(-Math.exp(logQ - sum)) : -Infinity;
  };
  const low = Math.max(LOWEST_V + Math.min(0, logQ), vAt(outer.mean - FARTHEST_SDS * outer.sd));
  const high = vAt(outer.mean + FARTHEST_SDS * outer.sd);
  if (!(high > low)) return below;
  const cells = Math.ceil(
    (high - low) / Math.min(0.8 * outer.sd, Math.max(WIDEST_STEP, outer.sd / 100)),
  );
  const step = (high - low) / cells;
  let sum = 0;
  for (let i = 0; i <= cells; i++) {
    const v = low + i * step;
    const logShare = -log1pExp(logQ - v);
    const x = (v - logShare - log1MinusQ - outer.mean) / outer.sd;
    const y = (logOddsOfQ + log1pExp(-v) - inner.mean) / inner.sd;
    sum += normalDensity(x) * Math.exp(logShare) * normalCdf(y);
  }
  return below + (sum * step) / outer.sd;
}
