// What must not change, or must change in a known direction, when the data are told differently.
//
// Source: identities of the posterior. Status: algebra, but for "repeating every row lowers every
// variance", which holds on these data and is no theorem: the mode moves too.
import { describe, expect, it } from 'vitest';
import {
  logisticPosterior,
  type LogisticData,
  type LogisticPosterior,
  type LogisticPrior,
} from '../../../src/model/logistic.ts';
import { dataSet, greatestDifference, logOddsVariance, symmetric } from './data-sets.ts';

interface Case {
  readonly name: string;
  readonly prior: LogisticPrior;
}

const cases: readonly Case[] = [
  { name: 'o-rings', prior: { mean: [-1, -1], sd: [2, 1.2], loadSd: 0.5 } },
  { name: 'admissions', prior: { mean: [1, -0.5], sd: [2, 0.3], loadSd: 0.5 } },
  { name: 'vasoconstriction', prior: { mean: [-1, 3, 2], sd: [1, 0.8, 0.6] } },
  { name: 'bioassay', prior: { mean: [0.5, 6], sd: [1, 2] } },
  {
    name: 'infert',
    prior: { mean: [-1, 0.05, -0.5, 1, 0.5], sd: [2, 0.06, 0.3, 1.2, 0.9], loadSd: 0.5 },
  },
];

const TOLERANCE = 1e-10;

function numbersOf(fit: LogisticPosterior): number[] {
  const { mean, covarianceLower, loadMean, loadVariance, logEvidence } = fit;
  return [...mean, ...covarianceLower, ...loadMean, ...loadVariance, logEvidence];
}

function picked(data: LogisticData, rows: readonly number[]): LogisticData {
  return {
    rows: rows.map((i) => data.rows[i]),
    outcome: rows.map((i) => data.outcome[i]),
    ...(data.weight && { weight: rows.map((i) => data.weight![i]) }),
    ...(data.load && { load: rows.map((i) => data.load![i]) }),
  };
}

