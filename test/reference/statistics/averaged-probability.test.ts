// The average of a probability over Gaussian log-odds, against two dense integrals made here.
//
// Source: the definition; the second form swaps the integrals: P(logistic noise < mean + sd z).
// Status: computed in this test. Tolerance 1e-10 as the function's own docstring promises.
import { describe, expect, it } from 'vitest';
import { averagedProbability } from '../../../src/numeric/logistic-normal.ts';
import { normalCdf, normalDensity } from '../../../src/numeric/normal.ts';
import { sigmoid } from '../../../src/numeric/logistic.ts';

function trapezoid(f: (x: number) => number, from: number, to: number, steps: number): number {
  const h = (to - from) / steps;
  let sum = (f(from) + f(to)) / 2;
  for (let i = 1; i < steps; i++) sum += f(from + i * h);
  return sum * h;
}

/** Over the standard score, with 100 nodes for every unit of the log-odds or more. */
function overTheScore(mean: number, sd: number): number {
  const steps = Math.max(4000, Math.ceil(2000 * sd));
  return trapezoid((z) => normalDensity(z) * sigmoid(mean + sd * z), -10, 10, steps);
}

/** Over the logistic noise: no feature finer than the noise or the sd. */
function overTheNoise(mean: number, sd: number): number {
  const density = (x: number) => sigmoid(x) * sigmoid(-x);
  const steps = Math.ceil(80 * Math.max(20, 20 / sd));
  return trapezoid((x) => density(x) * normalCdf((mean - x) / sd), -40, 40, steps);
}

const MEANS = [-40, -12, -5, -2.3, -1, -0.2, 0, 0.7, 1.5, 3, 8, 30];
const SDS = [0.01, 0.1, 0.5, 1, 1.4, 2, 3.7, 5, 8, 15, 40];
const grid = SDS.map((sd) => ({ sd, means: MEANS }));

describe.each(grid)('sd $sd', ({ sd, means }) => {
  it('agrees with the dense trapezoid over the standard score', () => {
    const errors = means.map((mean) =>
      Math.abs(averagedProbability(mean, sd) - overTheScore(mean, sd)),
    );
    expect(Math.max(...errors)).toBeLessThan(1e-10);
  });

  it('agrees with the dense trapezoid over the logistic noise', () => {
    const errors = means.map((mean) =>
      Math.abs(averagedProbability(mean, sd) - overTheNoise(mean, sd)),
    );
    expect(Math.max(...errors)).toBeLessThan(1e-10);
  });

  it('gives the two classes probabilities that sum to 1', () => {
    const errors = means.map((mean) =>
      Math.abs(averagedProbability(mean, sd) + averagedProbability(-mean, sd) - 1),
    );
    expect(Math.max(...errors)).toBeLessThan(1e-14);
  });
});

it('is 1/2 in the middle, the logistic without uncertainty, and pulled to 1/2 by it', () => {
  expect(SDS.map((sd) => Math.abs(averagedProbability(0, sd) - 0.5) < 1e-14)).not.toContain(false);
  expect(averagedProbability(1.2, 0)).toBe(sigmoid(1.2));
  const shrinking = [0, ...SDS].map((sd) => averagedProbability(2, sd));
  expect(shrinking).toEqual([...shrinking].sort((a, b) => b - a));
  expect(averagedProbability(2, 1e3)).toBeGreaterThan(0.5);
});

it('tends to the normal distribution as the sd grows', () => {
  // The logistic's own variance, pi^2 / 3, is all that is left between the two.
  const expected = normalCdf(300 / Math.sqrt(1000 ** 2 + Math.PI ** 2 / 3));
  expect(Math.abs(averagedProbability(300, 1000) - expected)).toBeLessThan(1e-6);
});

it('refuses a negative sd by name', () => {
  expect(() => averagedProbability(0, -1)).toThrow(/sd must be >= 0, got -1/);
});
