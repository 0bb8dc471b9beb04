// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import { choleskyInverse, lowerIndex, quadraticForm } from '../../../src/numeric/linalg.ts';
import { stepAt, type NewtonStep, type WhitePoint } from './newton-step.ts';
import { whiteLogDensity } from './newton-system.ts';
import { whitened, type LogisticData, type LogisticPrior, type Whitened } from './whitened.ts';

/** Laplace approximation: the Gaussian at the mode with the curvature there. */
export interface LogisticPosterior {
  /** Mode, per column. */
  readonly mean: readonly number[];
  /** Lower triangle, row by row, of the weights' covariance; the loads are integrated out. */
  readonly covarianceLower: readonly number[];
  /** Mode and marginal variance of each load's intercept. */
  readonly loadMean: readonly number[];
  readonly loadVariance: readonly number[];
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
 * @returns mode, covariance, loads
 * @throws {RangeError} if the shapes differ, a prior sd is not above 0 or an entry is not finite
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
  for (let i = 0; i < MOST_ITERATIONS && step.decrement > CONVERGED_DECREMENT; i++) {
    const next = backtracked(problem, point, step);
    if (next === undefined) break;
    point = next;
    step = stepAt(problem, point);
  }
  return posteriorAt(problem, prior, point, step);
}

/** A strictly concave function in few dimensions: 10 to 20 steps are usual. */
const MOST_ITERATIONS = 200;
/** Half of it bounds the log density still to be gained. */
const CONVERGED_DECREMENT = 1e-20;

function startPoint(problem: Whitened, prior: LogisticPrior, start?: LogOddsWeights): WhitePoint {
  const { size, loadCount, loadSd } = problem;
  const theta = Float64Array.from({ length: size }, (_, j) =>
    start ? (start.weights[j] - prior.mean[j]) / prior.sd[j] : 0,
  );
  const loads = Float64Array.from({ length: loadCount }, (_, l) =>
    start ? start.loads[l] / loadSd : 0,
  );
  return { theta, loads, logDensity: whiteLogDensity(problem, theta, loads) };
}

/** Armijo's rule; undefined once rounding hides any further gain. */
function backtracked(
  problem: Whitened,
  from: WhitePoint,
  step: NewtonStep,
): WhitePoint | undefined {
  if (step.decrement < 1e-8) {
    const theta = from.theta.map((t, j) => t + step.theta[j]);
    const loads = from.loads.map((v, l) => v + step.loads[l]);
    return { theta, loads, logDensity: whiteLogDensity(problem, theta, loads) };
  }
  for (let share = 1; share > 1e-12; share /= 2) {
    const theta = from.theta.map((t, j) => t + share * step.theta[j]);
    const loads = from.loads.map((v, l) => v + share * step.loads[l]);
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
): LogisticPosterior {
  const { size, loadCount, loadSd } = problem;
  const white = choleskyInverse(step.factor, size);
  const covarianceLower = Float64Array.from(white);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) covarianceLower[lowerIndex(i, j)] *= prior.sd[i] * prior.sd[j];
  }
  const loadVariance = Float64Array.from({ length: loadCount }, (_, l) => {
    const d = step.loadPrecision[l];
    const row = step.coupling.subarray(l * size, (l + 1) * size);
    return loadSd * loadSd * (1 / d + quadraticForm(white, row) / (d * d));
  });
  return {
    mean: Array.from(point.theta, (t, j) => prior.mean[j] + prior.sd[j] * t),
    covarianceLower: Array.from(covarianceLower),
    loadMean: Array.from(point.loads, (v) => loadSd * v),
    loadVariance: Array.from(loadVariance),
  };
}
