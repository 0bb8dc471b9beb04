import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';

/** A seeded source of chance. Only sums and products: the same numbers on every machine. */
export interface Chance {
  /** Uniform on [0, 1). */
  readonly uniform: () => number;
  /** About standard normal, never beyond 6. */
  readonly normal: () => number;
}

/** Keeps the streams of one seed apart from those of the next. */
const STREAM_STEP = 7919;

/**
 * One stream of chance of a studio.
 *
 * Each purpose has a stream of its own, so that a change in one leaves the others as they were.
 *
 * @param seed - which studio
 * @param stream - which purpose, 0 to 7918
 * @returns numbers that are the same for the same seed and stream
 */
export function chanceOf(seed: number, stream: number): Chance {
  const source = xoroshiro128plusFromState(stateOf(seed * STREAM_STEP + stream));
  const uniform = () => uniformFloat64(source);
  // Twelve uniforms have variance 1; no logarithm whose last digit differs between machines.
  const normal = () => Array.from({ length: 12 }, uniform).reduce((sum, u) => sum + u, -6);
  return { uniform, normal };
}

/**
 * Four words that differ in half their bits from those of any other number: neighbouring numbers as
 * they are would give neighbouring streams. A. Appleby's finalizer of MurmurHash3, from memory, on a
 * Weyl sequence.
 */
function stateOf(number: number): [number, number, number, number] {
  const word = (i: number) => {
    let bits = (number + Math.imul(i, 0x9e3779b9)) | 0;
    bits = Math.imul(bits ^ (bits >>> 16), 0x85ebca6b);
    bits = Math.imul(bits ^ (bits >>> 13), 0xc2b2ae35);
    return bits ^ (bits >>> 16);
  };
  return [word(1), word(2), word(3), word(4)];
}

/**
 * Some members of a list, chosen by chance, in the order of the list.
 *
 * @param items - what to choose from
 * @param count - how many, at most the length of the list
 * @param chance - source of chance
 * @returns the chosen ones
 */
export function chosen<T>(items: readonly T[], count: number, chance: Chance): readonly T[] {
  const drawn = items.map((item, place) => ({ item, place, ticket: chance.uniform() }));
  const winners = drawn.sort((a, b) => a.ticket - b.ticket).slice(0, count);
  return winners.sort((a, b) => a.place - b.place).map(({ item }) => item);
}
