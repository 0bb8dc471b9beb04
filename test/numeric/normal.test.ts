import { describe, expect, it } from 'vitest';
import { normalCdf, normalDensity, normalQuantile } from '../../src/numeric/normal.ts';

// Source: M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 1964, table 26.1
// (P(x) to ten places and more); values from memory, checked here against a dense integral as well.
const TABLE = [
  [0, 0.5],
  [0.5, 0.6914624613],
  [1, 0.8413447461],
  [1.5, 0.9331927987],
  [2, 0.9772498681],
  [3, 0.998650102],
] as const;

/** Simpson's rule from 0, independent of the rational approximations. */
function integral(z: number): number {
  const cells = 20000;
  const h = z / cells;
  let sum = normalDensity(0) + normalDensity(z);
  for (let i = 1; i < cells; i++) sum += (i % 2 === 1 ? 4 : 2) * normalDensity(i * h);
  return 0.5 + (sum * h) / 3;
}

describe('normalCdf', () => {
  it.each(TABLE)('at %d is the tabulated %d', (z, p) => {
    expect(normalCdf(z)).toBeCloseTo(p, 10); // last printed digit
  });

  it.each([0.1, 0.77, 1.9, 3.3, 5, 6.9, 7.2])('agrees with a dense integral at %d', (z) => {
    expect(Math.abs(normalCdf(z) - integral(z))).toBeLessThan(2e-14);
  });

  // Source: the asymptotic series of Mills' ratio, Abramowitz & Stegun 26.2.12.
  it.each([8, 12, 20, 30])('keeps its relative accuracy far out, at -%d', (z) => {
    const series = [1, -1, 3, -15, 105, -945, 10395].reduce(
      (sum, c, k) => sum + c / z ** (2 * k),
      0,
    );
    const expected = (normalDensity(z) / z) * series;
    expect(Math.abs(normalCdf(-z) / expected - 1)).toBeLessThan(135135 / z ** 14 + 1e-7);
  });

  it('has 0 and 1 at the ends, and halves that add to 1', () => {
    expect(normalCdf(-40)).toBe(0);
    expect(normalCdf(40)).toBe(1);
    for (const z of [0.3, 2.7, 6]) expect(normalCdf(z) + normalCdf(-z)).toBeCloseTo(1, 15);
  });
});

describe('normalQuantile', () => {
  // Source: M. J. Wichura, Applied Statistics 37 (1988) 477-484, the check values of AS 241 PPND16
  // (from memory).
  it.each([
    [0.25, -0.6744897501960817],
    [0.001, -3.090232306167814],
    [1e-20, -9.262340089798408],
  ])('of %d is the published check value', (p, z) => {
    expect(Math.abs(normalQuantile(p) / z - 1)).toBeLessThan(1e-15);
  });

  it('is the inverse of the distribution', () => {
    for (let z = -7; z <= 5; z += 0.37) {
      expect(Math.abs(normalQuantile(normalCdf(z)) - z)).toBeLessThan(1e-9);
    }
  });

  it('is infinite at the ends and refuses what is no probability', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(() => normalQuantile(1.1)).toThrow('p must be from 0 to 1, got 1.1');
    expect(() => normalQuantile(Number.NaN)).toThrow(RangeError);
  });
});
