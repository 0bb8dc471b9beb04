import { choleskyLogDeterminant, dot, lowerIndex } from '../numeric/linalg.ts';
import type { LatentProblem, Unknowns } from './latent.ts';
import { maximum, type NewtonStep } from './newton.ts';
import { posteriorSpread } from './spread.ts';

/** Observations of a yes-or-no outcome. */
export interface LogisticData {
  /** Shape [tiles][columns]; an intercept is a column of ones. */
  readonly rows: readonly (readonly number[])[];
  /** 1 yes, 0 no; a fraction is the share of yes among `weight` trials. */
  readonly outcome: readonly number[];
  /** How often each row counts; 1 where absent. */
  readonly weight?: readonly number[];
  /** Load of each tile, numbered from 0; each load has an intercept of its own. */
  readonly load?: readonly number[];
}

/** Independent Gaussian priors of the weights, and of the loads' intercepts about 0. */
export interface LogisticPrior {
  /** Per column. */
  readonly mean: readonly number[];
  /** Per column, > 0. */
  readonly sd: readonly number[];
  /** Sd of the loads' intercepts, > 0; needed where loads are given. */
  readonly loadSd?: number;
}

/** Laplace approximation: the Gaussian at the mode with the curvature there. */
export interface LogisticPosterior {
  /** Mode, per column. */
  readonly mean: readonly number[];
  /** Lower triangle, row by row, of the weights' covariance; the loads are integrated out. */
  readonly covarianceLower: readonly number[];
  /** Mode and marginal variance of each load's intercept. */
  readonly loadMean: readonly number[];
  readonly loadVariance: readonly number[];
  /** Laplace estimate of ln p(outcome | rows, prior). */
  readonly logEvidence: number;
  readonly iterations: number;
  /** Largest entry of the gradient at the answer, per prior sd: 0 at the exact mode. */
  readonly gradientNorm: number;
}

/** Weights and load intercepts of the log-odds. */
export interface LogOddsWeights {
  readonly weights: readonly number[];
  readonly loads: readonly number[];
}

/** A strictly concave function: at this decrement the mode is exact to rounding. */
const CONVERGED_DECREMENT = 1e-20;

/**
 * Posterior of the weights of one logistic regression with Gaussian priors and load intercepts: the
 * engine of the fit on its plainest problem, as other programs pose it.
 *
 * @param data - rows, outcomes, weights, loads
 * @param prior - means and sds
 * @param start - where Newton's method begins; the prior means where absent
 * @returns mode, covariance, loads, evidence
 * @throws {RangeError} if the shapes differ, a prior sd is not above 0 or an entry is not finite
 * @example
 * logisticPosterior({ rows: [[1]], outcome: [1] }, { mean: [0], sd: [1] }).mean[0]; // ~0.4011
 *
 * Source: D. J. C. MacKay, The evidence framework applied to classification networks, Neural
 * Computation 4 (1992) 720-736; Newton's step with the loads eliminated by their Schur complement.
 */
export function logisticPosterior(
  data: LogisticData,
  prior: LogisticPrior,
  start?: LogOddsWeights,
): LogisticPosterior {
  checkShapes(data, prior);
  const problem = logisticProblem(data, prior);
  const { unknowns, step, iterations } = maximum(
    problem,
    startingPoint(problem, prior, start),
    CONVERGED_DECREMENT,
  );
  const { covariance, loadVariance } = posteriorSpread(step);
  prior.sd.forEach((sd, i) => {
    for (let j = 0; j <= i; j++) covariance[lowerIndex(i, j)]! *= sd * prior.sd[j]!;
  });
  const ofLoads = (values: Float64Array) =>
    data.load === undefined ? [] : Array.from(values).filter((_, k) => k % 2 === 0);
  const loadSd = prior.loadSd ?? 0;
  return {
    mean: Array.from(unknowns.theta, (t, j) => prior.mean[j]! + prior.sd[j]! * t),
    covarianceLower: Array.from(covariance),
    loadMean: ofLoads(unknowns.loads).map((u) => loadSd * u),
    loadVariance: ofLoads(loadVariance).map((v) => loadSd * loadSd * v),
    logEvidence: laplaceEvidence(step),
    iterations,
    gradientNorm: step.gradientNorm,
  };
}

