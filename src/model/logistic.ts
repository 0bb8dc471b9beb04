import {
  choleskyFactor,
  choleskyInverse,
  choleskyLogDeterminant,
  choleskySolve,
  dot,
  lowerIndex,
  quadraticForm,
} from '../numeric/linalg.ts';
import {
  addOuterProduct,
  newtonSystem,
  whiteLogDensity,
  whitened,
  type LogisticData,
  type LogisticPrior,
  type NewtonSystem,
  type Whitened,
} from './whitened.ts';

export type { LogisticData, LogisticPrior } from './whitened.ts';

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

/**
 * Posterior of the weights of a logistic regression with Gaussian priors and load intercepts.
 *
 * Newton's method with backtracking on a strictly concave function: it converges for separated
 * classes, for one class, for no rows (the answer is then the prior).
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
  const problem = whitened(data, prior);
  let point = startPoint(problem, prior, start);
  let step = stepAt(problem, point);
  let iterations = 0;
  for (; iterations < MOST_ITERATIONS && step.decrement > CONVERGED_DECREMENT; iterations++) {
    const next = backtracked(problem, point, step);
    if (next === undefined) break;
    point = next;
    step = stepAt(problem, point);
  }
  return posteriorAt(problem, prior, point, step, iterations);
}

/** A strictly concave function in few dimensions: 10 to 20 steps are usual. */
const MOST_ITERATIONS = 200;
/** Half of it bounds the log density still to be gained. */
const CONVERGED_DECREMENT = 1e-20;

interface WhitePoint {
  readonly theta: Float64Array;
  readonly loads: Float64Array;
  readonly logDensity: number;
}

interface NewtonStep {
  readonly theta: Float64Array;
  readonly loads: Float64Array;
  /** Gradient times step. */
  readonly decrement: number;
  readonly gradientNorm: number;
  readonly factor: Float64Array;
  readonly loadPrecision: Float64Array;
  readonly coupling: Float64Array;
}

function startPoint(problem: Whitened, prior: LogisticPrior, start?: LogOddsWeights): WhitePoint {
  const { size, loadCount, loadSd } = problem;
  const theta = Float64Array.from({ length: size }, (_, j) =>
    start ? (start.weights[j]! - prior.mean[j]!) / prior.sd[j]! : 0,
  );
  const loads = Float64Array.from({ length: loadCount }, (_, l) =>
    start ? start.loads[l]! / loadSd : 0,
  );
  return { theta, loads, logDensity: whiteLogDensity(problem, theta, loads) };
}

function stepAt(problem: Whitened, { theta, loads }: WhitePoint): NewtonStep {
  return solveStep(newtonSystem(problem, theta, loads));
}

/** Eliminates the loads, whose block is diagonal, solves for the weights, and puts the loads back. */
function solveStep(system: NewtonSystem): NewtonStep {
  const { size, loadCount, gradient, loadGradient, precision, loadPrecision, coupling } = system;
  const reduced = Float64Array.from(precision);
  const right = Float64Array.from(gradient);
  for (let l = 0; l < loadCount; l++) {
    const scale = 1 / loadPrecision[l]!;
    const base = l * size;
    addOuterProduct(reduced, right, coupling, base, size, -scale, -loadGradient[l]! * scale);
  }
  const factor = choleskyFactor(reduced, size);
  const theta = choleskySolve(factor, right);
  const loads = Float64Array.from(loadPrecision, (d, l) => {
    const row = coupling.subarray(l * size, (l + 1) * size);
    return (loadGradient[l]! - dot(row, theta)) / d;
  });
  return {
    theta,
    loads,
    decrement: dot(gradient, theta) + dot(loadGradient, loads),
    gradientNorm: [...gradient, ...loadGradient].reduce(
      (most, g) => Math.max(most, Math.abs(g)),
      0,
    ),
    factor,
    loadPrecision,
    coupling,
  };
}

/** Armijo's rule; undefined once rounding hides any further gain. */
function backtracked(
  problem: Whitened,
  from: WhitePoint,
  step: NewtonStep,
): WhitePoint | undefined {
  if (step.decrement < 1e-8) {
    const theta = from.theta.map((t, j) => t + step.theta[j]!);
    const loads = from.loads.map((v, l) => v + step.loads[l]!);
    return { theta, loads, logDensity: whiteLogDensity(problem, theta, loads) };
  }
  for (let share = 1; share > 1e-12; share /= 2) {
    const theta = from.theta.map((t, j) => t + share * step.theta[j]!);
    const loads = from.loads.map((v, l) => v + share * step.loads[l]!);
    const logDensity = whiteLogDensity(problem, theta, loads);
    if (logDensity > from.logDensity + 1e-4 * share * step.decrement)
      return { theta, loads, logDensity };
  }
  return undefined;
}

function posteriorAt(
  problem: Whitened,
  prior: LogisticPrior,
  point: WhitePoint,
  step: NewtonStep,
  iterations: number,
): LogisticPosterior {
  const { size, loadCount, loadSd } = problem;
  const white = choleskyInverse(step.factor, size);
  const covarianceLower = Float64Array.from(white);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) covarianceLower[lowerIndex(i, j)]! *= prior.sd[i]! * prior.sd[j]!;
  }
  const loadVariance = Float64Array.from({ length: loadCount }, (_, l) => {
    const d = step.loadPrecision[l]!;
    const row = step.coupling.subarray(l * size, (l + 1) * size);
    return loadSd * loadSd * (1 / d + quadraticForm(white, row) / (d * d));
  });
  const logDeterminant =
    choleskyLogDeterminant(step.factor, size) +
    step.loadPrecision.reduce((sum, d) => sum + Math.log(d), 0);
  const halfLog2Pi = 0.5 * Math.log(2 * Math.PI);
  return {
    mean: Array.from(point.theta, (t, j) => prior.mean[j]! + prior.sd[j]! * t),
    covarianceLower: Array.from(covarianceLower),
    loadMean: Array.from(point.loads, (v) => loadSd * v),
    loadVariance: Array.from(loadVariance),
    logEvidence: point.logDensity + (size + loadCount) * halfLog2Pi - 0.5 * logDeterminant,
    iterations,
    gradientNorm: step.gradientNorm,
  };
}
