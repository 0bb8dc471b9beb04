import { describe, expect, it } from 'vitest';
import { normalCdf, normalQuantile } from '../../src/numeric/normal.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { findRoot } from '../../src/numeric/roots.ts';
import { quantile } from '../../src/numeric/summary.ts';
import { theilSen } from '../../src/numeric/trend.ts';

// Source: percentage points of the normal distribution, to the digits that statistical tables print
// (Abramowitz & Stegun, Handbook of Mathematical Functions, 1964, tables 26.5 and 26.6); 0.75, 0.975,
// 0.99 and 0.995 verified in test data of several public libraries, the others from memory.
describe('percentage points', () => {
  it.each([
    [0.75, 0.674489750196082],
    [0.9, 1.2815515655446],
    [0.95, 1.6448536269515],
    [0.975, 1.959963984540054],
    [0.99, 2.326347874040841],
    [0.995, 2.5758293035489],
    [0.999, 3.0902323061678],
  ])('%d lies below %d', (p, z) => {
    expect(normalQuantile(p)).toBeCloseTo(z, 12);
    expect(normalQuantile(1 - p)).toBeCloseTo(-z, 12);
    expect(normalCdf(z)).toBeCloseTo(p, 13);
  });

  it('go there and back from a probability, also far out', () => {
    for (let exponent = 0.5; exponent <= 15; exponent += 0.5) {
      const p = 10 ** -exponent;
      // The distribution keeps 1e-8 of its relative accuracy out there.
      expect(Math.abs(normalCdf(normalQuantile(p)) / p - 1)).toBeLessThan(1e-7);
    }
  });
});

// Source: G. E. Alefeld, F. A. Potra and Y. Shi, Algorithm 748, ACM Trans. Math. Softw. 21 (1995)
// 327-344, table I: functions, brackets and roots; verified in a public copy of the table.
describe('findRoot on the functions of Algorithm 748', () => {
  const poles = (x: number) => {
    let sum = 0;
    for (let i = 1; i <= 20; i++) sum += (2 * i - 5) ** 2 / (x - i * i) ** 3;
    return -2 * sum;
  };
  it.each<[string, (x: number) => number, number, number, number]>([
    ['sin x - x/2', (x) => Math.sin(x) - x / 2, Math.PI / 2, Math.PI, 1.8954942670339809],
    ['poles at 1 and 4', poles, 1 + 1e-9, 4 - 1e-9, 3.022915347273057],
    ['poles at 100 and 121', poles, 100 + 1e-9, 121 - 1e-9, 110.02653274833019],
    ['-200 x e^-3x', (x) => -200 * x * Math.exp(-3 * x), -9, 31, 0],
    ['x^4 - 0.2', (x) => x ** 4 - 0.2, 0, 5, 0.668740304976422],
    ['x^12 - 1', (x) => x ** 12 - 1, -0.95, 4.05, 1],
    [
      '2x e^-20 - 2e^-20x + 1',
      (x) => 2 * x * Math.exp(-20) - 2 * Math.exp(-20 * x) + 1,
      0,
      1,
      0.034657359020853851,
    ],
    ['x^2 - (1 - x)^20', (x) => x ** 2 - (1 - x) ** 20, 0, 1, 0.16492095727644095],
    [
      '(1 + (1-n)^4) x - (1 - nx)^4, n 20',
      (x) => (1 + 19 ** 4) * x - (1 - 20 * x) ** 4,
      0,
      1,
      7.6685951221853367e-6,
    ],
    ['(x - 1) e^-5x + x^5', (x) => (x - 1) * Math.exp(-5 * x) + x ** 5, 0, 1, 0.51615351875793357],
    ['x^(1/9) - 9^(1/9)', (x) => x ** (1 / 9) - 9 ** (1 / 9), 1, 100, 9],
    [
      'flat to the left of 0',
      (x) => (x >= 0 ? x / 1.5 + Math.sin(x) - 1 : -1),
      -10000,
      Math.PI / 2,
      0.62380651896161232,
    ],
  ])('%s', (_, f, low, high, root) => {
    let calls = 0;
    const counted = (x: number) => {
      calls += 1;
      return f(x);
    };
    expect(Math.abs(findRoot(counted, low, high, 1e-13) - root)).toBeLessThan(1e-12);
    // Bisection from the widest of these brackets would take 58 steps.
    expect(calls).toBeLessThan(58);
  });

  it('gives an end at which the function is 0', () => {
    expect(findRoot((x) => x - 2, 2, 5, 1e-9)).toBe(2);
    expect(findRoot((x) => x - 5, 2, 5, 1e-9)).toBe(5);
    expect(findRoot((x) => 2 - x, 2, 5, 1e-9)).toBe(2);
    expect(findRoot(() => 0, 2, 5, 1e-9)).toBe(2);
  });
});

