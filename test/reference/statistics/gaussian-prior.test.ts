// Fits under a Gaussian prior against arm::bayesglm of R, with and without loads.
// Source, status, how the numbers were made and why the tolerances: gaussian-prior.json and .R.
import { describe, expect, it } from 'vitest';
import { logisticPosterior } from '../../../src/model/logistic.ts';
import { dataSet, greatestDifference, symmetric } from './data-sets.ts';
import reference from './gaussian-prior.json' with { type: 'json' };

const { tolerance } = reference;

const cases = reference.cases.map((expected) => ({
  ...expected,
  name: [
    expected.data,
    `prior mean ${expected.priorMean.join(', ')}`,
    `sd ${expected.priorSd.join(', ')}`,
    ...(expected.loadSd === null ? [] : [`load sd ${expected.loadSd}`]),
  ].join('; '),
}));

describe.each(cases)('$name', (expected) => {
  const { loadSd } = expected;
  const fit = logisticPosterior(dataSet(expected.data, loadSd !== null), {
    mean: expected.priorMean,
    sd: expected.priorSd,
    ...(loadSd === null ? {} : { loadSd }),
  });

  it('has the same mode', () => {
    expect(greatestDifference(fit.mean, expected.mean)).toBeLessThan(tolerance.mode);
    expect(greatestDifference(fit.loadMean, expected.loadMean)).toBeLessThan(tolerance.mode);
  });

  it('has the same covariance, the loads integrated out', () => {
    const ours = symmetric(fit.covarianceLower, expected.mean.length).flat();
    expect(greatestDifference(ours, expected.covariance.flat())).toBeLessThan(tolerance.covariance);
    expect(greatestDifference(fit.loadVariance, expected.loadVariance)).toBeLessThan(
      tolerance.covariance,
    );
  });

  it("has the same evidence by Laplace's method", () => {
    expect(Math.abs(fit.logEvidence - expected.logEvidence)).toBeLessThan(tolerance.logEvidence);
  });
});

it('covers priors with and without means, and loads', () => {
  const withMeans = cases.filter(({ priorMean }) => priorMean.some((mean) => mean !== 0));
  const withLoads = cases.filter(({ loadSd }) => loadSd !== null);
  expect(cases.length).toBeGreaterThanOrEqual(11);
  expect(withMeans.length).toBeGreaterThanOrEqual(5);
  expect(withLoads.map(({ loadMean }) => loadMean.length)).toEqual([3, 83, 6]);
});
