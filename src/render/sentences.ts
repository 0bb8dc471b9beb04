/**
 * A count and its noun.
 *
 * @param count - how many
 * @param noun - in the singular, its plural made with an s
 * @returns such as `1 tile` or `2,140 tiles`
 * @example
 * countOf(1, 'tile'); // '1 tile'
 * countOf(2140, 'tile'); // '2,140 tiles'
 */
export function countOf(count: number, noun: string): string {
  return `${grouped(count)} ${noun}${count === 1 ? '' : 's'}`;
}

/**
 * A count with a comma at the thousands.
 *
 * @param count - whole number
 * @returns its digits
 * @example
 * grouped(12345); // '12,345'
 */
export function grouped(count: number): string {
  return String(count).replace(/\B(?=(?:\d{3})+$)/g, ',');
}

/**
 * Words as a list for a sentence.
 *
 * @param words - the words
 * @returns `a, b and c`
 * @example
 * listOf(['5', '6', '7']); // '5, 6 and 7'
 */
export function listOf(words: readonly string[]): string {
  const last = words.at(-1) ?? '';
  return words.length < 2 ? last : `${words.slice(0, -1).join(', ')} and ${last}`;
}
