// A second opinion on the mode: a general-purpose minimiser of the npm registry that was written
// for curve fitting and knows nothing of logistic regression.
//
// Source: ml-levenberg-marquardt 5.1.0 (MIT, the mljs project). Status: computed in this test. The
// log posterior is -1/2 times a sum of squares: a deviance residual sqrt(2 ln(1 + exp(-+ log-odds)))
// for every success and failure, and (weight - prior mean) / prior sd for every weight. The residuals
// do not vanish at the mode and the Jacobian is by differences, so it stops 1e-7 short of it at worst.
// Chosen because it is maintained and typed and brings nothing that ml-matrix does not bring already.
// ml-logistic-regression 2.0.0 (fixed steps) and glm 1.0.0 take no prior; the minimiser of numeric 1.2.6
// agreed to 2e-8 too, but has no types.
import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { describe, expect, it } from 'vitest';
import { log1pExp } from '../../../src/numeric/logistic.ts';
import {
  logisticPosterior,
  type LogisticData,
  type LogisticPrior,
} from '../../../src/model/logistic.ts';
import { dataSet, greatestDifference } from './data-sets.ts';

type Residual = (weights: readonly number[]) => number;

function loadCount({ load = [] }: LogisticData): number {
  return Math.max(-1, ...load) + 1;
}

/** The residuals whose sum of squares is -2 times the log posterior, up to a constant. */
function residuals(data: LogisticData, prior: LogisticPrior): Residual[] {
  const columns = prior.mean.length;
  const logOdds = (i: number, w: readonly number[]) =>
    data.rows[i].reduce((sum, x, j) => sum + x * w[j], 0) +
    (data.load === undefined ? 0 : w[columns + data.load[i]]);
  const observed = data.rows.flatMap((_, i): Residual[] => {
    const trials = data.weight?.[i] ?? 1;
    const [yes, no] = [trials * data.outcome[i], trials * (1 - data.outcome[i])];
    return [
      ...(yes > 0 ? [(w: readonly number[]) => Math.sqrt(2 * yes * log1pExp(-logOdds(i, w)))] : []),
      ...(no > 0 ? [(w: readonly number[]) => Math.sqrt(2 * no * log1pExp(logOdds(i, w)))] : []),
    ];
  });
  const [mean, sd] = [[...prior.mean], [...prior.sd]];
  for (let l = 0; l < loadCount(data); l++) {
    mean.push(0);
    sd.push(prior.loadSd!);
  }
  return [
    ...observed,
    ...mean.map(
      (m, j): Residual =>
        (w) =>
          (w[j] - m) / sd[j],
    ),
  ];
}

/** Mode by the package; it takes y = f(x), so x numbers the residuals and y is 0. */
function modeByLeastSquares(data: LogisticData, prior: LogisticPrior): number[] {
  const all = residuals(data, prior);
  const { parameterValues } = levenbergMarquardt(
    { x: all.map((_, i) => i), y: all.map(() => 0) },
    (weights) => (i) => all[i](weights),
    {
      initialValues: Array<number>(prior.mean.length + loadCount(data)).fill(0),
      centralDifference: true,
      gradientDifference: 1e-6,
      errorTolerance: 0,
      maxIterations: 300,
    },
  );
  return parameterValues;
}

const cases: readonly { data: string; prior: LogisticPrior }[] = [
  { data: 'o-rings', prior: { mean: [0, 0], sd: [2, 1] } },
  { data: 'o-rings', prior: { mean: [1, -2], sd: [0.5, 0.4] } },
  { data: 'o-rings', prior: { mean: [0, 0], sd: [1e3, 1e3] } },
  { data: 'o-rings', prior: { mean: [-1, -1], sd: [2, 1.2], loadSd: 0.5 } },
  { data: 'vasoconstriction', prior: { mean: [0, 0, 0], sd: [2, 1.5, 1.5] } },
  { data: 'vasoconstriction', prior: { mean: [-1, 3, 2], sd: [1, 0.8, 0.6] } },
  { data: 'vasoconstriction', prior: { mean: [0, 0, 0], sd: [1e3, 1e3, 1e3] } },
  { data: 'bioassay', prior: { mean: [0, 0], sd: [10, 2.5] } },
  { data: 'bioassay', prior: { mean: [0.5, 6], sd: [1, 2] } },
  { data: 'bioassay', prior: { mean: [0, 0], sd: [1e3, 1e3] } },
  { data: 'admissions', prior: { mean: [1, -0.5], sd: [2, 0.3], loadSd: 0.5 } },
];

describe.each(cases)('$data, prior mean $prior.mean, sd $prior.sd', ({ data: name, prior }) => {
  it('has the mode that the general minimiser finds', () => {
    const data = dataSet(name, prior.loadSd !== undefined);
    const fit = logisticPosterior(data, prior);
    const other = modeByLeastSquares(data, prior);
    expect(greatestDifference([...fit.mean, ...fit.loadMean], other)).toBeLessThan(2e-7);
  });
});
