/** Longest piece of a cell that a message repeats; the place is given beside it. */
const SHOWN_CHARACTERS = 60;

/**
 * What was found in a cell, for a message.
 *
 * Control and other invisible characters are written as their code, so that a cell cannot move the
 * cursor of the terminal that shows it; long cells are cut.
 *
 * @param text - the cell as read
 * @returns `got "..."` or `got a blank cell`
 */
export function got(text: string): string {
  return text.trim() === '' ? 'got a blank cell' : `got ${quoted(text)}`;
}

/**
 * A text in quotes, safe to print and not longer than a message bears.
 *
 * @param text - any text
 * @returns the text in double quotes
 */
export function quoted(text: string): string {
  const characters = Array.from(text.slice(0, 4 * SHOWN_CHARACTERS));
  const isLong = characters.length > SHOWN_CHARACTERS;
  const short = isLong ? `${characters.slice(0, SHOWN_CHARACTERS - 1).join('')}…` : text;
  return `"${short.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu, codeOf)}"`;
}

/**
 * Words as a list for a sentence.
 *
 * @param words - the words, at least one
 * @param last - what stands before the last of them
 * @returns `a, b or c`
 */
export function listed(words: readonly string[], last: 'or' | 'and' = 'or'): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} ${last} ${words.at(-1) ?? ''}`;
}

/**
 * A count and its noun.
 *
 * @param count - how many
 * @param noun - the noun in the singular, its plural made with an s
 * @returns `1 tile`, `2 tiles`
 */
export function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? '' : 's'}`;
}

function codeOf(character: string): string {
  return `\\u{${(character.codePointAt(0) ?? 0).toString(16)}}`;
}
