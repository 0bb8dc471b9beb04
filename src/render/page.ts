import { printable } from './printable.ts';
import { wrapped } from './wrapped.ts';

/** What a page is written on. Nothing is said by `strong` alone: the words must do without it. */
export interface Look {
  /** Columns of the page. */
  readonly columns: number;
  /** Makes a heading stand out; the text unchanged where that is not wanted. */
  readonly strong: (text: string) => string;
}

/** A part of a page: a heading at the margin, its lines below and to the right. */
export interface Section {
  readonly heading?: string;
  readonly lines: readonly string[];
}

/** A page of 80 columns without any marking. */
export const PLAIN_LOOK: Look = { columns: 80, strong: (text) => text };

/** Columns by which what stands under a heading is set in. */
export const INDENT = 2;

/**
 * A page of sections, a blank line between them and one at the end of the text.
 *
 * @param sections - those without lines are left out
 * @param look - how headings stand out
 * @returns the text, ending with a newline
 * @example
 * pageOf([{ heading: 'Tiles', lines: ['  12 read'] }], PLAIN_LOOK); // 'Tiles\n  12 read\n'
 */
export function pageOf(sections: readonly Section[], { strong }: Look): string {
  const blocks = sections
    .filter(({ lines }) => lines.length > 0)
    .map(({ heading, lines }) => [...(heading === undefined ? [] : [strong(heading)]), ...lines]);
  return `${blocks.map((lines) => lines.join('\n')).join('\n\n')}\n`;
}

/**
 * A paragraph under a heading.
 *
 * @param text - prose, made printable here
 * @param look - width of the page
 * @returns its lines as one text, set in
 * @example
 * prose('Fire a test tile.', PLAIN_LOOK); // '  Fire a test tile.'
 */
export function prose(text: string, { columns }: Look): string {
  return wrapped(printable(text), { columns, first: ' '.repeat(INDENT) });
}

/**
 * A point of a list under a heading.
 *
 * @param text - prose, made printable here
 * @param look - width of the page
 * @returns its lines as one text, a dash before the first
 * @example
 * point('Fire a test tile.', PLAIN_LOOK); // '  - Fire a test tile.'
 */
export function point(text: string, { columns }: Look): string {
  const first = `${' '.repeat(INDENT)}- `;
  return wrapped(printable(text), { columns, first, next: ' '.repeat(first.length) });
}
