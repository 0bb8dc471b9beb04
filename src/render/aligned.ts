import { textWidth } from './printable.ts';
import { LEAST_COLUMNS } from './wrapped.ts';

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
  /** Columns of the page; a wider table is folded. */
  readonly columns?: number;
}

/** By so much the columns that were folded below the first ones are set in. */
const FOLD_INDENT = 4;

/**
 * The rows of a plain table: columns as wide as their widest cell, apart by spaces, no rules.
 *
 * A table wider than the page moves closer together; where that is not enough, its last columns stand
 * in a second line of each row.
 *
 * @param table - rows, sides, spaces and width
 * @returns one text a row, of one line or, where folded, more; without spaces at the end
 * @example
 * alignedLines({ rows: [['cone', 'tiles'], ['5', '12']], align: ['left', 'right'], indent: 2 });
 * // ['  cone  tiles', '  5        12']
 */
export function alignedLines(table: AlignedTable): string[] {
  const { rows, align = [], indent = 0, columns } = table;
  const wide = laidOut(table);
  if (columns === undefined) return wide;
  const width = Math.max(LEAST_COLUMNS, columns);
  if (fits(wide, width)) return wide;
  const close = laidOut({ ...table, gap: 1 });
  if (fits(close, width)) return close;
  const kept = columnsThatFit(table, width);
  const rest = alignedLines({
    ...table,
    rows: rows.map((row) => row.slice(kept)),
    align: align.slice(kept),
    indent: Math.min(indent + FOLD_INDENT, width / 2),
  });
  const first = laidOut({ ...table, rows: rows.map((row) => row.slice(0, kept)) });
  return first.map((line, row) => (rest[row] ? `${line}\n${rest[row]}` : line));
}

function laidOut({ rows, align = [], indent = 0, gap = 2 }: AlignedTable): string[] {
  const widths = columnWidths(rows);
  return rows.map((row) => {
    const cells = widths.map((width, column) => {
      const cell = row[column] ?? '';
      const room = ' '.repeat(width - textWidth(cell));
      return align[column] === 'right' ? room + cell : cell + room;
    });
    return (' '.repeat(indent) + cells.join(' '.repeat(gap))).trimEnd();
  });
}

function columnWidths(rows: AlignedTable['rows']): number[] {
  const count = rows.reduce((most, row) => Math.max(most, row.length), 0);
  return Array.from({ length: count }, (_, column) =>
    rows.reduce((widest, row) => Math.max(widest, textWidth(row[column] ?? '')), 0),
  );
}

function fits(lines: readonly string[], width: number): boolean {
  return lines.every((line) => textWidth(line) <= width);
}

/** At least one column stays; the last one never has to go. */
function columnsThatFit({ rows, indent = 0, gap = 2 }: AlignedTable, width: number): number {
  const widths = columnWidths(rows);
  let room = width - indent;
  let count = 0;
  for (const column of widths) {
    room -= column + (count === 0 ? 0 : gap);
    if (room < 0) break;
    count += 1;
  }
  return Math.max(1, count);
}
