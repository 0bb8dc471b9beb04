// Data without a maximum of the likelihood, against exact results.
//
// Scalar score equations: algebra, solved here by bisection. The 2 x 2 table: D. Firth, Biometrika
// 80 (1993) 27-38; in a saturated model his penalty is half a count added to every cell, so the log
// odds ratio is ln[(a + 1/2)(d + 1/2) / ((b + 1/2)(c + 1/2))], empty cells included. Status: algebra.
import { describe, expect, it } from 'vitest';
import { log1pExp, sigmoid } from '../../../src/numeric/logistic.ts';
import { logisticPosterior, type LogisticPosterior } from '../../../src/model/logistic.ts';
import { greatestDifference } from './data-sets.ts';

/** Root of a decreasing function, to the last bit. */
function bisected(f: (x: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  for (let i = 0; i < 200; i++) {
    const middle = (a + b) / 2;
    if (f(middle) > 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

function everyNumberOf(fit: LogisticPosterior): number[] {
  const { mean, covarianceLower, loadMean, loadVariance, logEvidence, gradientNorm } = fit;
  return [...mean, ...covarianceLower, ...loadMean, ...loadVariance, logEvidence, gradientNorm];
}

const PRIOR_SDS = [
  { sd: 0.01, tolerance: 1e-10 },
  { sd: 0.3, tolerance: 1e-10 },
  { sd: 1, tolerance: 1e-10 },
  { sd: 10, tolerance: 1e-10 },
  { sd: 1e3, tolerance: 1e-10 },
  { sd: 1e6, tolerance: 1e-10 },
];

describe.each(PRIOR_SDS)('one separated column, prior sd $sd', ({ sd, tolerance }) => {
  const x = [-2, -1, -0.5, 0.25, 1, 3];
  const outcome = x.map((value) => (value > 0 ? 1 : 0));
  const fit = logisticPosterior(
    { rows: x.map((value) => [value]), outcome },
    { mean: [0], sd: [sd] },
  );

  it('has the mode that solves the scalar score equation', () => {
    const score = (w: number) =>
      x.reduce((sum, value) => sum + Math.abs(value) * sigmoid(-w * Math.abs(value)), -w / sd ** 2);
    const exact = bisected(score, 0, 200);
    expect(Math.abs(fit.mean[0] / exact - 1)).toBeLessThan(tolerance);
  });

  it('has the variance that the curvature at the mode gives', () => {
    const precision = x.reduce(
      (sum, value) => {
        const p = sigmoid(fit.mean[0] * value);
        return sum + value * value * p * sigmoid(-fit.mean[0] * value);
      },
      1 / sd ** 2,
    );
    expect(Math.abs(fit.covarianceLower[0] * precision - 1)).toBeLessThan(1e-9);
  });
});

it('puts the intercept of a mirror-symmetric, separated design at 0', () => {
  const rows = [-3, -2, -1, 1, 2, 3].map((x) => [1, x]);
  const fit = logisticPosterior(
    { rows, outcome: [0, 0, 0, 1, 1, 1] },
    { mean: [0, 0], sd: [10, 100] },
  );
  expect(Math.abs(fit.mean[0])).toBeLessThan(1e-9);
  expect(fit.mean[1]).toBeGreaterThan(5);
});

it.each([1, 5, 400])('solves the score equation when all %d outcomes are of one class', (count) => {
  const [mean, sd] = [0.5, 2];
  const rows = Array.from({ length: count }, () => [1]);
  const ones = logisticPosterior({ rows, outcome: rows.map(() => 1) }, { mean: [mean], sd: [sd] });
  const zeros = logisticPosterior(
    { rows, outcome: rows.map(() => 0) },
    { mean: [-mean], sd: [sd] },
  );
  const exact = bisected((w) => count * sigmoid(-w) - (w - mean) / sd ** 2, mean, 100);
  expect(Math.abs(ones.mean[0] - exact)).toBeLessThan(1e-10);
  expect(Math.abs(zeros.mean[0] + exact)).toBeLessThan(1e-10);
});

describe('no rows', () => {
  const prior = { mean: [1.5, -2, 0.1], sd: [2, 1.2, 0.3] };
  const variance = [4, 0, 1.44, 0, 0, 0.09];

  it.each([{}, { load: [] }, { weight: [] }])('with %o gives back the prior itself', (more) => {
    const fit = logisticPosterior({ rows: [], outcome: [], ...more }, { ...prior, loadSd: 0.5 });
    expect(fit.mean).toEqual(prior.mean);
    expect(greatestDifference(fit.covarianceLower, variance)).toBeLessThan(1e-15);
    expect(Math.abs(fit.logEvidence)).toBeLessThan(1e-14);
    expect([fit.loadMean, fit.loadVariance]).toEqual([[], []]);
  });
});

describe('2 x 2 tables (Firth 1993)', () => {
  const tables = [
    { a: 3, b: 4, c: 2, d: 9 },
    { a: 0, b: 7, c: 5, d: 0 },
    { a: 5, b: 0, c: 0, d: 7 },
    { a: 0, b: 5, c: 0, d: 7 },
    { a: 0, b: 0, c: 2, d: 3 },
    { a: 0, b: 60, c: 1, d: 0 },
  ];

  /** ln likelihood plus half of ln |information|: what Firth's estimate maximises. */
  function penalised(
    { a, b, c, d }: (typeof tables)[number],
    first: number,
    second: number,
  ): number {
    const group = (yes: number, no: number, logOdds: number) => {
      const p = sigmoid(logOdds);
      const information = (yes + no) * p * (1 - p);
      return -yes * log1pExp(-logOdds) - no * log1pExp(logOdds) + 0.5 * Math.log(information);
    };
    return group(a, b, first) + group(c, d, second);
  }

  it.each(tables)(
    'a $a, b $b / c $c, d $d: half a count more gives his log odds ratio',
    (table) => {
      const { a, b, c, d } = table;
      const fit = logisticPosterior(
        {
          rows: [
            [1, 1],
            [1, 1],
            [1, 0],
            [1, 0],
          ],
          outcome: [1, 0, 1, 0],
          weight: [a, b, c, d].map((cell) => cell + 0.5),
        },
        { mean: [0, 0], sd: [1e7, 1e7] },
      );
      const exact = Math.log(((a + 0.5) * (d + 0.5)) / ((b + 0.5) * (c + 0.5)));
      expect(Math.abs(fit.mean[1] - exact)).toBeLessThan(1e-9);
      expect(Math.abs(fit.mean[0] - Math.log((c + 0.5) / (d + 0.5)))).toBeLessThan(1e-9);
    },
  );

  it.each(tables.filter(({ a, b }) => a + b > 0))(
    'a $a, b $b / c $c, d $d: that answer is stationary for his penalised likelihood',
    (table) => {
      const { a, b, c, d } = table;
      const [first, second] = [Math.log((a + 0.5) / (b + 0.5)), Math.log((c + 0.5) / (d + 0.5))];
      const h = 1e-4;
      const slope1 = penalised(table, first + h, second) - penalised(table, first - h, second);
      const slope2 = penalised(table, first, second + h) - penalised(table, first, second - h);
      expect(Math.max(Math.abs(slope1), Math.abs(slope2)) / (2 * h)).toBeLessThan(1e-6);
    },
  );

  it('reads a share of successes as that many trials', () => {
    const { a, b, c, d } = { a: 0.5, b: 7.5, c: 5.5, d: 0.5 };
    const prior = { mean: [0, 1], sd: [3, 2] };
    const shares = {
      rows: [
        [1, 1],
        [1, 0],
      ],
      outcome: [a / (a + b), c / (c + d)],
      weight: [a + b, c + d],
    };
    const cells = {
      rows: [
        [1, 1],
        [1, 1],
        [1, 0],
        [1, 0],
      ],
      outcome: [1, 0, 1, 0],
      weight: [a, b, c, d],
    };
    const [one, other] = [logisticPosterior(shares, prior), logisticPosterior(cells, prior)];
    expect(greatestDifference(everyNumberOf(one), everyNumberOf(other))).toBeLessThan(1e-9);
  });
});

describe('inputs far outside any glaze', () => {
  const cases = [1e3, 1e6, 1e9, 1e12].flatMap((size) => [
    { size, what: 'separated', outcome: [0, 0, 1, 1] },
    { size, what: 'crossed', outcome: [1, 0, 1, 0] },
    { size, what: 'of one class', outcome: [1, 1, 1, 1] },
  ]);

  it.each(cases)('rows of size $size, $what: every number stays finite', ({ size, outcome }) => {
    const rows = [-1, -0.1, 0.1, 1].map((x) => [1, x * size]);
    const data = { rows, outcome, load: [0, 1, 0, 1] };
    const fit = logisticPosterior(data, { mean: [1.5, -2], sd: [2, 1.2], loadSd: 0.5 });
    expect(everyNumberOf(fit).filter((value) => !Number.isFinite(value))).toEqual([]);
    // Per unit of the rows; far beyond 1e6 the log density is a step and Newton stops short of its edge.
    if (size <= 1e6) expect(fit.gradientNorm / size).toBeLessThan(1e-10);
    expect(fit.covarianceLower[0]).toBeGreaterThan(0);
    expect(fit.covarianceLower[2]).toBeGreaterThan(0);
  });

  it('gives a load whose tiles are all of one class a finite intercept of the right sign', () => {
    const rows = Array.from({ length: 12 }, () => [1]);
    const load = rows.map((_, i) => Math.floor(i / 4));
    const outcome = [1, 1, 1, 1, 0, 0, 0, 0, 1, 0, 1, 0];
    const fit = logisticPosterior({ rows, outcome, load }, { mean: [0], sd: [2], loadSd: 0.5 });
    const exact = bisected((v) => 4 * sigmoid(-v) - v / 0.25, 0, 10);
    expect(Math.abs(fit.mean[0])).toBeLessThan(1e-10);
    expect(greatestDifference(fit.loadMean, [exact, -exact, 0])).toBeLessThan(1e-10);
  });
});
