import { addPairedProducts } from '../numeric/cross-products.ts';
import { choleskyFactor, choleskySolve, dot } from '../numeric/linalg.ts';
import {
  logDensity,
  newtonSystem,
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
  let step = exactStep(problem, unknowns);
  let iterations = 0;
  for (; iterations < MOST_ITERATIONS && step.decrement > tolerance; iterations++) {
    const next = advanced(problem, unknowns, step);
    if (next === undefined) break;
    ({ unknowns, step } = next);
  }
  return { unknowns, step, iterations };
}

/** Below this decrement the full step nearly always gains. */
const CLOSE_DECREMENT = 1;

/** The point that the step leads to, and the step there, whose log density comes by the way. */
function advanced(
  problem: LatentProblem,
  from: Unknowns,
  step: NewtonStep,
): Pick<Maximum, 'unknowns' | 'step'> | undefined {
  if (step.decrement < CLOSE_DECREMENT) {
    const unknowns = moved(from, step, 1);
    const next = exactStep(problem, unknowns);
    if (isGain(step, 1, next.logDensity)) return { unknowns, step: next };
  }
  const unknowns = backtracked(problem, from, step);
  return unknowns && { unknowns, step: exactStep(problem, unknowns) };
}

function hasDoubts({ blocks }: LatentProblem): boolean {
  return blocks.some(({ flipped }) => flipped > 0);
}

/**
 * Newton's step with the curvature of doubtful verdicts, which saves steps; without it where the matrix
 * would not be positive definite.
 *
 * @param problem - the questions
 * @param unknowns - where
 * @returns step and curvature
 */
export function exactStep(problem: LatentProblem, unknowns: Unknowns): NewtonStep {
  if (!hasDoubts(problem)) return newtonStep(problem, unknowns);
  const exact = stepAt(problem, unknowns, true);
  return exact ?? newtonStep(problem, unknowns);
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
    const tried = moved(from, step, share);
    if (step.decrement < FULL_STEP_DECREMENT) return tried;
    if (isGain(step, share, logDensity(problem, tried))) return tried;
  }
  return undefined;
}

function moved(from: Unknowns, step: NewtonStep, share: number): Unknowns {
  return {
    ...from,
    theta: from.theta.map((t, j) => t + share * step.theta[j]!),
    loads: from.loads.map((u, k) => u + share * step.loads[k]!),
  };
}

/** Armijo's rule. */
function isGain({ logDensity: before, decrement }: NewtonStep, share: number, after: number) {
  return decrement < FULL_STEP_DECREMENT || after > before + 1e-4 * share * decrement;
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
  const step = stepAt(problem, unknowns, false);
  if (step === undefined) throw new RangeError('log density must be finite at every point tried');
  return step;
}

/** The largest array of a step: with thousands of loads a new one each time would keep the collector busy. */
let spareCoupling: Float64Array | undefined;

function stepAt(
  problem: LatentProblem,
  unknowns: Unknowns,
  isExact: boolean,
): NewtonStep | undefined {
  const system = newtonSystem(problem, unknowns, isExact, spareCoupling);
  spareCoupling = system.coupling;
  return solvedStep(system);
}

/** Undefined where the matrix is not positive definite. Nothing of the system's coupling is kept. */
function solvedStep(system: NewtonSystem): NewtonStep | undefined {
  const { gradient, loadGradient, precision, coupling } = system;
  const width = gradient.length;
  const loadInverse = inverseBlocks(system.loadPrecision);
  if (loadInverse === undefined) return undefined;
  const right = Float64Array.from(gradient);
  const pulled = pulledCoupling(system, loadInverse, right);
  const reduced = eliminated(precision, pulled, coupling, width);
  const factor = positiveFactor(reduced, width);
  if (factor === undefined) return undefined;
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
  let most = 0;
  for (const value of values) most = Math.max(most, Math.abs(value));
  return most;
}

function positiveFactor(matrix: Float64Array, size: number): Float64Array | undefined {
  try {
    return choleskyFactor(matrix, size);
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}

function inverseBlocks(blocks: Float64Array): Float64Array | undefined {
  const inverse = new Float64Array(blocks.length);
  for (let at = 0; at < blocks.length; at += 3) {
    const a = blocks[at]!;
    const b = blocks[at + 1]!;
    const c = blocks[at + 2]!;
    const determinant = a * c - b * b;
    if (!(a > 0 && determinant > 0)) return undefined;
    inverse[at] = c / determinant;
    inverse[at + 1] = -b / determinant;
    inverse[at + 2] = a / determinant;
  }
  return inverse;
}

/** Each load's inverse block times its coupling; its pull is taken off the weights' gradient. */
function pulledCoupling(
  { coupling, loadGradient, gradient: { length: width } }: NewtonSystem,
  inverse: Float64Array,
  gradient: Float64Array,
): Float64Array {
  const pulled = new Float64Array(coupling.length);
  for (let l = 0, at = 0; 2 * l < loadGradient.length; l++, at += width) {
    const a = inverse[3 * l]!;
    const b = inverse[3 * l + 1]!;
    const c = inverse[3 * l + 2]!;
    const pullOne = loadGradient[2 * l]!;
    const pullTwo = loadGradient[2 * l + 1]!;
    for (let j = 0; j < width; j++, at++) {
      const one = coupling[at]!;
      const two = coupling[at + width]!;
      const pulledOne = a * one + b * two;
      const pulledTwo = b * one + c * two;
      pulled[at] = pulledOne;
      pulled[at + width] = pulledTwo;
      gradient[j]! -= pullOne * pulledOne + pullTwo * pulledTwo;
    }
  }
  return pulled;
}

/** The weights' precision with the loads taken out. */
function eliminated(
  precision: Float64Array,
  pulled: Float64Array,
  coupling: Float64Array,
  width: number,
): Float64Array {
  const taken = new Float64Array(precision.length);
  addPairedProducts(pulled, coupling, width, taken);
  return precision.map((value, cell) => value - taken[cell]!);
}

function loadSteps(
  { loadGradient }: NewtonSystem,
  inverse: Float64Array,
  pulled: Float64Array,
  theta: Float64Array,
): Float64Array {
  const width = theta.length;
  const steps = new Float64Array(loadGradient.length);
  for (let row = 0, from = 0; row < steps.length; row++) {
    const l = row >> 1;
    const at = 3 * l + (row % 2);
    let step = inverse[at]! * loadGradient[2 * l]! + inverse[at + 1]! * loadGradient[2 * l + 1]!;
    for (let j = 0; j < width; j++) step -= pulled[from++]! * theta[j]!;
    steps[row] = step;
  }
  return steps;
}
