import { Matrix, CholeskyDecomposition, inverse } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import {
  choleskyFactor,
  choleskyInverse,
  choleskyLogDeterminant,
  choleskySolve,
  lowerIndex,
  quadraticForm,
} from '../../src/numeric/linalg.ts';
import { normalMean } from '../../src/numeric/quadrature.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { findRoot } from '../../src/numeric/roots.ts';
import { mean, median, quantile, sampleSd } from '../../src/numeric/summary.ts';
import { theilSen } from '../../src/numeric/trend.ts';

/** A symmetric positive definite matrix, as lower triangle and as full matrix. */
function aCovariance(size: number, seed: number): { lower: Float64Array; full: Matrix } {
  const { normal } = seededGenerator(seed);
  const factor = new Matrix(
    Array.from({ length: size }, () => Array.from({ length: size }, normal)),
  );
  const full = factor.mmul(factor.transpose()).add(Matrix.eye(size).mul(0.1));
  const lower = new Float64Array(lowerIndex(size, 0));
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) lower[lowerIndex(i, j)] = full.get(i, j);
  }
  return { lower, full };
}

// Second opinion: ml-matrix, a general-purpose library.
describe.each([1, 2, 7, 24])('linear algebra of %d rows against ml-matrix', (size) => {
  const { lower, full } = aCovariance(size, size);
  const factor = choleskyFactor(lower, size);

  it('factors', () => {
    const theirs = new CholeskyDecomposition(full.clone()).lowerTriangularMatrix;
    for (let i = 0; i < size; i++) {
      for (let j = 0; j <= i; j++)
        expect(factor[lowerIndex(i, j)]).toBeCloseTo(theirs.get(i, j), 10);
    }
  });

  it('solves and inverts', () => {
    const right = Array.from({ length: size }, (_, i) => i - 1.5);
    const solution = choleskySolve(factor, right);
    const back = full.mmul(Matrix.columnVector(Array.from(solution))).to1DArray();
    back.forEach((value, i) => {
      expect(value).toBeCloseTo(right[i], 9);
    });
    const theirs = inverse(full);
    const ours = choleskyInverse(factor, size);
    for (let i = 0; i < size; i++) {
      for (let j = 0; j <= i; j++) {
        expect(Math.abs(ours[lowerIndex(i, j)] - theirs.get(i, j))).toBeLessThan(1e-8);
      }
    }
  });

  it('has the determinant and the quadratic form', () => {
    const eigenvalueProduct = new CholeskyDecomposition(full.clone()).lowerTriangularMatrix
      .diagonal()
      .reduce((product, d) => product * d * d, 1);
    expect(choleskyLogDeterminant(factor, size)).toBeCloseTo(Math.log(eigenvalueProduct), 9);
    const x = Array.from({ length: size }, (_, i) => Math.cos(i));
    const column = Matrix.columnVector(x);
    const theirs = column.transpose().mmul(full).mmul(column).get(0, 0);
    expect(quadraticForm(lower, x)).toBeCloseTo(theirs, 9);
  });
});

it('refuses a matrix that is not positive definite, naming the pivot', () => {
  expect(() => choleskyFactor(Float64Array.of(1, 2, 1), 2)).toThrow('pivot 1 is -3');
  expect(() => choleskyFactor(Float64Array.of(Number.NaN), 1)).toThrow(RangeError);
});

describe('normalMean', () => {
  // Moments of the standard normal: 1, 0, 1, 0, 3, 0, 15; mean of exp(z) is sqrt(e).
  it.each([
    [0, 1],
    [1, 0],
    [2, 1],
    [4, 3],
    [6, 15],
  ])('has moment %d equal to %d', (power, moment) => {
    expect(normalMean((z) => z ** power, 0.5)).toBeCloseTo(moment, 10);
  });

  it('has the mean of exp(z)', () => {
    expect(normalMean(Math.exp, 0.5)).toBeCloseTo(Math.sqrt(Math.E), 12);
  });

  it('refuses a step that is none', () => {
    expect(() => normalMean(() => 1, 0)).toThrow('step must be > 0, got 0');
  });
});

