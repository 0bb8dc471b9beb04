import { normalDensity } from './normal.ts';

/** The normal density at 8.5 is 8e-17 of its middle: what lies beyond is below rounding. */
const FARTHEST_Z = 8.5;

/**
 * Mean of a smooth function under the standard normal distribution.
 *
 * Trapezoidal rule, which converges exponentially for functions that are analytic near the real
 * line; the step must be small beside the finest feature of f.
 *
 * @param f - function of the standard score
 * @param step - distance of the nodes in z; 0.5 or less (0.5 integrates the density itself to 1e-16)
 * @returns the mean of f
 * @throws {RangeError} if the step is not above 0
 * @example
 * normalMean((z) => z * z, 0.5); // ~1.000000
 *
 * Source: L. N. Trefethen and J. A. C. Weideman, The exponentially convergent trapezoidal rule,
 * SIAM Review 56 (2014) 385-458, theorem 5.1.
 */
export function normalMean(f: (z: number) => number, step: number): number {
  const density = normalNodes(step);
  let sum = density[0]! * f(0);
  for (let i = 1; i < density.length; i++) {
    const z = i * step;
    sum += density[i]! * (f(z) + f(-z));
  }
  return sum * step;
}

/**
 * The normal density at the nodes of `normalMean`: at 0, at one step on both sides, at two, and so on.
 *
 * @param step - distance of the nodes in z
 * @returns densities; not to be changed
 * @throws {RangeError} if the step is not above 0
 * @example
 * normalNodes(0.5).length; // 18
 */
export function normalNodes(step: number): Readonly<Float64Array> {
  if (!(step > 0)) throw new RangeError(`step must be > 0, got ${step}`);
  return step === WIDEST_STEP ? AT_WIDEST_STEP : nodesAt(step);
}

function nodesAt(step: number): Float64Array {
  const density = new Float64Array(Math.ceil(FARTHEST_Z / step) + 1);
  for (let i = 0; i < density.length; i++) density[i] = normalDensity(i * step);
  return density;
}

/** The step of nearly all answers: its nodes are made once. */
const WIDEST_STEP = 0.5;
const AT_WIDEST_STEP = nodesAt(WIDEST_STEP);
