import { lowerIndex } from '../numeric/linalg.ts';
import { addCrossProducts } from '../numeric/cross-products.ts';
import { expectedLikelihood, type Expected } from './label-noise.ts';

/** Unknowns of a load: see `Block.effects`. */
export const LOAD_UNKNOWNS = 2;

/**
 * Rows of one yes-or-no question, in units of the prior: weight = prior mean + sd * theta with
 * theta ~ N(0, 1). The prior's precision is then the identity, and the Hessian never worse than that.
 */
export interface Block {
  readonly count: number;
  readonly size: number;
  /** [rows][size] */
  readonly rows: Float64Array;
  /** Prior sd of each column, where the rows are not in units of the prior yet; else 1. */
  readonly scale?: Float64Array;
  /** Log-odds at the prior means. */
  readonly offset: Float64Array;
  readonly outcome: Float64Array;
  readonly weight: Float64Array;
  /** Load of each row. */
  readonly load: Int32Array;
  /** [rows][2]: what the two unknowns of the row's load, each N(0, 1), add to the log-odds. */
  readonly effects: Float64Array;
  /** Share of the outcomes that are the wrong way round. */
  readonly flipped: number;
  /**
   * So many rows at the end are no verdicts: log-odds seen at `outcome` with a Gaussian error of precision
   * `weight`; none where absent.
   */
  readonly assumed?: number;
}

/** Questions that share the unknowns of their loads. */
export interface LatentProblem {
  readonly blocks: readonly Block[];
  readonly loadCount: number;
}

/** A point in the unknowns, and the spread that the likelihood is averaged over. */
export interface Unknowns {
  /** The blocks' weights, end to end. */
  readonly theta: Float64Array;
  /** [loads][2] */
  readonly loads: Float64Array;
  /** Per block, sd of each row's log-odds; none for a plain likelihood. */
  readonly sds?: readonly Float64Array[];
}

/** Blocks of gradient and negative Hessian: weights, loads and their coupling. */
export interface NewtonSystem {
  readonly logDensity: number;
  readonly gradient: Float64Array;
  /** [loads][2] */
  readonly loadGradient: Float64Array;
  /** Lower triangle, row by row. */
  readonly precision: Float64Array;
  /** [loads][3]: the elements (0, 0), (1, 0), (1, 1) of each load's block. */
  readonly loadPrecision: Float64Array;
  /** [loads][2][weights] */
  readonly coupling: Float64Array;
}

/** Number of weights of all blocks. */
export function weightCount({ blocks }: LatentProblem): number {
  return blocks.reduce((sum, { size }) => sum + size, 0);
}

/**
 * Log-odds of one row.
 *
 * @param block - the row's block
 * @param first - place of the block's first weight in `theta`
 * @param unknowns - weights and loads
 * @param i - which row
 */
export function rowLogOdds(
  block: Block,
  first: number,
  { theta, loads }: Unknowns,
  i: number,
): number {
  return logOddsAt(block, scaledWeights(block, first, theta), loads, i);
}

/** Weights of a block's rows as they are stored. */
function scaledWeights({ size, scale }: Block, first: number, theta: Float64Array): Float64Array {
  const weights = theta.slice(first, first + size);
  if (scale) for (let j = 0; j < size; j++) weights[j]! *= scale[j]!;
  return weights;
}

function logOddsAt(
  { size, rows, offset, load, effects }: Block,
  weights: Float64Array,
  loads: Float64Array,
  i: number,
): number {
  let sum = offset[i]!;
  const base = i * size;
  for (let j = 0; j < size; j++) sum += rows[base + j]! * weights[j]!;
  const l = 2 * load[i]!;
  return sum + effects[2 * i]! * loads[l]! + effects[2 * i + 1]! * loads[l + 1]!;
}

/**
 * Log-odds of all rows of a block.
 *
 * @param block - the block
 * @param first - place of its first weight in `theta`
 * @param unknowns - weights and loads
 * @returns per row
 */
export function blockLogOdds(block: Block, first: number, unknowns: Unknowns): Float64Array {
  const weights = scaledWeights(block, first, unknowns.theta);
  const logOdds = new Float64Array(block.count);
  for (let i = 0; i < block.count; i++) logOdds[i] = logOddsAt(block, weights, unknowns.loads, i);
  return logOdds;
}

/**
 * Expected log likelihood plus log prior density, the prior's constant left out.
 *
 * @param problem - the questions
 * @param unknowns - where
 * @returns natural logarithm of the joint density, times (2 pi)^(unknowns / 2)
 */
export function logDensity(problem: LatentProblem, unknowns: Unknowns): number {
  const expected: Expected = { value: 0, slope: 0, curvature: 0 };
  let sum = 0;
  let first = 0;
  problem.blocks.forEach((block, b) => {
    const sds = unknowns.sds?.[b];
    const weights = scaledWeights(block, first, unknowns.theta);
    for (let i = 0; i < block.count; i++) {
      const logOdds = logOddsAt(block, weights, unknowns.loads, i);
      likelihoodOf(block, i, logOdds, sds ? sds[i]! : 0, expected);
      sum += block.weight[i]! * expected.value;
    }
    first += block.size;
  });
  return sum - 0.5 * (sumOfSquares(unknowns.theta) + sumOfSquares(unknowns.loads));
}

