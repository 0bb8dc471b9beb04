import * as z from 'zod';
import type { Fault } from '../errors.ts';
import { headlessCells, readTable, type Table, type TableRow } from './csv-table.ts';
import { decimalMark, type DecimalMark } from './decimal-mark.ts';
import { listed, quoted } from './found-text.ts';
import { mapHeadings, type Headings } from './headings.ts';

/** How the cells of one file are written. */
export interface CellStyle {
  readonly mark: DecimalMark;
  /** Commas do not separate cells, so that `6,5` can be a cone. */
  readonly allowsComma: boolean;
}

/** What one kind of file may hold. */
export interface SheetKind<Shape extends z.ZodRawShape> {
  /** Its name in an archive. */
  readonly name: string;
  /** Every column known, with what its cells must be. */
  readonly columns: (style: CellStyle) => Shape;
  /** The known columns that hold numbers: they show the decimal mark. */
  readonly numbers: readonly string[];
  /** What is missing, given the columns that are there: a message and the column it stands under. */
  readonly missing: (has: (column: string) => boolean) => readonly MissingColumn[];
  /** What becomes of a column that is not known; kept as written where not said. */
  readonly unknownColumns?: string;
  /** What its sound headings and rows ask to be said, file name left out. */
  readonly noted?: (
    rows: readonly RowValues<Shape>[],
    has: (column: string) => boolean,
  ) => readonly string[];
}

export interface MissingColumn {
  readonly column: string;
  readonly message: string;
}

/** The cells of one row that could be read; blank ones are undefined. */
export type RowValues<Shape extends z.ZodRawShape> = {
  readonly [Column in keyof Shape]?: z.output<Shape[Column]> | undefined;
};

export interface SheetRow<Values> {
  readonly line: number;
  readonly values: Values;
  readonly faults: readonly Fault[];
  /** Cells of columns that are not known, as written. */
  readonly other?: Readonly<Record<string, string>>;
}

/** A file whose rows have been read, cell by cell. */
export interface Sheet<Values> {
  /** Its name as the user knows it. */
  readonly file: string;
  readonly rows: readonly SheetRow<Values>[];
  readonly has: (column: string) => boolean;
  /** Faults of the file or its headings: then no row of it can be relied on. */
  readonly headFaults: readonly Fault[];
  readonly notes: readonly string[];
}

/**
 * Reads one file of an archive: text, cells, headings, then every row by `zod`.
 *
 * @param file - its name as the user knows it
 * @param bytes - what it holds
 * @param kind - what such a file may hold
 * @returns its rows with their faults; nothing is thrown for a fault of the user's
 */
export function readSheet<Shape extends z.ZodRawShape>(
  file: string,
  bytes: Uint8Array,
  kind: SheetKind<Shape>,
): Sheet<RowValues<Shape>> {
  const read = readTable(file, bytes);
  if ('fault' in read) {
    return { file, rows: [], has: () => false, headFaults: [read.fault], notes: [] };
  }
  const { table } = read;
  const known = Object.keys(kind.columns({ mark: '.', allowsComma: false }));
  const headings = mapHeadings(table, known);
  const places = kind.numbers.flatMap((column) => headings.places.get(column) ?? []);
  const style = { mark: decimalMark(table, places), allowsComma: table.separator !== ',' };
  const has = (column: string) => headings.places.has(column);
  // A misspelt column is a fault already, and not missing beside it.
  const missing = kind.missing((column) => has(column) || headings.meant.has(column));
  const place = { file, line: table.headingLine };
  const headFaults = [
    ...table.faults,
    ...headings.faults,
    ...missing.map((fault) => ({ ...place, ...fault })),
  ];
  const rows = readRows(table, headings, kind.columns(style));
  const values = rows.map((row) => row.values);
  const noted = headFaults.length > 0 ? [] : (kind.noted?.(values, has) ?? []);
  const notes = [
    ...sheetNotes(table, headings, style, kind.unknownColumns ?? 'kept as written'),
    ...noted.map((note) => `${file}: ${note}`),
  ];
  return { file, rows, has, headFaults, notes };
}

function readRows<Shape extends z.ZodRawShape>(table: Table, headings: Headings, shape: Shape) {
  const present = [...headings.places].map(([column, place]) => ({
    column,
    place,
    cell: shape[column] as unknown as z.ZodType,
  }));
  const schema = z.object(Object.fromEntries(present.map(({ column, cell }) => [column, cell])));
  return table.rows.map((row): SheetRow<RowValues<Shape>> => {
    const texts: Record<string, string> = {};
    for (const { column, place } of present) texts[column] = row.cells[place] ?? '';
    const whole = schema.safeParse(texts);
    // A faulty row is read cell by cell, so that its sound cells can be checked all the same.
    const values = whole.success
      ? whole.data
      : Object.fromEntries(
          present.map(({ column, cell }) => [column, cell.safeParse(texts[column]).data]),
        );
    const other = otherCells(headings, row);
    return {
      line: row.line,
      values: values as RowValues<Shape>,
      faults: rowFaults(table, row, whole.error?.issues ?? []),
      ...(other && { other }),
    };
  });
}

const NONE: readonly Fault[] = [];

function rowFaults(
  table: Table,
  row: TableRow,
  issues: readonly { readonly path: readonly PropertyKey[]; readonly message: string }[],
): readonly Fault[] {
  const headless = headlessCells(table, row);
  // Nearly every row is sound: a list of its own would be one in a hundred thousand.
  if (issues.length + row.faults.length + headless.length === 0) return NONE;
  const ofCells = issues.map(({ path, message }) => {
    return { file: table.file, line: row.line, column: String(path[0] ?? ''), message };
  });
  return [...row.faults, ...ofCells, ...headless];
}

function otherCells({ unknown }: Headings, { cells }: TableRow) {
  if (unknown.length === 0) return undefined;
  const held = unknown.flatMap(({ heading, place }) => {
    const cell = cells[place] ?? '';
    return cell.trim() === '' ? [] : [[heading, cell] as const];
  });
  // fromEntries makes own properties, whatever their name: '__proto__' does no harm.
  return held.length === 0 ? undefined : Object.fromEntries(held);
}

const SEPARATOR_WORD = { ',': 'commas', ';': 'semicolons', '\t': 'tabs' } as const;

function sheetNotes(
  table: Table,
  headings: Headings,
  { mark }: CellStyle,
  unknownColumns: string,
): string[] {
  const { file, encoding, separator, separatorLine } = table;
  const notes = [...headings.notes];
  if (encoding !== 'UTF-8') notes.push(`${file}: read as ${encoding}`);
  if (separator !== ',' || separatorLine !== undefined) {
    const told = separatorLine === undefined ? '' : ', as its first line says';
    const decimals = mark === ',' ? ', decimal comma' : ', decimal point';
    notes.push(`${file}: separated by ${SEPARATOR_WORD[separator]}${told}${decimals}`);
  }
  if (headings.unknown.length > 0) {
    const names = headings.unknown.map(({ heading }) => quoted(heading));
    const columns = names.length === 1 ? 'column' : 'columns';
    notes.push(`${file}: ${columns} ${listed(names, 'and')} not known, ${unknownColumns}`);
  }
  return notes;
}