describe('theilSen', () => {
  // Source: the worked example of P. K. Sen, J. Am. Stat. Assoc. 63 (1968) 1379-1389; data and slope
  // verified in the tests of two public statistics libraries. The intercept, the median of y - 4x, is
  // computed here.
  it('has the slope of the published example', () => {
    const line = theilSen([1, 2, 3, 4, 10, 12, 18], [9, 15, 19, 20, 45, 55, 78]);
    expect(line.slope).toBe(4);
    expect(line.intercept).toBe(6);
  });

  it('leaves out pairs with one x', () => {
    // Slopes: 3, 1 and 2 from (0, 0) to the three at x = 1, whose own pairs have none.
    expect(theilSen([0, 1, 1, 1], [0, 3, 1, 2]).slope).toBe(2);
  });

  it('takes the mean of the middle two of an even number of slopes', () => {
    // Slopes: 1 and 3; six slopes of which the middle two are 2 and 23.
    expect(theilSen([0, 1, 1], [0, 3, 1]).slope).toBe(2);
    expect(theilSen([0, 1, 2, 3], [1, 3, 5, 70]).slope).toBe(12.5);
  });

  it('turns with its data: y scaled and moved, x mirrored', () => {
    const { normal } = seededGenerator(21);
    const x = Array.from({ length: 15 }, (_, i) => i + 0.3 * normal());
    const y = x.map((at) => 2 - 0.4 * at + normal());
    const plain = theilSen(x, y);
    const moved = theilSen(
      x.map((at) => -at),
      y.map((at) => 10 + 3 * at),
    );
    expect(moved.slope).toBeCloseTo(-3 * plain.slope, 12);
    expect(moved.intercept).toBeCloseTo(10 + 3 * plain.intercept, 10);
  });
});

// Definition 7 of Hyndman & Fan 1996 by its formula, computed here: (1 - g) x[j] + g x[j + 1], where
// j + g = 1 + (n - 1) p.
it('quantile follows its definition for every n and p, and never leaves the values', () => {
  const { normal } = seededGenerator(22);
  for (let n = 1; n <= 12; n++) {
    const values = Array.from({ length: n }, normal);
    const sorted = [...values].sort((a, b) => a - b);
    for (let p = 0; p <= 1; p += 1 / 64) {
      const rank = (n - 1) * p;
      const below = Math.floor(rank);
      const above = sorted[Math.min(n - 1, below + 1)];
      const expected = sorted[below] + (rank - below) * (above - sorted[below]);
      expect(quantile(values, p)).toBeCloseTo(expected, 13);
    }
  }
});

describe('seededGenerator', () => {
  const { normal, uniform } = seededGenerator(20);
  const NUMBERS = 100_000;

  // Kolmogorov's limit law: sqrt(n) D exceeds 1.95 once in a thousand (Kolmogorov 1933; 2 exp(-2 x^2)).
  it.each([
    ['uniform', uniform, (x: number) => x],
    ['normal', normal, normalCdf],
  ])('is %s by the Kolmogorov-Smirnov test', (_, draw, cdf) => {
    const values = Float64Array.from({ length: NUMBERS }, draw).sort();
    const distance = values.reduce((most, value, i) => {
      const p = cdf(value);
      return Math.max(most, p - i / NUMBERS, (i + 1) / NUMBERS - p);
    }, 0);
    expect(Math.sqrt(NUMBERS) * distance).toBeLessThan(1.95);
  });

  // Pairs of neighbours on a 10 x 10 grid: chi-squared with 99 degrees of freedom exceeds 148.2 once
  // in a thousand (from memory; mean 99, sd 14.1).
  it('has independent neighbours', () => {
    const counts = new Array<number>(100).fill(0);
    for (let i = 0; i < NUMBERS; i++) {
      counts[10 * Math.floor(10 * uniform()) + Math.floor(10 * uniform())] += 1;
    }
    const expected = NUMBERS / 100;
    const chiSquared = counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
    expect(chiSquared).toBeLessThan(148.2);
    expect(chiSquared).toBeGreaterThan(60);
  });

  it('stays on [0, 1) and finite', () => {
    for (let i = 0; i < 1000; i++) {
      const u = uniform();
      expect(u >= 0 && u < 1).toBe(true);
      expect(Number.isFinite(normal())).toBe(true);
    }
  });
});
