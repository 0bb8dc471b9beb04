import { textWidth } from './printable.ts';

/** Narrower than this no sentence can be read; wider terminals are used as they are. */
export const LEAST_COLUMNS = 40;

/** Where a line may break: not between a number and its percent sign. */
const GAP = / +(?!%)/;

/** Where the lines of a paragraph begin and end. */
export interface Margins {
  /** Columns of the page; below 40 counts as 40. */
  readonly columns: number;
  /** What stands before the first line: spaces or a mark. */
  readonly first?: string;
  /** What stands before the other lines. */
  readonly next?: string;
}

/**
 * A paragraph in lines that fit the page.
 *
 * Breaks at spaces only; a word longer than a line stands on a line of its own, uncut.
 *
 * @param text - one paragraph, printable
 * @param margins - width of the page and what stands before the lines
 * @returns the lines, joined
 * @example
 * wrapped('a glaze that is matte at five and gloss at six', { columns: 40, next: '  ' });
 * // 'a glaze that is matte at five and gloss\n  at six'
 */
export function wrapped(text: string, { columns, first = '', next = first }: Margins): string {
  const width = Math.max(LEAST_COLUMNS, columns);
  const lines: string[] = [];
  let line = first;
  let isEmpty = true;
  for (const word of text.split(GAP).filter((part) => part !== '')) {
    const longer = isEmpty ? line + word : `${line} ${word}`;
    if (isEmpty || textWidth(longer) <= width) {
      line = longer;
    } else {
      lines.push(line);
      line = next + word;
    }
    isEmpty = false;
  }
  return [...lines, line].join('\n');
}
