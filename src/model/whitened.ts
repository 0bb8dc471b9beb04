import { dot, lowerIndex } from '../numeric/linalg.ts';
import { log1pExp, sigmoid } from '../numeric/logistic.ts';

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

/**
 * The problem in units of the prior: weight = prior mean + sd * theta, theta ~ N(0, 1). The prior's
 * precision is then the identity, so the Hessian is never worse than that.
 */
export interface Whitened {
  readonly count: number;
  readonly size: number;
  readonly loadCount: number;
  /** [tiles][columns], each column times its prior sd. */
  readonly rows: Float64Array;
  /** Log-odds at theta = 0. */
  readonly offset: Float64Array;
  readonly outcome: Float64Array;
  readonly weight: Float64Array;
  readonly load: Int32Array;
  readonly loadSd: number;
}

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

/**
 * A logistic regression in units of its prior.
 *
 * @param data - rows, outcomes, weights, loads
 * @param prior - means and sds
 * @returns the whitened problem
 * @throws {RangeError} if the shapes differ, a prior sd is not above 0 or an entry is not finite
 */
export function whitened(data: LogisticData, prior: LogisticPrior): Whitened {
  const count = data.rows.length;
  const size = prior.mean.length;
  checkShapes(data, prior);
  const loadCount = data.load === undefined ? 0 : Math.max(-1, ...new Set(data.load)) + 1;
  const rows = new Float64Array(count * size);
  const offset = new Float64Array(count);
  data.rows.forEach((row, i) => {
    offset[i] = dot(row, prior.mean);
    for (let j = 0; j < size; j++) rows[i * size + j] = row[j]! * prior.sd[j]!;
  });
  return {
    count,
    size,
    loadCount,
    rows,
    offset,
    outcome: Float64Array.from(data.outcome),
    weight: data.weight ? Float64Array.from(data.weight) : new Float64Array(count).fill(1),
    load: Int32Array.from(data.load ?? []),
    loadSd: prior.loadSd ?? 0,
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

function logOddsOf(problem: Whitened, theta: Float64Array, loads: Float64Array, i: number): number {
  const { size, rows, offset, load, loadCount, loadSd } = problem;
  let sum = offset[i]!;
  const base = i * size;
  for (let j = 0; j < size; j++) sum += rows[base + j]! * theta[j]!;
  return loadCount > 0 ? sum + loadSd * loads[load[i]!]! : sum;
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
    sum += problem.weight[i]! * (problem.outcome[i]! * logOdds - log1pExp(logOdds));
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
    const outcome = problem.outcome[i]!;
    // Not `outcome - yes`, which loses every digit where yes is near 1.
    const residual = problem.weight[i]! * (outcome * no - (1 - outcome) * yes);
    const curvature = problem.weight[i]! * yes * no;
    const base = i * size;
    addOuterProduct(precision, gradient, rows, base, size, curvature, residual);
    if (loadCount === 0) continue;
    const l = load[i]!;
    loadGradient[l]! += residual * loadSd;
    loadPrecision[l]! += curvature * loadSd * loadSd;
    for (let j = 0; j < size; j++) coupling[l * size + j]! += curvature * loadSd * rows[base + j]!;
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
    const x = rows[base + j]!;
    gradient[j]! += residual * x;
    const scaled = curvature * x;
    for (let k = 0; k <= j; k++) precision[at++]! += scaled * rows[base + k]!;
  }
}

function identityLower(size: number): Float64Array {
  const lower = new Float64Array(lowerIndex(size, 0));
  for (let i = 0; i < size; i++) lower[lowerIndex(i, i)] = 1;
  return lower;
}
