import { seededGenerator, type Generator } from '../../../src/numeric/random.ts';

/** What the streams of a studio are for: a change in one leaves the others as they were. */
const STREAMS = ['truth', 'plan', 'recipes', 'heat', 'weighing', 'surfaces', 'labels', 'points'];
export type Stream =
  'truth' | 'plan' | 'recipes' | 'heat' | 'weighing' | 'surfaces' | 'labels' | 'points';

/** Keeps the streams of one studio apart from those of the next. */
const STREAM_STEP = 7919;

/**
 * One stream of chance of a studio.
 *
 * @param seed - which studio, a whole number
 * @param stream - what it decides
 * @param size - judged tiles, where the stream differs by size
 * @returns numbers that are the same for the same arguments
 */
export function chanceOf(seed: number, stream: Stream, size = 0): Generator {
  const mixed = Math.imul(seed, STREAM_STEP) + Math.imul(size, 104729) + STREAMS.indexOf(stream);
  return seededGenerator(mixed | 0);
}

/** Uniform between two ends. */
export function between(chance: Generator, low: number, high: number): number {
  return low + (high - low) * chance.uniform();
}

/** Log-uniform between two ends above 0. */
export function ratioBetween(chance: Generator, low: number, high: number): number {
  return low * (high / low) ** chance.uniform();
}

/** Normal about a mean. */
export function around(chance: Generator, mean: number, sd: number): number {
  return mean + sd * chance.normal();
}

/** True with the given probability. */
export function happens(chance: Generator, probability: number): boolean {
  return chance.uniform() < probability;
}

/** One member of a list that is not empty. */
export function oneOf<T>(chance: Generator, items: readonly T[]): T {
  return items[Math.floor(chance.uniform() * items.length)];
}
