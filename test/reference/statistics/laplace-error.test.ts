// What the Laplace approximation costs: the bioassay's posterior averages against dense numerical
// integration. The error is stated, not hidden: with hardly any prior on 20 animals an averaged
// probability is off by up to 0.08, always towards 1/2; with priors as wide as this library's own
// by 0.03 and less. A fit that came nearer would fail here too, and the figures would be renewed.
import { describe, expect, it } from 'vitest';
import { averagedProbability } from '../../../src/numeric/logistic-normal.ts';
import { logisticPosterior } from '../../../src/model/logistic.ts';
import { dataSet, greatestDifference, logOddsVariance } from './data-sets.ts';
import { gaussianLogPrior, gridAverages, type Axis } from './posterior-grid.ts';
import reference from './laplace-error.json' with { type: 'json' };

const data = dataSet('bioassay');
const { doses, flatPrior } = reference;
const HALF_LAST_DIGIT = 0.5e-4;

type Averages = (typeof reference.priors)[number]['exact'];

function laplaceAverages(prior: { mean: number[]; sd: number[] }): Averages {
  const fit = logisticPosterior(data, prior);
  const sd = (row: readonly number[]) => Math.sqrt(logOddsVariance(fit, row));
  return {
    mean: [...fit.mean],
    sd: [sd([1, 0]), sd([0, 1])],
    probability: doses.map((dose) =>
      averagedProbability(fit.mean[0] + fit.mean[1] * dose, sd([1, dose])),
    ),
    logEvidence: fit.logEvidence,
  };
}

function asList({ mean, sd, probability, logEvidence }: Averages): number[] {
  return [...mean, ...sd, ...probability, logEvidence];
}

function exactAverages(
  prior: { mean: number[]; sd: number[] },
  axes: readonly [Axis, Axis],
): Averages {
  const averages = gridAverages(data, gaussianLogPrior(prior.mean, prior.sd), axes, doses);
  return {
    ...averages,
    mean: [...averages.mean],
    sd: [...averages.sd],
    probability: [...averages.probability],
  };
}

/** Every other node of the axis. */
function halved(axis: Axis): Axis {
  return { ...axis, nodes: (axis.nodes + 1) / 2 };
}

it('integrates the flat prior on the box of the textbook to its printed digits', () => {
  const averages = gridAverages(data, () => 0, [flatPrior.intercept, flatPrior.slope]);
  expect(averages.mean.map((value) => value.toFixed(3))).toEqual(flatPrior.mean);
  expect(averages.sd.map((value) => value.toFixed(2))).toEqual(flatPrior.sd);
});

describe.each(reference.priors)('$name: N($mean, $sd squared)', (expected) => {
  const axes: readonly [Axis, Axis] = [expected.intercept, expected.slope];
  const exact = exactAverages(expected, axes);

  it('is integrated densely enough: half the nodes give the same averages', () => {
    const coarse = exactAverages(expected, [halved(axes[0]), halved(axes[1])]);
    expect(greatestDifference(asList(exact), asList(coarse))).toBeLessThan(1e-11);
    expect(greatestDifference(asList(exact), asList(expected.exact))).toBeLessThan(HALF_LAST_DIGIT);
  });

  it('has exactly the Laplace error that is documented, in mean, sd, probability and evidence', () => {
    const approximate = asList(laplaceAverages(expected));
    const error = approximate.map((value, i) => value - asList(exact)[i]);
    expect(greatestDifference(error, asList(expected.error))).toBeLessThan(HALF_LAST_DIGIT);
  });
});

it('documents an error that shrinks as the prior says more', () => {
  const worst = reference.priors.map(({ error }) => Math.max(...error.probability.map(Math.abs)));
  expect(worst).toEqual([0.0779, 0.0288, 0.0073]);
});
