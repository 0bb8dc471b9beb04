import { describe, expect, it } from 'vitest';
import {
  probabilityQuantile,
  productQuantile,
  type GaussianLogOdds,
} from '../../src/numeric/logistic-normal.ts';
import { log1pExp, sigmoid } from '../../src/numeric/logistic.ts';
import { normalCdf, normalDensity } from '../../src/numeric/normal.ts';

/** Widest step in the logarithm of the distance above the least possible score. */
const STEP = 0.005;
const FARTHEST = 9;

/**
 * P(XY <= q) by a dense sum over the standard score of the surer one, from the least at which q can
 * still be reached. With X = sigmoid(a + s t), a = logit q, the log-odds of q / X are
 * ln(1 + e^(a + s t)) - ln(e^(s t) - 1); t runs in even steps of its logarithm.
 */
function denseCdf(q: number, one: GaussianLogOdds, other: GaussianLogOdds): number {
  const [surer, wider] = one.sd < other.sd ? [one, other] : [other, one];
  if (q <= 0) return 0;
  if (q >= 1) return 1;
  const logOddsOfQ = Math.log(q) - Math.log1p(-q);
  const least = (logOddsOfQ - surer.mean) / surer.sd;
  if (least > FARTHEST) return 1;
  const from = Math.max(Math.log(1e-16), Math.log(Math.max(0, -FARTHEST - least)));
  const to = Math.log(FARTHEST - least);
  // Far from the end, even steps of the logarithm must also be short beside a standard score.
  const step = Math.min(STEP, 0.2 / (FARTHEST - least));
  let sum = 0;
  for (let logT = from; logT < to; logT += step) {
    const t = Math.exp(logT);
    const above = surer.sd * t;
    const logExcess = above > 30 ? above : Math.log(Math.expm1(above));
    const needed = log1pExp(logOddsOfQ + above) - logExcess;
    sum += t * normalDensity(least + t) * normalCdf((needed - wider.mean) / wider.sd);
  }
  return normalCdf(least) + sum * step;
}

const SDS = [0.02, 0.1, 0.4, 0.75, 1.5, 5, 12];
const MEANS = [-8, -2, 0, 1, 8];
/** Every seventh combination: all sds meet all sds, all means all means. */
const CASES = SDS.flatMap((s) =>
  SDS.flatMap((t) =>
    MEANS.flatMap((a) =>
      MEANS.map(
        (b) =>
          [
            { mean: a, sd: s },
            { mean: b, sd: t },
          ] as const,
      ),
    ),
  ),
).filter((_, i) => i % 7 === 0);

describe('productQuantile', () => {
  it.each([0.05, 0.5, 0.95])('is exact to 1e-8 for p = %d and sds of 0.02 to 12', (p) => {
    for (const [first, second] of CASES) {
      const q = productQuantile(first, second, p);
      // The distribution rises through p between q - 1e-8 and q + 1e-8.
      expect(denseCdf(q - 1e-8, first, second) - p).toBeLessThan(1e-9);
      expect(denseCdf(q + 1e-8, first, second) - p).toBeGreaterThan(-1e-9);
    }
  });

  it('lies between the products that bound it, and below each factor alone', () => {
    for (const [first, second] of CASES) {
      for (const p of [0.05, 0.95]) {
        const q = productQuantile(first, second, p);
        const both = (each: number) =>
          probabilityQuantile(first, each) * probabilityQuantile(second, each);
        expect(q).toBeGreaterThanOrEqual(both(p / 2) * (1 - 1e-9));
        expect(q).toBeLessThanOrEqual(both((1 + p) / 2) * (1 + 1e-9));
        // XY <= X: a product is never likelier to be high than one of its factors.
        expect(q).toBeLessThanOrEqual(probabilityQuantile(first, p) * (1 + 1e-9));
        expect(q).toBeLessThanOrEqual(probabilityQuantile(second, p) * (1 + 1e-9));
      }
    }
  });

  it('rises with p and with either mean', () => {
    const at = (mean: number, p: number) =>
      productQuantile({ mean, sd: 1.3 }, { mean: 0.4, sd: 0.6 }, p);
    const ps = [0.01, 0.05, 0.2, 0.5, 0.8, 0.95, 0.99].map((p) => at(0.7, p));
    expect([...ps].sort((a, b) => a - b)).toEqual(ps);
    const means = [-4, -1, 0, 1, 4].map((mean) => at(mean, 0.05));
    expect([...means].sort((a, b) => a - b)).toEqual(means);
  });

  it('of two that are as good as equal to 1 and 0 is the other, or 0', () => {
    const open = { mean: 0.3, sd: 0.9 };
    const sure = { mean: 60, sd: 0.5 };
    expect(productQuantile(sure, open, 0.95)).toBeCloseTo(probabilityQuantile(open, 0.95), 9);
    expect(productQuantile({ mean: -60, sd: 0.5 }, open, 0.95)).toBeLessThan(1e-24);
    expect(productQuantile({ mean: 2, sd: 0 }, { mean: -1, sd: 0 }, 0.95)).toBe(
      sigmoid(2) * sigmoid(-1),
    );
  });
});
