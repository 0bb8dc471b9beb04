import { normalCdf, normalQuantile } from '../../../src/numeric/normal.ts';
import { seededGenerator, type Generator } from '../../../src/numeric/random.ts';

/** Normal numbers are drawn by inversion, half a step away from 0: so a draw can be read back. */
const HALF_STEP = 2 ** -54;

/**
 * Chance that gives what is written: each draw, uniform or normal, takes the next standard score.
 *
 * @param scores - standard scores, independent and standard normal a priori
 * @returns a generator; it throws where the scores are used up
 */
export function scriptedChance(scores: ArrayLike<number>): Generator {
  let at = 0;
  const next = () => {
    if (at >= scores.length) throw new RangeError(`only ${scores.length} scores are written`);
    return scores[at++];
  };
  return { uniform: () => normalCdf(next()), normal: next };
}

/**
 * The standard scores of what a seeded generator gives.
 *
 * @param seed - of the generator
 * @param use - takes numbers from it
 * @returns one score a number taken, in order
 */
export function scoresOf(seed: Generator, use: (chance: Generator) => unknown): number[] {
  const scores: number[] = [];
  const taken = (score: number) => {
    scores.push(score);
    return score;
  };
  use({
    uniform: () => {
      const u = seed.uniform();
      taken(normalQuantile(u + HALF_STEP));
      return u;
    },
    normal: () => taken(seed.normal()),
  });
  return scores;
}

/** A generator for the walk of a chain, apart from those of the studios. */
export const walkChance = (seed: number, chain: number): Generator =>
  seededGenerator(Math.imul(seed, 31337) + chain);
