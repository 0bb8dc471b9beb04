import {
  choleskyInverse,
  dot,
  lowerIndex,
  quadraticForm,
  symmetricTimes,
} from '../numeric/linalg.ts';
import { LOAD_UNKNOWNS, type Block, type LatentProblem } from './latent.ts';
import type { NewtonStep } from './newton.ts';

/** What is not known of the weights and the loads, in units of the prior. */
export interface PosteriorSpread {
  /** Of the weights, the loads integrated out: lower triangle. */
  readonly covariance: Float64Array;
  /** [loads][2] */
  readonly loadVariance: Float64Array;
}

/**
 * Covariance of the weights and variance of the loads' unknowns, in units of the prior.
 *
 * @param step - Newton's step at the maximum
 * @returns lower triangle, and [loads][2]
 */
export function posteriorSpread({
  factor,
  loadInverse,
  pulled,
  theta,
}: NewtonStep): PosteriorSpread {
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
 * With what a load explains taken off, y = x - (load's block)^-1 coupling z, the variance is y' V y + z'
 * (load's block)^-1 z. All of it that concerns the load alone is computed once a load.
 *
 * @param problem - the questions
 * @param step - Newton's step at the maximum
 * @returns per block, per row
 */
export function rowSds({ blocks, loadCount }: LatentProblem, step: NewtonStep): Float64Array[] {
  const covariance = choleskyInverse(step.factor, step.theta.length);
  const ofLoads = loadTerms(step, covariance, loadCount);
  let first = 0;
  return blocks.map((block) => {
    const own = ownCovariance(covariance, first, block);
    const images = ownImages(ofLoads.images, first, block, step.theta.length);
    const sds = Float64Array.from({ length: block.count }, (_, i) =>
      Math.sqrt(rowVariance(block, i, own, images, ofLoads.variances)),
    );
    first += block.size;
    return sds;
  });
}

/** Per load: V q for both of its unknowns' pulls q, and the three variances of the unknowns. */
interface LoadTerms {
  /** [loads][2][weights] */
  readonly images: Float64Array;
  /** [loads][3] */
  readonly variances: Float64Array;
}

function loadTerms(
  { loadInverse, pulled, theta }: NewtonStep,
  covariance: Float64Array,
  loadCount: number,
): LoadTerms {
  const width = theta.length;
  const images = new Float64Array(LOAD_UNKNOWNS * loadCount * width);
  const variances = Float64Array.from(loadInverse);
  for (let l = 0; l < loadCount; l++) {
    const at = LOAD_UNKNOWNS * l * width;
    const [one, two] = [
      pulled.subarray(at, at + width),
      pulled.subarray(at + width, at + 2 * width),
    ];
    images.set(symmetricTimes(covariance, one), at);
    images.set(symmetricTimes(covariance, two), at + width);
    variances[3 * l]! += dot(one, images.subarray(at, at + width));
    variances[3 * l + 1]! += dot(two, images.subarray(at, at + width));
    variances[3 * l + 2]! += dot(two, images.subarray(at + width, at + 2 * width));
  }
  return { images, variances };
}

/** The part of the covariance that concerns one block, for its rows as they are stored. */
function ownCovariance(
  covariance: Float64Array,
  first: number,
  { size, scale }: Block,
): Float64Array {
  const own = new Float64Array(lowerIndex(size, 0));
  for (let i = 0; i < size; i++) {
    const from = lowerIndex(first + i, first);
    const to = lowerIndex(i, 0);
    for (let j = 0; j <= i; j++) {
      own[to + j] = covariance[from + j]! * (scale?.[i] ?? 1) * (scale?.[j] ?? 1);
    }
  }
  return own;
}

/** The part of the loads' images that concerns one block: [loads][2][size]. */
function ownImages(
  images: Float64Array,
  first: number,
  { size, scale }: Block,
  width: number,
): Float64Array {
  const own = new Float64Array((images.length / width) * size);
  for (let row = 0; row * width < images.length; row++) {
    for (let j = 0; j < size; j++) {
      own[row * size + j] = images[row * width + first + j]! * (scale?.[j] ?? 1);
    }
  }
  return own;
}

function rowVariance(
  { size, rows, load, effects }: Block,
  i: number,
  own: Float64Array,
  images: Float64Array,
  variances: Float64Array,
): number {
  const [one, two] = [effects[2 * i]!, effects[2 * i + 1]!];
  const x = rows.subarray(i * size, (i + 1) * size);
  const at = LOAD_UNKNOWNS * load[i]! * size;
  let shared = 0;
  for (let j = 0; j < size; j++) {
    shared += x[j]! * (one * images[at + j]! + two * images[at + size + j]!);
  }
  const block = 3 * load[i]!;
  const ofLoad =
    variances[block]! * one * one +
    2 * variances[block + 1]! * one * two +
    variances[block + 2]! * two * two;
  return Math.max(0, quadraticForm(own, x) - 2 * shared + ofLoad);
}
