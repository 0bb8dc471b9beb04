// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import { dot, lowerIndex } from '../../../src/numeric/linalg.ts';
import { log1pExp, sigmoid } from '../../../src/numeric/logistic.ts';
import type { Whitened } from './whitened.ts';

/** Blocks of gradient and negative Hessian: weights, loads, and their coupling [loads][columns]. */
export interface NewtonSystem {
  readonly size: number;
  readonly loadCount: number;
  readonly gradient: Float64Array;
  readonly loadGradient: Float64Array;
  /** Lower triangle, row by row. */
  readonly precision: Float64Array;
  readonly loadPrecision: Float64Array;
  readonly coupling: Float64Array;
}

function logOddsOf(problem: Whitened, theta: Float64Array, loads: Float64Array, i: number): number {
  const { size, rows, offset, load, loadCount, loadSd } = problem;
  let sum = offset[i];
  const base = i * size;
  for (let j = 0; j < size; j++) sum += rows[base + j] * theta[j];
  return loadCount > 0 ? sum + loadSd * loads[load[i]] : sum;
}

/**
 * Log likelihood plus log prior density of theta and the loads, both with their constants.
 *
 * @param problem - the whitened problem
 * @param theta - weights in prior sds about the prior mean
 * @param loads - load intercepts in their prior sd
 * @returns natural logarithm of the joint density
 */
export function whiteLogDensity(
  problem: Whitened,
  theta: Float64Array,
  loads: Float64Array,
): number {
  let sum = 0;
  for (let i = 0; i < problem.count; i++) {
    const logOdds = logOddsOf(problem, theta, loads, i);
    sum += problem.weight[i] * (problem.outcome[i] * logOdds - log1pExp(logOdds));
  }
  const dimensions = theta.length + loads.length;
  return sum - 0.5 * (dot(theta, theta) + dot(loads, loads) + dimensions * Math.log(2 * Math.PI));
}

/**
 * Gradient and negative Hessian of the log density at a point of the whitened problem.
 *
 * The loads' block of the Hessian is diagonal, since a tile belongs to one load.
 *
 * @param problem - the whitened problem
 * @param theta - weights in prior sds about the prior mean
 * @param loads - load intercepts in their prior sd
 * @returns gradient and negative Hessian in blocks
 */
export function newtonSystem(
  problem: Whitened,
  theta: Float64Array,
  loads: Float64Array,
): NewtonSystem {
  const { count, size, loadCount, loadSd, rows, load } = problem;
  const gradient = Float64Array.from(theta, (t) => -t);
  const loadGradient = Float64Array.from(loads, (v) => -v);
  const precision = identityLower(size);
  const loadPrecision = new Float64Array(loadCount).fill(1);
  const coupling = new Float64Array(loadCount * size);
  for (let i = 0; i < count; i++) {
    const logOdds = logOddsOf(problem, theta, loads, i);
    const yes = sigmoid(logOdds);
    const no = sigmoid(-logOdds);
    const outcome = problem.outcome[i];
    // Not `outcome - yes`, which loses every digit where yes is near 1.
    const residual = problem.weight[i] * (outcome * no - (1 - outcome) * yes);
    const curvature = problem.weight[i] * yes * no;
    const base = i * size;
    addOuterProduct(precision, gradient, rows, base, size, curvature, residual);
    if (loadCount === 0) continue;
    const l = load[i];
    loadGradient[l] += residual * loadSd;
    loadPrecision[l] += curvature * loadSd * loadSd;
    for (let j = 0; j < size; j++) coupling[l * size + j] += curvature * loadSd * rows[base + j];
  }
  return { size, loadCount, gradient, loadGradient, precision, loadPrecision, coupling };
}

/**
 * Adds curvature * x x' to a precision and residual * x to a gradient, in place.
 *
 * The inner loop of the fit: the weighted cross product takes most of the time.
 *
 * @param precision - lower triangle, changed
 * @param gradient - changed
 * @param rows - holds x from `base` on
 * @param base - where x begins
 * @param size - length of x
 * @param curvature - weight of the outer product
 * @param residual - weight of x in the gradient
 */
export function addOuterProduct(
  precision: Float64Array,
  gradient: Float64Array,
  rows: Float64Array,
  base: number,
  size: number,
  curvature: number,
  residual: number,
): void {
  let at = 0;
  for (let j = 0; j < size; j++) {
    const x = rows[base + j];
    gradient[j] += residual * x;
    const scaled = curvature * x;
    for (let k = 0; k <= j; k++) precision[at++] += scaled * rows[base + k];
  }
}

function identityLower(size: number): Float64Array {
  const lower = new Float64Array(lowerIndex(size, 0));
  for (let i = 0; i < size; i++) lower[lowerIndex(i, i)] = 1;
  return lower;
}
