import { choleskyInverse, dot, lowerIndex } from '../numeric/linalg.ts';
import { quadraticForms, symmetricImages } from '../numeric/symmetric-images.ts';
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
  const loadVariance = quadraticForms(pulled, width, covariance);
  for (let row = 0; row < loadVariance.length; row++) {
    loadVariance[row]! += loadInverse[3 * (row >> 1) + 2 * (row % 2)]!;
  }
  return { covariance, loadVariance };
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
    const sds = quadraticForms(block.rows, block.size, own);
    for (let i = 0; i < block.count; i++) {
      const more = loadVariance(block, i, images, ofLoads.variances);
      sds[i] = Math.sqrt(Math.max(0, sds[i]! + more));
    }
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
  const images = symmetricImages(pulled, width, covariance);
  const variances = Float64Array.from(loadInverse);
  for (let l = 0; l < loadCount; l++) {
    const at = LOAD_UNKNOWNS * l * width;
    const [one, two] = [
      pulled.subarray(at, at + width),
      pulled.subarray(at + width, at + 2 * width),
    ];
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

/** What a row's load adds to the variance of its log-odds, and takes off by what the two share. */
function loadVariance(
  { size, rows, load, effects }: Block,
  i: number,
  images: Float64Array,
  variances: Float64Array,
): number {
  const one = effects[2 * i]!;
  const two = effects[2 * i + 1]!;
  const at = LOAD_UNKNOWNS * load[i]! * size;
  let shared = 0;
  for (let j = 0, x = i * size; j < size; j++, x++) {
    shared += rows[x]! * (one * images[at + j]! + two * images[at + size + j]!);
  }
  const block = 3 * load[i]!;
  const ofLoad =
    variances[block]! * one * one +
    2 * variances[block + 1]! * one * two +
    variances[block + 2]! * two * two;
  return ofLoad - 2 * shared;
}
