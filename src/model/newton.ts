import {
  choleskyFactor,
  choleskyInverse,
  choleskySolve,
  dot,
  lowerIndex,
} from '../numeric/linalg.ts';
import {
  LOAD_UNKNOWNS,
  logDensity,
  newtonSystem,
  type Block,
  type LatentProblem,
  type NewtonSystem,
  type Unknowns,
} from './latent.ts';

/** Newton's step at a point, and the curvature there with the loads eliminated. */
export interface NewtonStep {
  readonly logDensity: number;
  readonly theta: Float64Array;
  readonly loads: Float64Array;
  /** Gradient times step; half of it bounds the log density still to be gained. */
  readonly decrement: number;
  /** Largest entry of the gradient. */
  readonly gradientNorm: number;
  /** Cholesky factor of the weights' precision, the loads integrated out. */
  readonly factor: Float64Array;
  /** [loads][3]: inverse of each load's block. */
  readonly loadInverse: Float64Array;
  /** [loads][2][weights]: that inverse times the coupling. */
  readonly pulled: Float64Array;
}

/** Where the log density is greatest. */
export interface Maximum {
  readonly unknowns: Unknowns;
  readonly step: NewtonStep;
  readonly iterations: number;
}

/** In few dimensions 5 to 20 steps are usual. */
const MOST_ITERATIONS = 200;
/** Below this decrement rounding hides the gain that backtracking looks for. */
const FULL_STEP_DECREMENT = 1e-8;

/**
 * Newton's method with backtracking (Armijo's rule).
 *
 * With verdicts taken as right the function is strictly concave: it converges for separated classes,
 * for one class and without rows.
 *
 * @param problem - the questions
 * @param start - where to begin; its sds are held
 * @param tolerance - decrement at which to stop
 * @returns the maximum and the curvature there
 */
export function maximum(problem: LatentProblem, start: Unknowns, tolerance: number): Maximum {
  let unknowns = start;
  let step = newtonStep(problem, unknowns);
  let iterations = 0;
  for (; iterations < MOST_ITERATIONS && step.decrement > tolerance; iterations++) {
    const next = backtracked(problem, unknowns, step);
    if (next === undefined) break;
    unknowns = next;
    step = newtonStep(problem, unknowns);
  }
  return { unknowns, step, iterations };
}

/**
 * The point that Newton's step leads to, shortened until the log density grows enough.
 *
 * @param problem - the questions
 * @param from - where the step begins
 * @param step - Newton's step there
 * @returns the next point; undefined once rounding hides any further gain
 */
export function backtracked(
  problem: LatentProblem,
  from: Unknowns,
  step: NewtonStep,
): Unknowns | undefined {
  for (let share = 1; share > 1e-12; share /= 2) {
    const tried = {
      ...from,
      theta: from.theta.map((t, j) => t + share * step.theta[j]!),
      loads: from.loads.map((u, k) => u + share * step.loads[k]!),
    };
    if (step.decrement < FULL_STEP_DECREMENT) return tried;
    const wanted = step.logDensity + 1e-4 * share * step.decrement;
    if (logDensity(problem, tried) > wanted) return tried;
  }
  return undefined;
}

/**
 * Newton's step: the loads, whose Hessian falls into blocks of two, are eliminated by their Schur
 * complement, the weights solved for, and the loads put back.
 *
 * @param problem - the questions
 * @param unknowns - where
 * @returns step and curvature
 */
export function newtonStep(problem: LatentProblem, unknowns: Unknowns): NewtonStep {
  const system = newtonSystem(problem, unknowns);
  const { gradient, loadGradient, precision, coupling } = system;
  const width = gradient.length;
  const loadInverse = inverseBlocks(system.loadPrecision);
  const pulled = pulledCoupling(coupling, loadInverse, width);
  const reduced = Float64Array.from(precision);
  const right = Float64Array.from(gradient);
  for (let row = 0; row < loadGradient.length; row++) {
    eliminate(reduced, right, pulled, coupling, row * width, loadGradient[row]!);
  }
  const factor = choleskyFactor(reduced, width);
  const theta = choleskySolve(factor, right);
  const loads = loadSteps(system, loadInverse, pulled, theta);
  return {
    logDensity: system.logDensity,
    theta,
    loads,
    decrement: dot(gradient, theta) + dot(loadGradient, loads),
    gradientNorm: Math.max(largest(gradient), largest(loadGradient)),
    factor,
    loadInverse,
    pulled,
  };
}

function largest(values: Float64Array): number {
  return values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
}

function inverseBlocks(blocks: Float64Array): Float64Array {
  const inverse = new Float64Array(blocks.length);
  for (let at = 0; at < blocks.length; at += 3) {
    const [a, b, c] = [blocks[at]!, blocks[at + 1]!, blocks[at + 2]!];
    const determinant = a * c - b * b;
    inverse[at] = c / determinant;
    inverse[at + 1] = -b / determinant;
    inverse[at + 2] = a / determinant;
  }
  return inverse;
}

