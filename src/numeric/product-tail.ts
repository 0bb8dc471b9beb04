import { log1pExp, sigmoid } from './logistic.ts';
import { normalTailFrom } from './normal.ts';

/** How the product of two probabilities with Gaussian log-odds is spread, seen from one place. */
export interface ProductTail {
  /** Share of the products above the place. */
  readonly above: number;
  /** Density there, per unit of the product's log-odds. */
  readonly density: number;
  /** Slope of the density, per unit of the product's log-odds. */
  readonly slope: number;
}

interface Gaussian {
  readonly mean: number;
  readonly sd: number;
}

/** What lies beyond so many sds, 2e-10 of either, is left out. */
const FARTHEST_SDS = 6.3;
/** Of the sd of what bends fastest: an error of about exp(-2 pi^2 / 0.75^2) = 6e-16 for a Gaussian alone. */
const STEP_SDS = 0.75;
/** Poles lie pi off the real line: exp(-2 pi^2 / 0.72) = 1e-12 is left. */
const WIDEST_STEP = 0.72;
/** Where more nodes would be needed another method must do. */
const MOST_CELLS = 500;
/** Beyond these odds overflow. */
const MOST_LOG_ODDS = 600;

/**
 * Share of the products X Y above q, with its first two derivatives.
 *
 * P(X Y > q) is the integral over X > q of P(Y > q / X). With v = ln((X - q) / (1 - X)) the log-odds of X are
 * ln((q + e^v) / (1 - q)) and those of q / X are ln(q (1 + e^-v) / (1 - q)): both smooth, so the trapezoidal
 * rule converges exponentially. Towards lower v the log-odds of q / X rise as -v and leave those of Y, towards
 * higher v those of X rise as v: so few nodes hold all of it. At a fixed X the log-odds of q / X rise with those of
 * q by 1 + q e^-v, which cancels the slope of X in v: the density is the plain product of both.
 *
 * @param logOddsOfQ - place, as log-odds; from -200 to 30
 * @param first - mean and sd of the log-odds of X, sd > 0
 * @param second - of Y, independent of X, sd > 0
 * @returns share, density and slope, each to about 1e-9; undefined where too many nodes would be needed
 *
 * Source: the definition; rule and error as for `normalMean`.
 */
export function productTail(
  logOddsOfQ: number,
  first: Gaussian,
  second: Gaussian,
): ProductTail | undefined {
  const q = sigmoid(logOddsOfQ);
  const log1MinusQ = -log1pExp(logOddsOfQ);
  const [low, high] = reach(logOddsOfQ, first, second);
  if (!(high > low)) return { above: 0, density: 0, slope: 0 };
  // X bends most at the upper end and Y at the lower one; at the other ends both are as good as constant.
  const fine = Math.min(
    first.sd * (1 + q * Math.exp(-high)),
    second.sd * (1 + Math.exp(low)),
    WIDEST_STEP / STEP_SDS,
  );
  const cells = Math.ceil((high - low) / (STEP_SDS * fine));
  if (!(cells <= MOST_CELLS && high < MOST_LOG_ODDS)) return undefined;
  const step = (high - low) / cells;
  const growth = Math.exp(step);
  const perX = 1 / first.sd;
  const perY = 1 / second.sd;
  const startX = (-log1MinusQ - first.mean) * perX;
  const startY = (logOddsOfQ - second.mean) * perY;
  let above = 0;
  let density = 0;
  let slope = 0;
  let odds = Math.exp(low);
  for (let i = 0; i <= cells; i++) {
    const plusQ = odds + q;
    const plus1 = odds + 1;
    const perPlusQ = 1 / plusQ;
    const x = startX + perX * Math.log(plusQ);
    const y = startY + perY * (Math.log(plus1) - (low + i * step));
    const ofBoth = Math.exp(-0.5 * (x * x + y * y));
    const over =
      y > 0 ? normalTailFrom(y, ofBoth) : Math.exp(-0.5 * x * x) - normalTailFrom(-y, ofBoth);
    above += odds * perPlusQ * over;
    density += ofBoth;
    slope -= ofBoth * (x * perX * q * plus1 * perPlusQ + y * perY);
    odds *= growth;
  }
  const ofX = (step * perX) / Math.sqrt(2 * Math.PI);
  const ofXAndY = (step * perX * perY) / (2 * Math.PI);
  return { above: above * ofX, density: density * ofXAndY, slope: slope * ofXAndY };
}

/** Where v runs: X within its sds, and q / X below what Y can reach. */
function reach(logOddsOfQ: number, first: Gaussian, second: Gaussian): readonly [number, number] {
  const [logQ, log1MinusQ] = [-log1pExp(-logOddsOfQ), -log1pExp(logOddsOfQ)];
  // ln((X - q) / (1 - X)) from the log-odds of X: all in logarithms, since odds would overflow or vanish.
  const atX = (logOdds: number) => {
    const sum = logOdds + log1MinusQ;
    return sum > logQ ? sum + Math.log1p(-Math.exp(logQ - sum)) : -Infinity;
  };
  const room = second.mean + FARTHEST_SDS * second.sd - logOddsOfQ;
  const lowestY = room > 0 ? -room - Math.log1p(-Math.exp(-room)) : Infinity;
  const lowestX = atX(first.mean - FARTHEST_SDS * first.sd);
  return [Math.max(lowestX, lowestY), atX(first.mean + FARTHEST_SDS * first.sd)];
}
