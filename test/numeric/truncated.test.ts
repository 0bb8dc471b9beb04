import { describe, expect, it } from 'vitest';
import { normalDensity } from '../../src/numeric/normal.ts';
import { truncatedBelow } from '../../src/numeric/truncated.ts';

/** Moments by a fine sum over the part above the bound. */
function plainMoments(mean: number, sd: number, least: number) {
  const from = Math.max(least, mean - 9 * sd);
  // Far above the mean the density falls within sd^2 / (least - mean).
  const to = Math.max(mean + 9 * sd, least + (40 * sd * sd) / Math.max(sd, least - mean));
  const cells = 100_000;
  const step = (to - from) / cells;
  const peak = Math.max(0, (least - mean) / sd);
  const sums = [0, 0, 0];
  for (let i = 0; i < cells; i++) {
    const x = from + (i + 0.5) * step;
    const z = (x - mean) / sd;
    const share = Math.exp(-0.5 * (z * z - peak * peak));
    [1, x - least, (x - least) ** 2].forEach((power, k) => (sums[k] += power * share));
  }
  const first = sums[1] / sums[0];
  return { mean: least + first, variance: sums[2] / sums[0] - first ** 2 };
}

describe('a normal variable known not to be below a bound', () => {
  it.each([
    [0, 1, 0],
    [2, 0.5, 0],
    [-1, 1, 0],
    [-3, 0.7, 0.4],
    [-19, 1, 0],
    [-21, 1, 0],
    [-80, 2, 1],
    [5, 1, -9],
  ])('mean %d, sd %d, bound %d: moments of a plain sum', (mean, sd, least) => {
    const known = truncatedBelow(mean, sd, least);
    const plain = plainMoments(mean, sd, least);
    expect((known.mean - plain.mean) / sd).toBeCloseTo(0, 7);
    expect(known.variance / plain.variance).toBeCloseTo(1, 4);
  });

  it('half a normal: sqrt(2 / pi) and 1 - 2 / pi', () => {
    const { mean, variance } = truncatedBelow(0, 1, 0);
    expect(mean).toBeCloseTo(Math.sqrt(2 / Math.PI), 12);
    expect(variance).toBeCloseTo(1 - 2 / Math.PI, 12);
    expect(normalDensity(0)).toBeCloseTo(mean / 2, 12);
  });

  it('moves smoothly where the series takes over', () => {
    const [before, after] = [truncatedBelow(-19.999, 1, 0), truncatedBelow(-20.001, 1, 0)];
    expect(before.mean - after.mean).toBeGreaterThan(0);
    expect(before.mean - after.mean).toBeLessThan(1e-5);
    expect(Math.abs(before.variance / after.variance - 1)).toBeLessThan(1e-3);
  });
});
