import { log1pExp, sigmoid } from './logistic.ts';
import { normalCdf, normalDensity, normalQuantile } from './normal.ts';
import { productTail } from './product-tail.ts';
import { normalMean, normalNodes } from './quadrature.ts';
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
  return normalMean((z) => sigmoid(mean + sd * z), stepFor(sd));
}

const stepFor = (sd: number) => Math.min(0.5, 0.7 / sd);

/**
 * The averaged probabilities of a class and of its opposite, from one pass.
 *
 * The opposite is not 1 less the other, so that also a small one has all its digits.
 *
 * @param mean - posterior mean of the log-odds, dimensionless
 * @param sd - posterior sd of the log-odds, >= 0
 * @returns `averagedProbability` of the mean and of its negative, to the last bit
 * @throws {RangeError} if sd is negative or not a number
 * @example
 * averagedBoth(2, 2).yes; // ~0.7752
 * averagedBoth(2, 2).no; // ~0.2248
 */
export function averagedBoth(
  mean: number,
  sd: number,
): { readonly yes: number; readonly no: number } {
  if (!(sd >= 0)) throw new RangeError(`sd must be >= 0, got ${sd}`);
  if (sd === 0) return { yes: sigmoid(mean), no: sigmoid(-mean) };
  const step = stepFor(sd);
  const density = normalNodes(step);
  let yes = density[0]! * sigmoid(mean);
  let no = density[0]! * sigmoid(-mean);
  for (let i = 1; i < density.length; i++) {
    const off = sd * (i * step);
    const [above, below] = [mean + off, mean - off];
    // As `sigmoid`, but one exponential serves both classes.
    const ofAbove = Math.exp(-Math.abs(above));
    const ofBelow = Math.exp(-Math.abs(below));
    const likelyAbove = 1 / (1 + ofAbove);
    const likelyBelow = 1 / (1 + ofBelow);
    const rareAbove = ofAbove / (1 + ofAbove);
    const rareBelow = ofBelow / (1 + ofBelow);
    const yesAbove = above >= 0 ? likelyAbove : rareAbove;
    const yesBelow = below >= 0 ? likelyBelow : rareBelow;
    yes += density[i]! * (yesAbove + yesBelow);
    no +=
      density[i]! *
      ((above >= 0 ? rareAbove : likelyAbove) + (below >= 0 ? rareBelow : likelyBelow));
  }
  return { yes: yes * step, no: no * step };
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
  const quick = quickQuantile(outer, inner, p);
  if (quick !== undefined) return sigmoid(quick);
  // P(XY < xy) <= P(X < x) + P(Y < y): the quantile lies between these two products.
  const bound = (each: number) => {
    const z = normalQuantile(each);
    return productLogOdds(outer.mean + outer.sd * z, inner.mean + inner.sd * z);
  };
  const excess = (logOddsOfProduct: number) => productCdf(logOddsOfProduct, outer, inner) - p;
  return sigmoid(findRoot(excess, bound(p / 2), bound((1 + p) / 2), 1e-9));
}

/** Between these the odds and what is left of 1 are far from underflow. */
const QUICK_LOG_ODDS = [-200, 30] as const;
/** Steps are cubic: what is left after one this many sds long is below 1e-9 of the log-odds. */
const SMALL_STEP_SDS = 3e-3;
/** From a good start two steps do; where five do not, another method must. */
const MOST_STEPS = 5;
/** A share closer to 0 or 1 says too little of how far off the place is. */
const LEAST_SHARE = 1e-9;

/**
 * Log-odds of the quantile by steps on the standard score of the share, which is nearly linear in the log-odds;
 * undefined where that does not settle.
 *
 * Source: Chebyshev's method, J. F. Traub, Iterative Methods for the Solution of Equations, 1964.
 */
function quickQuantile(
  outer: GaussianLogOdds,
  inner: GaussianLogOdds,
  p: number,
): number | undefined {
  const z = normalQuantile(p);
  let at = likelyQuantile(outer, inner, z);
  for (let i = 0; i < MOST_STEPS; i++) {
    if (!(at > QUICK_LOG_ODDS[0] && at < QUICK_LOG_ODDS[1])) return undefined;
    const tail = productTail(at, outer, inner);
    const share = tail === undefined ? 0 : 1 - tail.above;
    if (tail === undefined || !(share > LEAST_SHARE && share < 1 - LEAST_SHARE)) return undefined;
    const score = normalQuantile(share);
    const perScore = normalDensity(score) / tail.density;
    const linear = (z - score) * perScore;
    const bend = 0.5 * (tail.slope / tail.density + score / perScore) * linear;
    const step = Math.abs(bend) < 0.5 ? linear * (1 - bend) : linear;
    at += step;
    if (Math.abs(step) < SMALL_STEP_SDS * Math.min(1, perScore)) return at;
  }
  return undefined;
}

/**
 * The quantile if the product's log-odds were a parabola: at the likeliest of the places that lie z sds off in a
 * straight line, moved by half the bend across that line.
 *
 * Source: first and second order reliability, K. Breitung, Journal of Engineering Mechanics 110 (1984) 357-366.
 */
function likelyQuantile(first: GaussianLogOdds, second: GaussianLogOdds, z: number): number {
  let slopes = productSlopes(first, second, 0, 0);
  for (let i = 0; i < 2; i++) {
    slopes = productSlopes(first, second, z * slopes.alongFirst, z * slopes.alongSecond);
  }
  return slopes.logOdds + 0.5 * slopes.bendAcross;
}

/** Log-odds of the product at a place in standard scores, its direction of rise and its bend across that. */
function productSlopes(
  first: GaussianLogOdds,
  second: GaussianLogOdds,
  firstScore: number,
  secondScore: number,
) {
  const firstLogOdds = first.mean + first.sd * firstScore;
  const secondLogOdds = second.mean + second.sd * secondScore;
  const [missedX, missedY] = [sigmoid(-firstLogOdds), sigmoid(-secondLogOdds)];
  const missed = missedX + missedY - missedX * missedY;
  const rise = [(first.sd * missedX) / missed, (second.sd * missedY) / missed] as const;
  const steepness = Math.hypot(...rise);
  const [alongFirst, alongSecond] = [rise[0] / steepness, rise[1] / steepness];
  // Second derivatives of the log-odds: d rise / d score, from those of 1 - X, 1 - Y and 1 - X Y.
  const ofFirst = (rise[0] * (first.sd * (1 - missed - (1 - missedX)))) / missed;
  const ofSecond = (rise[1] * (second.sd * (1 - missed - (1 - missedY)))) / missed;
  const ofBoth = rise[0] * rise[1] * (1 - missed);
  return {
    logOdds: productLogOdds(firstLogOdds, secondLogOdds),
    alongFirst,
    alongSecond,
    bendAcross:
      ofFirst * alongSecond ** 2 +
      ofSecond * alongFirst ** 2 -
      2 * ofBoth * alongFirst * alongSecond,
  };
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
