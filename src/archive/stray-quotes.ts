import { LIMITS } from './limits.ts';

/** A quote that neither opens nor closes a cell. */
export interface StrayQuote {
  /** Line on which its row begins. */
  readonly line: number;
  /** Place of its cell in the row, from 0. */
  readonly cell: number;
  /** The text from the quote on, as far as its line goes. */
  readonly found: string;
}

/** What takes the place of an opening quote that is never closed; its row is refused anyway. */
const NEUTRAL = '\u201c';

/**
 * Finds the quotes that are out of place, and makes them harmless.
 *
 * One quote that is not closed would swallow the rows below it; it is taken for an ordinary
 * character, so that only its own row is lost and the lines below keep their numbers.
 *
 * @param text - a CSV text with plain line feeds
 * @param separator - what stands between cells
 * @returns the text in which every opening quote is closed, and the stray quotes
 */
export function strayQuotes(
  text: string,
  separator: string,
): { readonly text: string; readonly stray: readonly StrayQuote[] } {
  if (!text.includes('"')) return { text, stray: [] };
  const stray: StrayQuote[] = [];
  const pieces: string[] = [];
  let copied = 0;
  let line = 1;
  let rowLine = 1;
  let cell = 0;
  let at = 0;
  while (at < text.length) {
    const begin = at;
    let end = text[at] === '"' ? endOfQuotedCell(text, at, separator) : undefined;
    if (end === undefined) {
      end = endOfPlainCell(text, at, separator);
      const quote = text.slice(at, end).indexOf('"');
      if (quote >= 0) stray.push({ line: rowLine, cell, found: text.slice(at + quote, end) });
      if (quote === 0) {
        pieces.push(text.slice(copied, at), NEUTRAL);
        copied = at + 1;
      }
    }
    if (text[begin] === '"') line += lineFeedsBetween(text, begin, end);
    const endsRow = text[end] === '\n';
    cell = endsRow ? 0 : cell + 1;
    if (endsRow) rowLine = ++line;
    at = end + 1;
  }
  return { text: pieces.join('') + text.slice(copied), stray };
}

/** Index of the separator or line feed after a well-formed quoted cell; undefined if it is not. */
function endOfQuotedCell(text: string, opening: number, separator: string): number | undefined {
  let quote = text.indexOf('"', opening + 1);
  // An escaped quote may take two characters for one; beyond that the cell is too long anyway.
  const furthest = opening + 2 * LIMITS.cellCharacters;
  while (quote >= 0 && quote <= furthest && text[quote + 1] === '"') {
    quote = text.indexOf('"', quote + 2);
  }
  if (quote < 0 || quote > furthest) return undefined;
  const next = text[quote + 1];
  return next === undefined || next === separator || next === '\n' ? quote + 1 : undefined;
}

function endOfPlainCell(text: string, begin: number, separator: string): number {
  let end = begin;
  while (end < text.length && text[end] !== separator && text[end] !== '\n') end++;
  return end;
}

function lineFeedsBetween(text: string, begin: number, end: number): number {
  let count = 0;
  for (let at = text.indexOf('\n', begin); at >= 0 && at < end; at = text.indexOf('\n', at + 1)) {
    count++;
  }
  return count;
}
