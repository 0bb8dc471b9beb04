import { inverse, Matrix, solve } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { weightCount, type LatentProblem, type Unknowns } from '../../src/model/latent.ts';
import { laplaceEvidence } from '../../src/model/logistic.ts';
import { backtracked, maximum, newtonStep } from '../../src/model/newton.ts';
import { posteriorSpread, rowSds } from '../../src/model/spread.ts';
import { denseFactor, symmetricMatrix } from '../support/dense.ts';
import {
  densePrecision,
  denseRows,
  inventedSds,
  twoBlockProblem,
  unknownsOf,
} from '../support/latent-problems.ts';

const cases = [
  { name: 'verdicts taken as right', flipped: 0, averaged: false },
  { name: 'verdicts that may be wrong', flipped: 0.015, averaged: false },
  { name: 'verdicts that may be wrong, averaged', flipped: 0.015, averaged: true },
];

const dimensionsOf = (problem: LatentProblem) => weightCount(problem) + 2 * problem.loadCount;

/** Step and covariance from the matrix of all unknowns together, by another library. */
function dense(problem: LatentProblem, unknowns: Unknowns) {
  const rows = denseRows(problem, unknowns);
  const here = [...unknowns.theta, ...unknowns.loads];
  const gradient = here.map((value, k) =>
    rows.reduce((sum, { slope, effects }) => sum + slope * effects[k], -value),
  );
  const precision = densePrecision(rows);
  return {
    rows,
    gradient,
    precision,
    covariance: inverse(precision),
    step: solve(precision, Matrix.columnVector(gradient)).to1DArray(),
  };
}

function expectNear(actual: ArrayLike<number>, exact: readonly number[], most: number): void {
  expect(actual).toHaveLength(exact.length);
  const off = Array.from(actual, (value, i) => Math.abs(value - exact[i]));
  expect(off.filter((difference) => !(difference < most))).toEqual([]);
}

describe.each(cases)('$name', ({ flipped, averaged }) => {
  const problem = twoBlockProblem(flipped);
  const size = weightCount(problem);
  const sds = averaged ? inventedSds(problem) : undefined;
  const pointAt = (scale: number) =>
    unknownsOf(
      problem,
      Array.from({ length: dimensionsOf(problem) }, (_, i) => scale * Math.sin(1 + i)),
      sds,
    );

  it.each([0, 0.5, 2])('step, decrement and gradient at sin times %d', (scale) => {
    const unknowns = pointAt(scale);
    const step = newtonStep(problem, unknowns);
    const exact = dense(problem, unknowns);
    expectNear([...step.theta, ...step.loads], exact.step, 1e-11);
    const decrement = exact.gradient.reduce((sum, g, k) => sum + g * exact.step[k], 0);
    expect(step.decrement / decrement).toBeCloseTo(1, 11);
    expect(step.gradientNorm).toBeCloseTo(Math.max(...exact.gradient.map(Math.abs)), 11);
  });

  it('covariance of the weights and variance of the loads, both integrated over the other', () => {
    const unknowns = pointAt(0.5);
    const { covariance, loadVariance } = posteriorSpread(newtonStep(problem, unknowns));
    const exact = dense(problem, unknowns).covariance;
    const weights = exact.subMatrix(0, size - 1, 0, size - 1);
    expect(symmetricMatrix(covariance, size).sub(weights).abs().max()).toBeLessThan(1e-12);
    expectNear(loadVariance, exact.diagonal().slice(size), 1e-12);
  });

  it('sd of every row, its load included', () => {
    const unknowns = pointAt(0.5);
    const { rows, covariance } = dense(problem, unknowns);
    const exact = rows.map(({ effects }) => {
      const row = Matrix.rowVector([...effects]);
      return Math.sqrt(row.mmul(covariance).mmul(row.transpose()).get(0, 0));
    });
    const found = rowSds(problem, newtonStep(problem, unknowns)).flatMap((own) => [...own]);
    expectNear(found, exact, 1e-12);
  });

  it('is at its maximum where the gradient of all unknowns is 0', () => {
    const { unknowns, step, iterations } = maximum(problem, pointAt(2), 1e-20);
    expect(iterations).toBeLessThan(200);
    expect(step.gradientNorm).toBeLessThan(1e-9);
    expectNear(
      dense(problem, unknowns).gradient,
      Array.from({ length: dimensionsOf(problem) }, () => 0),
      1e-9,
    );
    for (const theta of [pointAt(0), pointAt(-1)]) {
      const other = maximum(problem, theta, 1e-20).unknowns;
      expectNear(other.theta, [...unknowns.theta], 1e-8);
      expectNear(other.loads, [...unknowns.loads], 1e-8);
    }
  });

  it('climbs with every step it takes, also from far away', () => {
    let unknowns = pointAt(6);
    let step = newtonStep(problem, unknowns);
    let steps = 0;
    for (; steps < 100 && step.decrement > 1e-7; steps++) {
      const next = backtracked(problem, unknowns, step)!;
      const there = newtonStep(problem, next);
      expect(there.logDensity).toBeGreaterThan(step.logDensity);
      [unknowns, step] = [next, there];
    }
    expect(steps).toBeGreaterThan(2);
    expect(step.decrement).toBeLessThanOrEqual(1e-7);
  });

  it("has Laplace's evidence with the determinant of all unknowns", () => {
    const unknowns = pointAt(0.5);
    const step = newtonStep(problem, unknowns);
    const factor = denseFactor(dense(problem, unknowns).precision);
    const logDeterminant = factor.diagonal().reduce((sum, x) => sum + 2 * Math.log(x), 0);
    expect(laplaceEvidence(step)).toBeCloseTo(step.logDensity - logDeterminant / 2, 11);
  });
});

it('without rows gives back the prior, loads that no row belongs to included', () => {
  const empty = twoBlockProblem(0.015);
  const problem: LatentProblem = {
    blocks: empty.blocks.map((block) => ({ ...block, count: 0 })),
    loadCount: 2,
  };
  const start = unknownsOf(
    problem,
    Array.from({ length: dimensionsOf(problem) }, (_, i) => Math.cos(i)),
  );
  const { unknowns, step } = maximum(problem, start, 1e-20);
  expectNear(
    [...unknowns.theta, ...unknowns.loads],
    Array.from({ length: dimensionsOf(problem) }, () => 0),
    1e-15,
  );
  const { covariance, loadVariance } = posteriorSpread(step);
  const size = weightCount(problem);
  expect(symmetricMatrix(covariance, size).sub(Matrix.eye(size)).abs().max()).toBe(0);
  expect([...loadVariance]).toEqual([1, 1, 1, 1]);
  expect(Math.abs(laplaceEvidence(step))).toBe(0);
});
