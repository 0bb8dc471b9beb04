import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';
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
 * numbers by inversion (AS 241); state filled by a hash (A. Appleby's finalizer of MurmurHash3, from
 * memory), since neighbouring seeds as they are give neighbouring numbers.
 */
export function seededGenerator(seed: number): Generator {
  const source = xoroshiro128plusFromState(stateOf(seed));
  const uniform = () => uniformFloat64(source);
  // Half a step away from 0, where the quantile is infinite.
  return { uniform, normal: () => normalQuantile(uniform() + 2 ** -54) };
}

/** Step of a Weyl sequence: 2^32 over the golden ratio. */
const WEYL_STEP = 0x9e3779b9;

/** Four words that differ in half their bits from those of any other seed. */
function stateOf(seed: number): [number, number, number, number] {
  const word = (i: number) => {
    let bits = (seed + Math.imul(i, WEYL_STEP)) | 0;
    bits = Math.imul(bits ^ (bits >>> 16), 0x85ebca6b);
    bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
    return bits ^ (bits >>> 16);
  };
  return [word(1), word(2), word(3), word(4)];
}
