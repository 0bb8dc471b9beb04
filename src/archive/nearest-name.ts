import { listed, quoted } from './found-text.ts';

/** Longer names are compared by their beginning: enough to find a slip of the keyboard. */
const COMPARED_CHARACTERS = 60;
/** Names shown when several are equally near. */
const SHOWN_NAMES = 3;
/**
 * Different unknown names looked up in one list before the search is given up: a list of thousands
 * compared with thousands of unknown names would take minutes, and no one reads so many faults.
 */
const LOOK_UPS = 500;

/**
 * Slips of the keyboard between two texts: letters left out, put in, exchanged or swapped with
 * their neighbour. Capitals make no difference.
 *
 * @param first - a text
 * @param second - another
 * @returns number of slips, 0 where the texts are equal
 *
 * Source: the optimal string alignment distance of F. J. Damerau, Comm. ACM 7 (1964) 171-176.
 */
export function slips(first: string, second: string): number {
  const a = first.slice(0, COMPARED_CHARACTERS).toLowerCase();
  const b = second.slice(0, COMPARED_CHARACTERS).toLowerCase();
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const differs = a[i - 1] === b[j - 1] ? 0 : 1;
      let least = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + differs);
      const swapped = i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1];
      if (swapped) least = Math.min(least, beforeLast[j - 2]! + 1);
      row.push(least);
    }
    beforeLast = last;
    last = row;
  }
  return last[b.length]!;
}

/**
 * The known names that are nearest to a text.
 *
 * @param text - what was written
 * @param names - what is known
 * @returns up to three names equally near, in the order given; empty where nothing is known
 */
export function nearestNames(text: string, names: Iterable<string>): readonly string[] {
  let least = Number.POSITIVE_INFINITY;
  let found: string[] = [];
  for (const name of names) {
    // The difference in length is a lower bound, and cheap.
    if (Math.abs(name.length - text.length) > least && name.length < COMPARED_CHARACTERS) continue;
    const distance = slips(text, name);
    if (distance < least) found = [];
    least = Math.min(least, distance);
    if (distance === least) found.push(name);
  }
  return found.slice(0, SHOWN_NAMES);
}

/** The end of a message on an unknown name: the nearest known ones, or that there are none. */
export type NameAdvice = (text: string) => string;

/**
 * Advice on unknown names against one list of known ones.
 *
 * @param names - what is known
 * @returns a function from what was written to `; nearest known: "..."`, '' where nothing is known
 */
export function nameAdvice(names: Iterable<string>): NameAdvice {
  const known = [...names];
  const answers = new Map<string, string>();
  return (text) => {
    const remembered = answers.get(text);
    if (remembered !== undefined) return remembered;
    if (answers.size >= LOOK_UPS) return '';
    const nearest = nearestNames(text, known).map(quoted);
    const advice = nearest.length === 0 ? '' : `; nearest known: ${listed(nearest)}`;
    answers.set(text, advice);
    return advice;
  };
}