describe.each(cases)('$name', ({ name, prior }) => {
  const data = dataSet(name, prior.loadSd !== undefined);
  const count = data.rows.length;
  const every = Array.from({ length: count }, (_, i) => i);
  const weightOf = (i: number) => data.weight?.[i] ?? 1;
  const fit = logisticPosterior(data, prior);
  const expectSame = (other: LogisticPosterior) => {
    expect(greatestDifference(numbersOf(other), numbersOf(fit))).toBeLessThan(TOLERANCE);
  };

  it('does not see the order of the rows', () => {
    expectSame(logisticPosterior(picked(data, [...every].reverse()), prior));
    // 7 is prime to every count here, so this visits each row once.
    const shuffled = every.map((i) => (7 * i + 3) % count);
    expect(new Set(shuffled).size).toBe(count);
    expectSame(logisticPosterior(picked(data, shuffled), prior));
  });

  it('takes weight 2 for the row given twice', () => {
    const chosen = every.filter((i) => i % 3 === 0);
    const weight = every.map((i) => weightOf(i) * (i % 3 === 0 ? 2 : 1));
    const weighted = logisticPosterior({ ...data, weight }, prior);
    const repeated = logisticPosterior(picked(data, [...every, ...chosen]), prior);
    expect(greatestDifference(numbersOf(weighted), numbersOf(repeated))).toBeLessThan(TOLERANCE);
  });

  it('does not see a row of weight 0', () => {
    const extra = picked(data, [...every, 0, 0]);
    const weight = [...every.map(weightOf), 0, 0];
    expectSame(logisticPosterior({ ...extra, weight }, prior));
  });

  it('knows every log-odds better when every row is given again, the sds held', () => {
    const repeated = logisticPosterior(picked(data, [...every, ...every]), prior);
    const variances = (posterior: LogisticPosterior) => [
      ...data.rows.map((row) => logOddsVariance(posterior, row)),
      ...prior.mean.map((_, i) => symmetric(posterior.covarianceLower, prior.mean.length)[i][i]),
      ...posterior.loadVariance,
    ];
    const [once, twice] = [variances(fit), variances(repeated)];
    expect(twice.filter((variance, i) => !(variance < once[i]))).toEqual([]);
  });

  it('turns over with the outcome and the prior means', () => {
    const turned = logisticPosterior(
      { ...data, outcome: data.outcome.map((y) => 1 - y) },
      { ...prior, mean: prior.mean.map((mean) => -mean) },
    );
    const negative = (values: readonly number[]) => values.map((value) => -value);
    expectSame({ ...turned, mean: negative(turned.mean), loadMean: negative(turned.loadMean) });
  });

  it('does not see the unit of a column, its prior told in the same unit', () => {
    const unit = 1000;
    const rows = data.rows.map((row) => [...row.slice(0, -1), row.at(-1)! * unit]);
    const scaled = (values: readonly number[]) => [...values.slice(0, -1), values.at(-1)! / unit];
    const other = logisticPosterior(
      { ...data, rows },
      { ...prior, mean: scaled(prior.mean), sd: scaled(prior.sd) },
    );
    const last = other.mean.length - 1;
    const mean = other.mean.map((value, i) => (i === last ? value * unit : value));
    const covariance = symmetric(other.covarianceLower, last + 1);
    const covarianceLower = covariance.flatMap((row, i) =>
      row
        .slice(0, i + 1)
        .map((value, j) => value * (i === last ? unit : 1) * (j === last ? unit : 1)),
    );
    expectSame({ ...other, mean, covarianceLower });
  });

  it('takes an intercept per load for a 0/1 column of the same prior sd', () => {
    const loads = fit.loadMean.length;
    const rows = data.rows.map((row, i) => [
      ...row,
      ...Array.from({ length: loads }, (_, l) => (data.load?.[i] === l ? 1 : 0)),
    ]);
    const { load, ...rest } = data;
    expect(load === undefined).toBe(loads === 0);
    const widened = logisticPosterior(
      { ...rest, rows },
      {
        mean: [...prior.mean, ...fit.loadMean.map(() => 0)],
        sd: [...prior.sd, ...fit.loadMean.map(() => prior.loadSd!)],
      },
    );
    const size = prior.mean.length;
    const covariance = symmetric(widened.covarianceLower, size + loads);
    expectSame({
      ...widened,
      mean: widened.mean.slice(0, size),
      loadMean: widened.mean.slice(size),
      covarianceLower: covariance.slice(0, size).flatMap((row, i) => row.slice(0, i + 1)),
      loadVariance: covariance.slice(size).map((row, l) => row[size + l]),
    });
  });

  it('gives back the prior as its sds go to 0', () => {
    const tight = logisticPosterior(data, {
      ...prior,
      sd: prior.sd.map(() => 1e-6),
      ...(prior.loadSd === undefined ? {} : { loadSd: 1e-6 }),
    });
    expect(greatestDifference(tight.mean, prior.mean)).toBeLessThan(1e-8);
    expect(
      greatestDifference(
        tight.loadMean,
        fit.loadMean.map(() => 0),
      ),
    ).toBeLessThan(1e-8);
  });

  it('comes to maximum likelihood with the square of the prior sd', () => {
    const { load, ...rows } = data;
    expect(load?.length ?? count).toBe(count);
    const at = (sd: number) =>
      logisticPosterior(rows, { mean: prior.mean, sd: prior.sd.map(() => sd) }).mean;
    const limit = at(1e5);
    const [near, far] = [greatestDifference(at(1e3), limit), greatestDifference(at(1e2), limit)];
    expect(far).toBeLessThan(0.05);
    expect(far / near).toBeGreaterThan(95);
    expect(far / near).toBeLessThan(105);
  });

  it('starts anywhere and ends at the same place', () => {
    const start = {
      weights: prior.mean.map((mean, i) => mean + (i % 2 === 0 ? 3 : -3) * prior.sd[i]),
      loads: fit.loadMean.map((_, i) => (i % 2 === 0 ? 1 : -1)),
    };
    expectSame(logisticPosterior(data, prior, start));
  });
});

it('is the same to the last bit when run again', () => {
  const { name, prior } = cases[4];
  const again = () => JSON.stringify(logisticPosterior(dataSet(name, true), prior));
  expect(again()).toBe(again());
});
