// Gradient and negative Hessian of the log posterior against central differences of it.
//
// Source: numerical differentiation, computed in this test. Status: computed here. A central
// difference with step h errs by about h^2 and by rounding / h: 1e-9 of the gradient, 1e-6 of the
// Hessian, which is differenced from the checked gradient, relative to its largest entry.
import { describe, expect, it } from 'vitest';
import {
  logDensity,
  newtonSystem,
  weightCount,
  type LatentProblem,
} from '../../../src/model/latent.ts';
import { logisticProblem } from '../../../src/model/logistic.ts';
import { lowerIndex } from '../../../src/numeric/linalg.ts';
import {
  denseRows,
  inventedSds,
  twoBlockProblem,
  unknownsOf,
} from '../../support/latent-problems.ts';
import { dataSet, greatestDifference } from './data-sets.ts';

const published = [
  { name: 'o-rings', prior: { mean: [-1, -1], sd: [2, 1.2], loadSd: 0.5 } },
  { name: 'admissions', prior: { mean: [1, -0.5], sd: [2, 0.3], loadSd: 0.5 } },
  { name: 'vasoconstriction', prior: { mean: [-1, 3, 2], sd: [1, 0.8, 0.6] } },
  { name: 'bioassay', prior: { mean: [0.5, 6], sd: [1, 2] } },
  {
    name: 'infert',
    prior: { mean: [-1, 0.05, -0.5, 1, 0.5], sd: [2, 0.06, 0.3, 1.2, 0.9], loadSd: 0.5 },
  },
];

interface Case {
  readonly name: string;
  readonly problem: LatentProblem;
  readonly sds?: readonly Float64Array[];
}

const noisy = twoBlockProblem(0.015);
const cases: Case[] = [
  ...published.map(({ name, prior }) => ({
    name,
    problem: logisticProblem(dataSet(name, 'loadSd' in prior), prior),
  })),
  { name: 'two questions, two unknowns a load', problem: twoBlockProblem(0) },
  { name: 'the same, averaged', problem: twoBlockProblem(0), sds: inventedSds(twoBlockProblem(0)) },
  { name: 'the same with wrong verdicts', problem: noisy },
  { name: 'the same with wrong verdicts, averaged', problem: noisy, sds: inventedSds(noisy) },
];

/** The log posterior and its derivatives as functions of one vector: weights, then loads. */
function functionsOf({ problem, sds }: Case) {
  const size = weightCount(problem);
  const systemAt = (v: readonly number[]) => newtonSystem(problem, unknownsOf(problem, v, sds));
  return {
    dimensions: size + 2 * problem.loadCount,
    logDensity: (v: readonly number[]) => logDensity(problem, unknownsOf(problem, v, sds)),
    systemAt,
    gradient: (v: readonly number[]) => {
      const { gradient, loadGradient } = systemAt(v);
      return [...gradient, ...loadGradient];
    },
    negativeHessian: (v: readonly number[]) => {
      const { precision, loadPrecision, coupling } = systemAt(v);
      const entry = (i: number, j: number): number => {
        if (i < j) return entry(j, i);
        if (i < size) return precision[lowerIndex(i, j)];
        const row = i - size;
        if (j < size) return coupling[row * size + j];
        const [load, other] = [row >> 1, (j - size) >> 1];
        return load === other ? loadPrecision[3 * load + (row % 2) + ((j - size) % 2)] : 0;
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

/** What verdicts that bend the wrong way take from the negative Hessian: it leaves that out. */
function leftOut({ problem, sds }: Case, v: readonly number[]): number[][] {
  const doubtful = denseRows(problem, unknownsOf(problem, v, sds)).filter(
    ({ curvature }) => curvature < 0,
  );
  return v.map((_, i) =>
    v.map((__, j) =>
      doubtful.reduce((sum, row) => sum + row.curvature * row.effects[i] * row.effects[j], 0),
    ),
  );
}

describe.each(cases)('$name', (one) => {
  const { dimensions, logDensity: density, systemAt, gradient, negativeHessian } = functionsOf(one);
  const points = [
    Array.from({ length: dimensions }, () => 0),
    Array.from({ length: dimensions }, (_, i) => Math.sin(1 + i)),
    Array.from({ length: dimensions }, (_, i) => -2 * Math.cos(3 * i)),
  ];

  it.each(points.map((point, i) => ({ i, point })))('gradient at point $i', ({ point }) => {
    const h = 1e-4;
    const differenced = point.map((_, i) => {
      const rise =
        density(moved(point, i, -2 * h)) -
        8 * density(moved(point, i, -h)) +
        8 * density(moved(point, i, h)) -
        density(moved(point, i, 2 * h));
      return rise / (12 * h);
    });
    const exact = gradient(point);
    expect(greatestDifference(exact, differenced) / largest(exact)).toBeLessThan(1e-8);
    expect(systemAt(point).logDensity).toBeCloseTo(density(point), 10);
  });

  it.each(points.map((point, i) => ({ i, point })))('Hessian at point $i', ({ point }) => {
    const h = 1e-4;
    const differenced = point.flatMap((_, i) => {
      const [before, after] = [gradient(moved(point, i, -h)), gradient(moved(point, i, h))];
      return before.map((g, j) => (g - after[j]) / (2 * h));
    });
    const used = negativeHessian(point);
    const without = leftOut(one, point);
    const exact = used.flatMap((row, i) => row.map((entry, j) => entry + without[i][j]));
    expect(greatestDifference(exact, differenced) / largest(exact)).toBeLessThan(1e-7);
  });
});

it('leaves nothing out where all verdicts are taken as right, and something of doubtful ones', () => {
  const at = (one: Case) => {
    const { dimensions } = functionsOf(one);
    const point = Array.from({ length: dimensions }, (_, i) => -2 * Math.cos(3 * i));
    return largest(leftOut(one, point).flat());
  };
  for (const one of cases.slice(0, 7)) expect(at(one)).toBe(0);
  for (const one of cases.slice(7)) expect(at(one)).toBeGreaterThan(0);
});