describe('findRoot', () => {
  // Test functions with known roots: sqrt 2, cos x = x (0.7390851332151607), and Wilkinson's cubic
  // x^3 - 2x - 5 (2.0945514815423265), from memory.
  it.each([
    ['x^2 - 2', (x: number) => x * x - 2, 0, 2, Math.SQRT2],
    ['cos x - x', (x: number) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ['x^3 - 2x - 5', (x: number) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ['a steep step', (x: number) => Math.tanh(1e4 * (x - 0.3)), -5, 8, 0.3],
    ['a flat foot', (x: number) => (x - 1) ** 9, -3, 2.5, 1],
  ])('finds the root of %s', (name, f, low, high, root) => {
    const tolerance = name === 'a flat foot' ? 1e-2 : 1e-12;
    expect(Math.abs(findRoot(f, low, high, 1e-13) - root)).toBeLessThan(tolerance);
    expect(Math.abs(findRoot(f, high, low, 1e-13) - root)).toBeLessThan(tolerance);
  });

  it('gives the end nearer to zero where there is no change of sign', () => {
    expect(findRoot((x) => x + 1, 0, 5, 1e-9)).toBe(0);
    expect(findRoot((x) => -x - 1, -9, -3, 1e-9)).toBe(-3);
  });

  it('takes few steps on a smooth function', () => {
    let calls = 0;
    findRoot(
      (x) => {
        calls += 1;
        return Math.exp(x) - 5;
      },
      0,
      10,
      1e-10,
    );
    expect(calls).toBeLessThan(20);
  });
});

describe('theilSen', () => {
  it('is the median of all slopes of pairs (Sen 1968), by brute force', () => {
    const { normal } = seededGenerator(4);
    const x = Array.from({ length: 15 }, (_, i) => i);
    const y = x.map((at) => 5 - 0.08 * at + 0.1 * normal());
    const slopes = x.flatMap((a, i) =>
      x.slice(i + 1).map((b, k) => (y[i + 1 + k] - y[i]) / (b - a)),
    );
    slopes.sort((a, b) => a - b);
    expect(theilSen(x, y).slope).toBeCloseTo(slopes[(slopes.length - 1) / 2], 12);
  });

  it('does not follow wild points', () => {
    const x = Array.from({ length: 11 }, (_, i) => i);
    const y = x.map((at) => (at % 5 === 3 ? 50 : 1 + 2 * at));
    expect(theilSen(x, y).slope).toBeCloseTo(2, 12);
    expect(theilSen(x, y).intercept).toBeCloseTo(1, 12);
  });

  it('refuses lists that make no line', () => {
    expect(() => theilSen([1, 1], [2, 3])).toThrow('at least two different values');
    expect(() => theilSen([1, 2], [2])).toThrow('equally long, got 2 and 1');
  });
});

describe('summaries', () => {
  // Definition 7 of Hyndman & Fan 1996: linear between the values of rank 1 + (n - 1) p.
  it('takes quantiles by the stated definition, from unsorted values', () => {
    const values = [9, 1, 7, 3, 5, 2, 8, 4, 6, 10];
    expect(quantile(values, 0.05)).toBeCloseTo(1.45, 12);
    expect(quantile(values, 0.1)).toBeCloseTo(1.9, 12);
    expect(quantile(values, 0.95)).toBeCloseTo(9.55, 12);
    expect(values[0]).toBe(9);
  });

  it('has mean, median and sample sd', () => {
    expect(mean([2, 4, 4, 4, 5, 5, 7, 9])).toBe(5);
    expect(median([5, 1, 4, 2])).toBe(3);
    expect(sampleSd([2, 4, 4, 4, 5, 5, 7, 9])).toBeCloseTo(Math.sqrt(32 / 7), 12);
    expect(() => mean([])).toThrow('expected at least 1 value');
    expect(() => sampleSd([1])).toThrow('expected at least 2 values, got 1');
  });
});

describe('seededGenerator', () => {
  it('gives the same numbers for the same seed and others for another', () => {
    const numbers = (seed: number) => {
      const { normal, uniform } = seededGenerator(seed);
      return [normal(), uniform(), normal()];
    };
    expect(numbers(3)).toEqual(numbers(3));
    expect(numbers(3)).not.toEqual(numbers(4));
  });

  it('is normal by its moments: 100,000 draws, five standard errors', () => {
    const { normal } = seededGenerator(12);
    const z = Array.from({ length: 100_000 }, normal);
    const moment = (power: number) => mean(z.map((value) => value ** power));
    const bound = (variance: number) => 5 * Math.sqrt(variance / z.length);
    expect(Math.abs(moment(1))).toBeLessThan(bound(1));
    expect(Math.abs(moment(2) - 1)).toBeLessThan(bound(2));
    expect(Math.abs(moment(3))).toBeLessThan(bound(15));
    expect(Math.abs(moment(4) - 3)).toBeLessThan(bound(96));
  });
});
