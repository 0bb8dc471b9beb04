import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { normalQuantile } from './normal.ts';

/** A source of random numbers: the same seed gives the same numbers. */
export interface Generator {
  /** Uniform on [0, 1), 53 bits. */
  readonly uniform: () => number;
  /** Standard normal. */
  readonly normal: () => number;
}

/**
 * A seeded generator.
 *
 * @param seed - 32-bit integer
 * @returns uniform and normal numbers, the same for the same seed
 * @example
 * seededGenerator(1).uniform() === seededGenerator(1).uniform(); // true
 *
 * Source: xoroshiro128+, D. Blackman and S. Vigna, ACM Trans. Math. Softw. 47 (2021) 36; normal
 * numbers by inversion (AS 241).
 */
export function seededGenerator(seed: number): Generator {
  const source = xoroshiro128plus(seed);
  const uniform = () => uniformFloat64(source);
  // Half a step away from 0, where the quantile is infinite.
  return { uniform, normal: () => normalQuantile(uniform() + 2 ** -54) };
}
