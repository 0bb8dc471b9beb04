// Gradient and negative Hessian of the log posterior against central differences of it.
//
// Source: numerical differentiation, computed in this test. Status: computed here. A central
// difference with step h errs by about h^2 and by rounding / h: 1e-9 of the gradient, 1e-6 of the
// Hessian, which is differenced from the checked gradient, relative to its largest entry.
import { describe, expect, it } from 'vitest';
import { lowerIndex } from '../../../src/numeric/linalg.ts';
import { newtonSystem, whiteLogDensity, whitened } from '../../../src/model/whitened.ts';
import { dataSet, greatestDifference } from './data-sets.ts';

const cases = [
  { name: 'o-rings', prior: { mean: [-1, -1], sd: [2, 1.2], loadSd: 0.5 } },
  { name: 'admissions', prior: { mean: [1, -0.5], sd: [2, 0.3], loadSd: 0.5 } },
  { name: 'vasoconstriction', prior: { mean: [-1, 3, 2], sd: [1, 0.8, 0.6] } },
  { name: 'bioassay', prior: { mean: [0.5, 6], sd: [1, 2] } },
  {
    name: 'infert',
    prior: { mean: [-1, 0.05, -0.5, 1, 0.5], sd: [2, 0.06, 0.3, 1.2, 0.9], loadSd: 0.5 },
  },
];

/** The log posterior and its derivatives as functions of one vector: weights, then loads. */
function functionsOf({ name, prior }: (typeof cases)[number]) {
  const problem = whitened(dataSet(name, 'loadSd' in prior), prior);
  const { size, loadCount } = problem;
  const split = (v: readonly number[]) =>
    [Float64Array.from(v.slice(0, size)), Float64Array.from(v.slice(size))] as const;
  const systemAt = (v: readonly number[]) => newtonSystem(problem, ...split(v));
  return {
    dimensions: size + loadCount,
    logDensity: (v: readonly number[]) => whiteLogDensity(problem, ...split(v)),
    gradient: (v: readonly number[]) => {
      const { gradient, loadGradient } = systemAt(v);
      return [...gradient, ...loadGradient];
    },
    negativeHessian: (v: readonly number[]) => {
      const { precision, loadPrecision, coupling } = systemAt(v);
      const entry = (i: number, j: number): number => {
        if (i < j) return entry(j, i);
        if (i < size) return precision[lowerIndex(i, j)];
        if (j < size) return coupling[(i - size) * size + j];
        return i === j ? loadPrecision[i - size] : 0;
      };
      return v.map((_, i) => v.map((__, j) => entry(i, j)));
    },
  };
}

function moved(v: readonly number[], i: number, by: number): number[] {
  return v.map((x, k) => (k === i ? x + by : x));
}

function largest(values: readonly number[]): number {
  return greatestDifference(
    values,
    values.map(() => 0),
  );
}

describe.each(cases)('$name', (one) => {
  const { dimensions, logDensity, gradient, negativeHessian } = functionsOf(one);
  const points = [
    Array.from({ length: dimensions }, () => 0),
    Array.from({ length: dimensions }, (_, i) => Math.sin(1 + i)),
    Array.from({ length: dimensions }, (_, i) => -2 * Math.cos(3 * i)),
  ];

  it.each(points.map((point, i) => ({ i, point })))('gradient at point $i', ({ point }) => {
    const h = 1e-4;
    const differenced = point.map((_, i) => {
      const rise =
        logDensity(moved(point, i, -2 * h)) -
        8 * logDensity(moved(point, i, -h)) +
        8 * logDensity(moved(point, i, h)) -
        logDensity(moved(point, i, 2 * h));
      return rise / (12 * h);
    });
    const exact = gradient(point);
    expect(greatestDifference(exact, differenced) / largest(exact)).toBeLessThan(1e-8);
  });

  it.each(points.map((point, i) => ({ i, point })))('Hessian at point $i', ({ point }) => {
    const h = 1e-4;
    const differenced = point.flatMap((_, i) => {
      const [before, after] = [gradient(moved(point, i, -h)), gradient(moved(point, i, h))];
      return before.map((g, j) => (g - after[j]) / (2 * h));
    });
    const exact = negativeHessian(point).flat();
    expect(greatestDifference(exact, differenced) / largest(exact)).toBeLessThan(1e-7);
  });
});
