import { log1pExp, sigmoid } from './logistic.ts';
import { normalCdf, normalCdfFrom, normalDensity, normalQuantile } from './normal.ts';
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
  // P(XY < xy) <= P(X < x) + P(Y < y): the quantile lies between these two products.
  const bound = (each: number) => {
    const z = normalQuantile(each);
    return productLogOdds(outer.mean + outer.sd * z, inner.mean + inner.sd * z);
  };
  const bracket = [bound(p / 2), bound((1 + p) / 2)] as const;
  const start = linearisedQuantile(outer, inner, normalQuantile(p));
  const quick = newtonQuantile(outer, inner, p, bracket, start);
  if (quick !== undefined) return sigmoid(quick);
  const excess = (logOddsOfProduct: number) => productCdf(logOddsOfProduct, outer, inner) - p;
  return sigmoid(findRoot(excess, ...bracket, 1e-9));
}

/** The quantile if the product's log-odds were linear in those of both. */
function linearisedQuantile(first: GaussianLogOdds, second: GaussianLogOdds, z: number): number {
  const logOdds = productLogOdds(first.mean, second.mean);
  const missed = sigmoid(-logOdds);
  if (missed === 0) return logOdds;
  const [ofFirst, ofSecond] = [sigmoid(-first.mean) / missed, sigmoid(-second.mean) / missed];
  return logOdds + z * Math.hypot(ofFirst * first.sd, ofSecond * second.sd);
}

/** Newton's steps are quadratic: after one so small the next is lost in rounding. */
const SMALL_STEP = 1e-7;
const MOST_STEPS = 30;

/** Newton's method within a bracket; undefined where it does not settle or the odds would underflow. */
function newtonQuantile(
  outer: GaussianLogOdds,
  inner: GaussianLogOdds,
  p: number,
  [lowest, highest]: readonly [number, number],
  start: number,
): number | undefined {
  if (lowest < QUICK_LOG_ODDS[0] || highest > QUICK_LOG_ODDS[1]) return undefined;
  let [low, high] = [lowest, highest];
  let at = Math.min(Math.max(start, low), high);
  for (let step = 0; step < MOST_STEPS; step++) {
    const { share, density } = quickCdf(at, outer, inner);
    const excess = share - p;
    if (excess > 0) high = at;
    else low = at;
    const next = at - excess / density;
    const isInside = next > low && next < high;
    const moved = isInside ? next : (low + high) / 2;
    if (Math.abs(moved - at) < SMALL_STEP && isInside) return moved;
    if (high - low < 1e-9) return moved;
    at = moved;
  }
  return undefined;
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

/** Between these the odds and what is left of 1 are far from underflow. */
const QUICK_LOG_ODDS = [-200, 30] as const;
/** An error of exp(-2 pi^2 / 0.7) = 6e-13; beyond 7 sds 3e-12 is left. */
const QUICK_STEP = 0.7;
const QUICK_SDS = 7;

/**
 * The product's distribution as in `productCdf`, and its density per unit of log-odds, from odds instead of
 * their logarithms: two exponentials and two logarithms a node. With y the log-odds of q / X, dy / d(log-odds
 * of q) is 1 + q e^-v, which cancels the share of v in dx: the density is the plain product of both.
 */
function quickCdf(
  logOddsOfQ: number,
  outer: GaussianLogOdds,
  inner: GaussianLogOdds,
): { readonly share: number; readonly density: number } {
  const q = sigmoid(logOddsOfQ);
  const log1MinusQ = -log1pExp(logOddsOfQ);
  const logQ = -log1pExp(-logOddsOfQ);
  const below = normalCdf((logOddsOfQ - outer.mean) / outer.sd);
  const vAt = (logOdds: number) => {
    const sum = logOdds + log1MinusQ;
    return sum > logQ ? sum + Math.log1p(-Math.exp(logQ - sum)) : -Infinity;
  };
  const low = Math.max(LOWEST_V + Math.min(0, logQ), vAt(outer.mean - QUICK_SDS * outer.sd));
  const high = vAt(outer.mean + QUICK_SDS * outer.sd);
  if (!(high > low)) return { share: below, density: 0 };
  const widest = Math.min(0.8 * outer.sd, Math.max(QUICK_STEP, outer.sd / 100));
  const cells = Math.ceil((high - low) / widest);
  const step = (high - low) / cells;
  let share = 0;
  let density = 0;
  for (let i = 0; i <= cells; i++) {
    const odds = Math.exp(low + i * step);
    const x = (Math.log(odds + q) - log1MinusQ - outer.mean) / outer.sd;
    const y = (logOddsOfQ + Math.log1p(1 / odds) - inner.mean) / inner.sd;
    const ofX = Math.exp(-0.5 * x * x);
    const ofY = Math.exp(-0.5 * y * y);
    share += ofX * (odds / (odds + q)) * normalCdfFrom(y, ofY);
    density += ofX * ofY;
  }
  const scale = step / (outer.sd * Math.sqrt(2 * Math.PI));
  return {
    share: below + share * scale,
    density: (density * scale) / (inner.sd * Math.sqrt(2 * Math.PI)),
  };
}
