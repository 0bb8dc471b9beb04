import { lowerIndex } from '../numeric/linalg.ts';
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
  { size, rows, offset, load, effects }: Block,
  first: number,
  { theta, loads }: Unknowns,
  i: number,
): number {
  let sum = offset[i]!;
  const base = i * size;
  for (let j = 0; j < size; j++) sum += rows[base + j]! * theta[first + j]!;
  const l = 2 * load[i]!;
  return sum + effects[2 * i]! * loads[l]! + effects[2 * i + 1]! * loads[l + 1]!;
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
    for (let i = 0; i < block.count; i++) {
      const logOdds = rowLogOdds(block, first, unknowns, i);
      expectedLikelihood(logOdds, sds ? sds[i]! : 0, block.outcome[i]!, block.flipped, expected);
      sum += block.weight[i]! * expected.value;
    }
    first += block.size;
  });
  return sum - 0.5 * (sumOfSquares(unknowns.theta) + sumOfSquares(unknowns.loads));
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
 * positive definite for certain, and exact where no verdict is doubtful. The loads' part falls into blocks of two, since a row belongs to one load.
 *
 * @param problem - the questions
 * @param unknowns - where
 * @returns all of them
 */
export function newtonSystem(problem: LatentProblem, unknowns: Unknowns): NewtonSystem {
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
    coupling: new Float64Array(LOAD_UNKNOWNS * loadCount * width),
  };
  let first = 0;
  problem.blocks.forEach((block, b) => {
    addBlock(block, first, unknowns, unknowns.sds?.[b], sums);
    first += block.size;
  });
  const { likelihood, ...rest } = sums;
  const squares = sumOfSquares(unknowns.theta) + sumOfSquares(unknowns.loads);
  return { logDensity: likelihood - 0.5 * squares, ...rest };
}

interface Sums extends Omit<NewtonSystem, 'logDensity'> {
  likelihood: number;
}

function addBlock(
  block: Block,
  first: number,
  unknowns: Unknowns,
  sds: Float64Array | undefined,
  sums: Sums,
): void {
  const expected: Expected = { value: 0, slope: 0, curvature: 0 };
  const curvatures = new Float64Array(block.count);
  for (let i = 0; i < block.count; i++) {
    const logOdds = rowLogOdds(block, first, unknowns, i);
    expectedLikelihood(logOdds, sds ? sds[i]! : 0, block.outcome[i]!, block.flipped, expected);
    const weight = block.weight[i]!;
    sums.likelihood += weight * expected.value;
    curvatures[i] = weight * Math.max(0, expected.curvature);
    addLoad(block, first, i, weight * expected.slope, curvatures[i]!, sums);
  }
  addCrossProducts(block, first, curvatures, sums.precision);
}

/**
 * Adds the rows' weighted cross products: the inner loop of the fit, which takes most of its time. Four
 * rows at once, so that the sums are read and written a quarter as often.
 */
function addCrossProducts(
  { count, size, rows }: Block,
  first: number,
  curvatures: Float64Array,
  precision: Float64Array,
): void {
  let i = 0;
  for (; i + 4 <= count; i += 4) {
    const [a, b, c, d] = [i * size, (i + 1) * size, (i + 2) * size, (i + 3) * size];
    for (let j = 0; j < size; j++) {
      const p = curvatures[i]! * rows[a + j]!;
      const q = curvatures[i + 1]! * rows[b + j]!;
      const r = curvatures[i + 2]! * rows[c + j]!;
      const s = curvatures[i + 3]! * rows[d + j]!;
      const cell = lowerIndex(first + j, first);
      for (let k = 0; k <= j; k++) {
        precision[cell + k]! +=
          p * rows[a + k]! + q * rows[b + k]! + (r * rows[c + k]! + s * rows[d + k]!);
      }
    }
  }
  for (; i < count; i++) {
    const a = i * size;
    for (let j = 0; j < size; j++) {
      const p = curvatures[i]! * rows[a + j]!;
      const cell = lowerIndex(first + j, first);
      for (let k = 0; k <= j; k++) precision[cell + k]! += p * rows[a + k]!;
    }
  }
}

/** Adds a row's share in the gradient, and in what concerns its load. */
function addLoad(
  { size, rows, load, effects }: Block,
  first: number,
  i: number,
  slope: number,
  curvature: number,
  { gradient, loadGradient, loadPrecision, coupling }: Sums,
): void {
  const l = load[i]!;
  const [one, two] = [effects[2 * i]!, effects[2 * i + 1]!];
  loadGradient[2 * l]! += slope * one;
  loadGradient[2 * l + 1]! += slope * two;
  loadPrecision[3 * l]! += curvature * one * one;
  loadPrecision[3 * l + 1]! += curvature * one * two;
  loadPrecision[3 * l + 2]! += curvature * two * two;
  const base = i * size;
  const toOne = 2 * l * gradient.length + first;
  const toTwo = toOne + gradient.length;
  for (let j = 0; j < size; j++) {
    const x = rows[base + j]!;
    gradient[first + j]! += slope * x;
    coupling[toOne + j]! += curvature * x * one;
    coupling[toTwo + j]! += curvature * x * two;
  }
}
