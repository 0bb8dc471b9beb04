import { textWidth } from './printable.ts';

/** Side of its column at which a cell stands. */
export type Align = 'left' | 'right';

/** A table as rows of printable cells; the first may hold the headings. */
export interface AlignedTable {
  readonly rows: readonly (readonly string[])[];
  /** One for each column; columns without one stand left. */
  readonly align?: readonly Align[];
  readonly indent?: number;
  /** Spaces between columns. */
  readonly gap?: number;
}

/**
 * The lines of a plain table: columns as wide as their widest cell, apart by spaces, no rules.
 *
 * @param table - rows, sides and spaces
 * @returns one line a row, without spaces at the end
 * @example
 * alignedLines({ rows: [['cone', 'tiles'], ['5', '12']], align: ['left', 'right'], indent: 2 });
 * // ['  cone  tiles', '  5        12']
 */
export function alignedLines({ rows, align = [], indent = 0, gap = 2 }: AlignedTable): string[] {
  const count = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const widths = Array.from({ length: count }, (_, column) =>
    rows.reduce((widest, row) => Math.max(widest, textWidth(row[column] ?? '')), 0),
  );
  return rows.map((row) => {
    const cells = widths.map((width, column) => {
      const cell = row[column] ?? '';
      const room = ' '.repeat(width - textWidth(cell));
      return align[column] === 'right' ? room + cell : cell + room;
    });
    return (' '.repeat(indent) + cells.join(' '.repeat(gap))).trimEnd();
  });
}
