import { describe, expect, it } from 'vitest';
import { productTail } from '../../src/numeric/product-tail.ts';
import type { GaussianLogOdds } from '../../src/numeric/logistic-normal.ts';
import { log1pExp, sigmoid } from '../../src/numeric/logistic.ts';
import { normalCdf, normalDensity } from '../../src/numeric/normal.ts';

const PAIRS: (readonly [GaussianLogOdds, GaussianLogOdds])[] = [
  [
    { mean: 0, sd: 1 },
    { mean: 1, sd: 0.5 },
  ],
  [
    { mean: 3, sd: 0.3 },
    { mean: -2, sd: 2 },
  ],
  [
    { mean: -4, sd: 1.5 },
    { mean: 6, sd: 3 },
  ],
  [
    { mean: 8, sd: 0.1 },
    { mean: 0.5, sd: 0.1 },
  ],
];

/** P(XY > q) by a fine sum over the standard score of X: plain, slow, and by another substitution. */
function plainTail(logOddsOfQ: number, [x, y]: (typeof PAIRS)[number]): number {
  const least = (logOddsOfQ - x.mean) / x.sd;
  const [from, to] = [Math.max(least, -9), 9];
  const cells = 200_000;
  let sum = 0;
  for (let i = 0; i < cells; i++) {
    const z = from + ((i + 0.5) * (to - from)) / cells;
    const share = Math.exp(log1pExp(-x.mean - x.sd * z) - log1pExp(-logOddsOfQ));
    if (share >= 1) continue;
    const needed = Math.log(share) - Math.log1p(-share);
    sum += normalDensity(z) * normalCdf((y.mean - needed) / y.sd);
  }
  return (sum * (to - from)) / cells;
}

describe('share of the products above a place', () => {
  it.each(PAIRS.flatMap((pair) => [-3, -0.5, 0.5].map((at) => ({ pair, at }))))(
    'at log-odds $at agrees with a plain sum, and its derivatives with differences',
    ({ pair, at }) => {
      const tail = productTail(at, ...pair)!;
      expect(tail.above).toBeCloseTo(plainTail(at, pair), 6);
      const step = 1e-4;
      const [low, high] = [productTail(at - step, ...pair)!, productTail(at + step, ...pair)!];
      expect(tail.density).toBeCloseTo((low.above - high.above) / (2 * step), 4);
      expect(tail.slope).toBeCloseTo((high.density - low.density) / (2 * step), 4);
    },
  );

  it('is 0 above what the first can reach and gives up where too many nodes would be needed', () => {
    expect(productTail(20, { mean: -20, sd: 0.1 }, { mean: 0, sd: 1 })!.above).toBe(0);
    expect(productTail(-1, { mean: 0, sd: 1 }, { mean: 0, sd: 1e-4 })).toBeUndefined();
  });

  it('is the share of one where the other is all but certain', () => {
    const sure = { mean: 60, sd: 0.5 };
    const above = productTail(0.3, { mean: 0.2, sd: 0.7 }, sure)!.above;
    expect(above).toBeCloseTo(1 - normalCdf((0.3 - 0.2) / 0.7), 8);
    expect(sigmoid(60 - 10)).toBeCloseTo(1, 12);
  });
});
