import { log1pExp, sigmoid } from '../../../src/numeric/logistic.ts';
import type { LogisticData } from '../../../src/model/logistic.ts';

/** Range and number of the nodes along one weight. */
export interface Axis {
  readonly from: number;
  readonly to: number;
  readonly nodes: number;
}

/** Exact posterior averages, as far as the grid is dense and wide. */
export interface GridAverages {
  readonly mean: readonly [number, number];
  readonly sd: readonly [number, number];
  /** Averaged probability at each of the doses asked for. */
  readonly probability: readonly number[];
  /** ln of the integral of likelihood times prior; without meaning under a flat prior. */
  readonly logEvidence: number;
}

/** Log density of the prior at an intercept and a slope. */
export type LogPrior = (intercept: number, slope: number) => number;

/** Independent Gaussians. */
export function gaussianLogPrior(mean: readonly number[], sd: readonly number[]): LogPrior {
  const one = (x: number, i: number) =>
    -0.5 * ((x - mean[i]) / sd[i]) ** 2 - Math.log(sd[i]) - 0.5 * Math.log(2 * Math.PI);
  return (intercept, slope) => one(intercept, 0) + one(slope, 1);
}

function place({ from, to, nodes }: Axis, i: number): number {
  return from + ((to - from) * i) / (nodes - 1);
}

function logLikelihood({ rows, outcome, weight }: LogisticData, a: number, b: number): number {
  return rows.reduce((sum, row, i) => {
    const logOdds = a * row[0] + b * row[1];
    return sum + (weight?.[i] ?? 1) * (outcome[i] * logOdds - log1pExp(logOdds));
  }, 0);
}

/**
 * Posterior averages of a two-weight logistic model by the trapezoidal rule in both weights.
 *
 * Shares nothing with the fit under test but the logistic function. The nodes at the ends count half,
 * which matters for a flat prior on a box alone.
 */
export function gridAverages(
  data: LogisticData,
  logPrior: LogPrior,
  [first, second]: readonly [Axis, Axis],
  doses: readonly number[] = [],
): GridAverages {
  const sums = { mass: 0, a: 0, b: 0, aa: 0, bb: 0, p: doses.map(() => 0) };
  // Near the largest log posterior of the few animals, so that exp() stays in range.
  const shift = -10;
  for (let i = 0; i < first.nodes; i++) {
    const a = place(first, i);
    for (let j = 0; j < second.nodes; j++) {
      const b = place(second, j);
      const ends =
        (i % (first.nodes - 1) === 0 ? 0.5 : 1) * (j % (second.nodes - 1) === 0 ? 0.5 : 1);
      const density = ends * Math.exp(logLikelihood(data, a, b) + logPrior(a, b) - shift);
      sums.mass += density;
      sums.a += density * a;
      sums.b += density * b;
      sums.aa += density * a * a;
      sums.bb += density * b * b;
      for (let d = 0; d < doses.length; d++) sums.p[d] += density * sigmoid(a + b * doses[d]);
    }
  }
  const mean = [sums.a / sums.mass, sums.b / sums.mass] as const;
  const cell = (place(first, 1) - place(first, 0)) * (place(second, 1) - place(second, 0));
  return {
    mean,
    sd: [
      Math.sqrt(sums.aa / sums.mass - mean[0] ** 2),
      Math.sqrt(sums.bb / sums.mass - mean[1] ** 2),
    ],
    probability: sums.p.map((p) => p / sums.mass),
    logEvidence: Math.log(sums.mass * cell) + shift,
  };
}