function pulledCoupling(
  coupling: Float64Array,
  inverse: Float64Array,
  width: number,
): Float64Array {
  const pulled = new Float64Array(coupling.length);
  for (let at = 0, block = 0; at < coupling.length; at += LOAD_UNKNOWNS * width, block += 3) {
    const [a, b, c] = [inverse[block]!, inverse[block + 1]!, inverse[block + 2]!];
    for (let j = at; j < at + width; j++) {
      const [one, two] = [coupling[j]!, coupling[j + width]!];
      pulled[j] = a * one + b * two;
      pulled[j + width] = b * one + c * two;
    }
  }
  return pulled;
}

/** Takes one unknown of a load out of the weights' equations, in place. */
function eliminate(
  precision: Float64Array,
  right: Float64Array,
  pulled: Float64Array,
  coupling: Float64Array,
  base: number,
  loadGradient: number,
): void {
  const width = right.length;
  for (let j = 0; j < width; j++) {
    const pull = pulled[base + j]!;
    if (pull === 0) continue;
    right[j]! -= pull * loadGradient;
    let cell = lowerIndex(j, 0);
    for (let k = 0; k <= j; k++) precision[cell++]! -= pull * coupling[base + k]!;
  }
}

function loadSteps(
  { loadGradient }: NewtonSystem,
  inverse: Float64Array,
  pulled: Float64Array,
  theta: Float64Array,
): Float64Array {
  const width = theta.length;
  return loadGradient.map((_, row) => {
    const l = row >> 1;
    const [one, two] = [loadGradient[2 * l]!, loadGradient[2 * l + 1]!];
    const at = 3 * l + (row % 2);
    const own = inverse[at]! * one + inverse[at + 1]! * two;
    return own - dot(pulled.subarray(row * width, (row + 1) * width), theta);
  });
}

/**
 * Covariance of the weights and variance of the loads' unknowns, in units of the prior.
 *
 * @param step - Newton's step at the maximum
 * @returns lower triangle, and [loads][2]
 */
export function posteriorSpread({ factor, loadInverse, pulled, theta }: NewtonStep): {
  readonly covariance: Float64Array;
  readonly loadVariance: Float64Array;
} {
  const width = theta.length;
  const covariance = choleskyInverse(factor, width);
  const loadVariance = new Float64Array((loadInverse.length / 3) * LOAD_UNKNOWNS);
  for (let row = 0; row < loadVariance.length; row++) {
    const own = loadInverse[3 * (row >> 1) + 2 * (row % 2)]!;
    loadVariance[row] = own + sparseQuadraticForm(covariance, pulled, row * width, width);
  }
  return { covariance, loadVariance };
}

/** x' A x for a vector with many zeros: a load without melted tiles says nothing of gloss. */
function sparseQuadraticForm(
  lower: Float64Array,
  vectors: Float64Array,
  base: number,
  size: number,
): number {
  let sum = 0;
  for (let i = 0; i < size; i++) {
    const x = vectors[base + i]!;
    if (x === 0) continue;
    const row = lowerIndex(i, 0);
    let inner = 0;
    for (let j = 0; j < i; j++) inner += lower[row + j]! * vectors[base + j]!;
    sum += x * (2 * inner + lower[row + i]! * x);
  }
  return sum;
}

/**
 * Sd of the log-odds of every row under the Gaussian at the maximum, its load included.
 *
 * @param problem - the questions
 * @param step - Newton's step at the maximum
 * @returns per block, per row
 */
export function rowSds({ blocks }: LatentProblem, step: NewtonStep): Float64Array[] {
  const place = new Float64Array(step.theta.length);
  let first = 0;
  return blocks.map((block) => {
    const sds = Float64Array.from({ length: block.count }, (_, i) =>
      Math.sqrt(rowVariance(block, first, i, step, place)),
    );
    first += block.size;
    return sds;
  });
}

/** The row less what its load explains, through the factor; `y` is scratch space. */
function rowVariance(
  { size, rows, load, effects }: Block,
  first: number,
  i: number,
  { factor, loadInverse, pulled }: NewtonStep,
  y: Float64Array,
): number {
  const width = y.length;
  const [one, two] = [effects[2 * i]!, effects[2 * i + 1]!];
  const at = LOAD_UNKNOWNS * load[i]! * width;
  for (let j = 0; j < width; j++) y[j] = -(pulled[at + j]! * one + pulled[at + width + j]! * two);
  for (let j = 0; j < size; j++) y[first + j]! += rows[i * size + j]!;
  const block = 3 * load[i]!;
  const [a, b, c] = [loadInverse[block]!, loadInverse[block + 1]!, loadInverse[block + 2]!];
  let variance = a * one * one + 2 * b * one * two + c * two * two;
  for (let r = 0; r < width; r++) {
    let sum = y[r]!;
    const row = lowerIndex(r, 0);
    for (let k = 0; k < r; k++) sum -= factor[row + k]! * y[k]!;
    y[r] = sum / factor[row + r]!;
    variance += y[r]! * y[r]!;
  }
  return variance;
}
