import { listed, quoted } from './found-text.ts';
import { byName } from './name-order.ts';

/** Names that a sentence spells out. */
const SHOWN_NAMES = 6;
/** Names that a sentence spells out of each of several groups. */
export const SHOWN_OF_GROUP = 3;

/**
 * Names as a list for a sentence: of many the first, and how many more.
 *
 * @param names - safe to print, those to look at first in front
 * @param shown - how many to spell out
 * @returns `a, b and c`, `a, b, c and 7 more`
 */
export function shortened(names: readonly string[], shown = SHOWN_NAMES): string {
  const left = names.length - shown;
  if (left <= 0) return listed(names, 'and');
  return `${names.slice(0, shown).join(', ')} and ${left} more`;
}

/**
 * The names of one group among several in a sentence.
 *
 * @param names - safe to print
 * @returns as `shortened`, with fewer names
 */
export function shortenedGroup(names: readonly string[]): string {
  return shortened(names, SHOWN_OF_GROUP);
}

/**
 * A name safe to print in a list, without quotes.
 *
 * @param name - as written
 * @returns the name, invisible characters as their code, cut if long
 */
export function printed(name: string): string {
  return quoted(name).slice(1, -1);
}

/** Something odd in words, and by how much it is. */
export interface OddThing {
  readonly words: string;
  readonly by: number;
}

/**
 * Odd things as a list for a sentence: those farthest off first, those equally far by name.
 *
 * @param things - at least one
 * @param shown - how many to spell out
 * @returns as `shortened`
 */
export function farthest(things: readonly OddThing[], shown = SHOWN_NAMES): string {
  const sorted = [...things].sort((a, b) => b.by - a.by || byName(a.words, b.words));
  return shortened(
    sorted.map(({ words }) => words),
    shown,
  );
}
