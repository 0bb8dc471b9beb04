import { describe, expect, it } from 'vitest';
import {
  probabilityQuantile,
  productQuantile,
  type GaussianLogOdds,
} from '../../src/numeric/logistic-normal.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { normalCdf, normalDensity } from '../../src/numeric/normal.ts';
import { seededGenerator } from '../../src/numeric/random.ts';

/**
 * P(XY <= q) by the midpoint rule over both standard scores: the plainest integral there is, with
 * nothing in common with the code but the definition. Good to about 1e-4 with these cells.
 */
function plainCdf(q: number, first: GaussianLogOdds, second: GaussianLogOdds): number {
  const h = 0.004;
  let sum = 0;
  for (let z = -7 + h / 2; z < 7; z += h) {
    const x = sigmoid(first.mean + first.sd * z);
    const needed = Math.min(1, q / x);
    const score = (Math.log(needed / (1 - needed)) - second.mean) / second.sd;
    sum += normalDensity(z) * h * (needed >= 1 ? 1 : normalCdf(score));
  }
  return sum;
}

const MEANS = [-3, 0, 2] as const;
const SDS = [0.05, 0.4, 1, 3] as const;
const PAIRS = MEANS.flatMap((a) =>
  SDS.flatMap((s) =>
    SDS.map(
      (t) =>
        [
          { mean: a, sd: s },
          { mean: 0.7 - a / 2, sd: t },
        ] as const,
    ),
  ),
);

describe('productQuantile', () => {
  it.each([0.05, 0.5, 0.95])('solves the plain integral for p = %d', (p) => {
    for (const [first, second] of PAIRS) {
      const q = productQuantile(first, second, p);
      expect(Math.abs(plainCdf(q, first, second) - p)).toBeLessThan(2e-3);
    }
  });

  it('is the same whichever is called the first', () => {
    for (const [first, second] of PAIRS) {
      const one = productQuantile(first, second, 0.05);
      const other = productQuantile(second, first, 0.05);
      expect(Math.abs(one - other)).toBeLessThan(1e-10);
    }
  });

  it('does not care which of two equally wide ones it integrates over', () => {
    const narrow = { mean: 1.3, sd: 0.999999999 };
    const wide = { mean: -0.4, sd: 1 };
    const turned = [
      { ...narrow, sd: 1 },
      { ...wide, sd: 0.999999999 },
    ] as const;
    expect(productQuantile(narrow, wide, 0.9)).toBeCloseTo(productQuantile(...turned, 0.9), 8);
  });

  it('agrees with a million draws', () => {
    const { normal } = seededGenerator(11);
    const draws = Float64Array.from(
      { length: 1_000_000 },
      () => sigmoid(0.8 + 1.2 * normal()) * sigmoid(-0.5 + 0.7 * normal()),
    ).sort();
    for (const p of [0.05, 0.95]) {
      const q = productQuantile({ mean: 0.8, sd: 1.2 }, { mean: -0.5, sd: 0.7 }, p);
      expect(Math.abs(q - draws[Math.round(p * draws.length)])).toBeLessThan(1e-3);
    }
  });

  it('with one of them known is the other one scaled', () => {
    const known = { mean: 1, sd: 0 };
    const open = { mean: -0.3, sd: 0.8 };
    const expected = sigmoid(1) * probabilityQuantile(open, 0.95);
    expect(productQuantile(known, open, 0.95)).toBeCloseTo(expected, 12);
    expect(productQuantile(known, { mean: 2, sd: 0 }, 0.05)).toBe(sigmoid(1) * sigmoid(2));
    // A limit: nearly known is near to it.
    expect(productQuantile({ mean: 1, sd: 1e-3 }, open, 0.95)).toBeCloseTo(expected, 5);
  });

  it('stays within [0, 1] where both are as good as certain or unknown', () => {
    for (const [a, s] of [
      [40, 1],
      [-40, 1],
      [0, 60],
      [300, 20],
    ] as const) {
      const [low, high] = [0.05, 0.95].map((p) =>
        productQuantile({ mean: a, sd: s }, { mean: -a, sd: 2 * s }, p),
      ) as [number, number];
      expect(low).toBeGreaterThanOrEqual(0);
      expect(high).toBeLessThanOrEqual(1);
      expect(low).toBeLessThanOrEqual(high);
    }
  });
});