function likelihoodOf(
  { count, outcome, flipped, assumed = 0 }: Block,
  i: number,
  logOdds: number,
  sd: number,
  into: Expected,
): void {
  if (i < count - assumed) {
    expectedLikelihood(logOdds, sd, outcome[i]!, flipped, into);
    return;
  }
  const off = outcome[i]! - logOdds;
  into.value = -0.5 * (off * off + sd * sd);
  into.slope = off;
  into.curvature = 1;
}

function sumOfSquares(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

/**
 * Log density, its gradient and its negative Hessian.
 *
 * The curvature of a doubtful verdict, which bends the wrong way, is left out: the negative Hessian is
 * positive definite for certain, and exact where no verdict is doubtful. The loads' part falls into
 * blocks of two, since a row belongs to one load.
 *
 * @param problem - the questions
 * @param unknowns - where
 * @param isExact - keep that curvature; the negative Hessian may then not be positive definite
 * @param spare - an array of the coupling's length to write it to
 * @returns all of them
 */
export function newtonSystem(
  problem: LatentProblem,
  unknowns: Unknowns,
  isExact = false,
  spare?: Float64Array,
): NewtonSystem {
  const width = weightCount(problem);
  const { loadCount } = problem;
  const precision = new Float64Array(lowerIndex(width, 0));
  for (let j = 0; j < width; j++) precision[lowerIndex(j, j)] = 1;
  const loadPrecision = new Float64Array(3 * loadCount);
  for (let l = 0; l < loadCount; l++) loadPrecision[3 * l] = loadPrecision[3 * l + 2] = 1;
  const sums = {
    likelihood: 0,
    gradient: unknowns.theta.map((t) => -t),
    loadGradient: unknowns.loads.map((u) => -u),
    precision,
    loadPrecision,
    coupling: emptied(LOAD_UNKNOWNS * loadCount * width, spare),
  };
  let first = 0;
  problem.blocks.forEach((block, b) => {
    addBlock(block, first, unknowns, { sds: unknowns.sds?.[b], isExact }, sums);
    first += block.size;
  });
  const { likelihood, ...rest } = sums;
  const squares = sumOfSquares(unknowns.theta) + sumOfSquares(unknowns.loads);
  return { logDensity: likelihood - 0.5 * squares, ...rest };
}

function emptied(length: number, spare?: Float64Array): Float64Array {
  return spare?.length === length ? spare.fill(0) : new Float64Array(length);
}

interface Sums extends Omit<NewtonSystem, 'logDensity'> {
  likelihood: number;
}

function addBlock(
  block: Block,
  first: number,
  unknowns: Unknowns,
  { sds, isExact }: { readonly sds: Float64Array | undefined; readonly isExact: boolean },
  sums: Sums,
): void {
  const expected: Expected = { value: 0, slope: 0, curvature: 0 };
  const weights = scaledWeights(block, first, unknowns.theta);
  const curvatures = new Float64Array(block.count);
  const gradient = new Float64Array(block.size);
  for (let i = 0; i < block.count; i++) {
    const logOdds = logOddsAt(block, weights, unknowns.loads, i);
    likelihoodOf(block, i, logOdds, sds ? sds[i]! : 0, expected);
    const weight = block.weight[i]!;
    sums.likelihood += weight * expected.value;
    curvatures[i] = weight * (isExact ? expected.curvature : Math.max(0, expected.curvature));
    addRow(block, first, i, weight * expected.slope, curvatures[i]!, gradient, sums);
  }
  const products = new Float64Array(lowerIndex(block.size, 0));
  addCrossProducts(block.rows, block.size, curvatures, products);
  addScaled(block, first, gradient, products, sums);
}

/** From the rows' own units to those of the prior. */
function addScaled(
  { size, scale }: Block,
  first: number,
  gradient: Float64Array,
  products: Float64Array,
  sums: Sums,
): void {
  const width = sums.gradient.length;
  for (let j = 0; j < size; j++) {
    const own = scale?.[j] ?? 1;
    sums.gradient[first + j]! += own * gradient[j]!;
    const from = lowerIndex(j, 0);
    const to = lowerIndex(first + j, first);
    for (let k = 0; k <= j; k++) {
      sums.precision[to + k]! += own * (scale?.[k] ?? 1) * products[from + k]!;
    }
  }
  if (!scale) return;
  for (let base = first; base < sums.coupling.length; base += width) {
    for (let j = 0; j < size; j++) sums.coupling[base + j]! *= scale[j]!;
  }
}

/** Adds a row's share in the gradient, and in what concerns its load. */
function addRow(
  { size, rows, load, effects }: Block,
  first: number,
  i: number,
  slope: number,
  curvature: number,
  gradient: Float64Array,
  { gradient: { length: width }, loadGradient, loadPrecision, coupling }: Sums,
): void {
  const l = load[i]!;
  const one = effects[2 * i]!;
  const two = effects[2 * i + 1]!;
  loadGradient[2 * l]! += slope * one;
  loadGradient[2 * l + 1]! += slope * two;
  loadPrecision[3 * l]! += curvature * one * one;
  loadPrecision[3 * l + 1]! += curvature * one * two;
  loadPrecision[3 * l + 2]! += curvature * two * two;
  const base = i * size;
  const toOne = 2 * l * width + first;
  const toTwo = toOne + width;
  for (let j = 0; j < size; j++) {
    const x = rows[base + j]!;
    gradient[j]! += slope * x;
    coupling[toOne + j]! += curvature * x * one;
  }
  // Melting does not ask for a load's intercept of gloss.
  if (two === 0) return;
  for (let j = 0; j < size; j++) coupling[toTwo + j]! += curvature * rows[base + j]! * two;
}