/**
 * Laplace estimate of the log evidence: the powers of 2 pi of prior and integral cancel.
 *
 * @param step - Newton's step at the maximum
 * @returns ln p(outcomes | prior)
 */
export function laplaceEvidence({ logDensity, factor, loadInverse, theta }: NewtonStep): number {
  let logDeterminant = choleskyLogDeterminant(factor, theta.length);
  for (let at = 0; at < loadInverse.length; at += 3) {
    const [a, b, c] = [loadInverse[at]!, loadInverse[at + 1]!, loadInverse[at + 2]!];
    logDeterminant -= Math.log(a * c - b * b);
  }
  return logDensity - 0.5 * logDeterminant;
}

/**
 * The same problem for the engine: one block, a load's first unknown its intercept, its second idle.
 *
 * @param data - rows, outcomes, weights, loads
 * @param prior - means and sds
 * @returns the problem in units of the prior
 */
export function logisticProblem(data: LogisticData, prior: LogisticPrior): LatentProblem {
  const count = data.rows.length;
  const size = prior.mean.length;
  const rows = new Float64Array(count * size);
  data.rows.forEach((row, i) => {
    for (let j = 0; j < size; j++) rows[i * size + j] = row[j]! * prior.sd[j]!;
  });
  const loadSd = data.load === undefined ? 0 : (prior.loadSd ?? 0);
  const block = {
    count,
    size,
    rows,
    offset: Float64Array.from(data.rows, (row) => dot(row, prior.mean)),
    outcome: Float64Array.from(data.outcome),
    weight: data.weight ? Float64Array.from(data.weight) : new Float64Array(count).fill(1),
    load: data.load ? Int32Array.from(data.load) : new Int32Array(count),
    effects: Float64Array.from({ length: 2 * count }, (_, k) => (k % 2 === 0 ? loadSd : 0)),
    flipped: 0,
  };
  // Without loads all rows share one that does nothing.
  const most = (data.load ?? [0]).reduce((a, b) => Math.max(a, b), -1);
  return { blocks: [block], loadCount: most + 1 };
}

function startingPoint(
  { loadCount }: LatentProblem,
  prior: LogisticPrior,
  start?: LogOddsWeights,
): Unknowns {
  const loadSd = prior.loadSd ?? 0;
  return {
    theta: Float64Array.from(prior.mean, (mean, j) =>
      start ? (start.weights[j]! - mean) / prior.sd[j]! : 0,
    ),
    loads: Float64Array.from({ length: 2 * loadCount }, (_, k) =>
      start && loadSd > 0 && k % 2 === 0 ? (start.loads[k / 2] ?? 0) / loadSd : 0,
    ),
  };
}

function checkShapes({ rows, outcome, weight, load }: LogisticData, prior: LogisticPrior): void {
  const size = prior.mean.length;
  const same = (what: string, length: number, wanted: number) => {
    if (length !== wanted)
      throw new RangeError(`${what} must have length ${wanted}, got ${length}`);
  };
  same('prior.sd', prior.sd.length, size);
  same('outcome', outcome.length, rows.length);
  if (weight) same('weight', weight.length, rows.length);
  if (load) same('load', load.length, rows.length);
  if (load && !load.every((l) => Number.isInteger(l) && l >= 0)) {
    throw new RangeError('load must hold whole numbers from 0');
  }
  rows.forEach((row, i) => {
    same(`rows[${i}]`, row.length, size);
    if (!row.every(Number.isFinite)) throw new RangeError(`rows[${i}] must be finite`);
  });
  for (const sd of load ? [...prior.sd, prior.loadSd ?? 0] : prior.sd) {
    if (!(sd > 0 && sd < Infinity))
      throw new RangeError(`prior sd must be > 0 and finite, got ${sd}`);
  }
  if (!prior.mean.every(Number.isFinite)) throw new RangeError('prior.mean must be finite');
  if (!outcome.every((y) => y >= 0 && y <= 1)) throw new RangeError('outcome must be from 0 to 1');
  if (weight && !weight.every((w) => w >= 0 && w < Infinity)) {
    throw new RangeError('weight must be >= 0 and finite');
  }
}
