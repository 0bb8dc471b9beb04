import { parse } from 'csv-parse/sync';
import type { Fault } from '../errors.ts';
import { decodeText, type Encoding } from './decode-text.ts';
import { got, quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import { LIMITS } from './limits.ts';
import { strayQuotes, type StrayQuote } from './stray-quotes.ts';

export type Separator = ',' | ';' | '\t';

export interface TableRow {
  /** Line on which the row begins, as a text editor counts. */
  readonly line: number;
  readonly cells: readonly string[];
  /** Faults of the row as such: stray quotes, cells too long. */
  readonly faults: readonly Fault[];
}

/** A CSV file as cells; nothing is known yet of what they mean. */
export interface Table {
  readonly file: string;
  readonly encoding: Encoding;
  readonly separator: Separator;
  /** A first line such as `sep=;`, by which some spreadsheets tell the separator. */
  readonly separatorLine?: string;
  readonly headings: readonly string[];
  readonly headingLine: number;
  /** Rows below the headings that hold anything. */
  readonly rows: readonly TableRow[];
  /** Faults of the headings or of the file as a whole. */
  readonly faults: readonly Fault[];
}

/**
 * Reads a CSV file into cells, blank lines left out.
 *
 * @param file - its name, for messages
 * @param bytes - what it holds
 * @returns the table, or the one fault for which there is none
 */
export function readTable(
  file: string,
  bytes: Uint8Array,
): { readonly table: Table } | { readonly fault: Fault } {
  const wholeFile = (message: string) => ({ fault: { file, line: 0, column: '', message } });
  const decoded = decodeText(bytes);
  if ('problem' in decoded) return wholeFile(decoded.problem);
  const told = toldSeparator(decoded.text);
  if (told !== undefined && told.separator === undefined) {
    return wholeFile(`expected sep= with a comma, semicolon or tab, ${got(told.line)}`);
  }
  // Blanked and not cut, so that lines keep their numbers.
  const below = decoded.text.slice(told?.line.length ?? 0);
  const separator = told?.separator ?? separatorOf(below);
  const { text, stray } = strayQuotes(below, separator);
  const [first, ...rows] = withFaults(file, rowsOf(text, separator), stray);
  if (first === undefined) return wholeFile('expected a line of headings, got an empty file');
  const { encoding } = decoded;
  const faults = [...first.faults, ...sizeFaults(file, first, rows.length)];
  const headings = first.cells.map((cell) => cell.trim());
  const table = { file, encoding, separator, headings, headingLine: first.line, rows, faults };
  return { table: told === undefined ? table : { ...table, separatorLine: told.line.trim() } };
}

const SEPARATORS: readonly Separator[] = [',', ';', '\t'];

/** The separator that the first line tells, if it does; undefined in it where it is none of ours. */
function toldSeparator(
  text: string,
): { line: string; separator: Separator | undefined } | undefined {
  const [line, character] = /^"?sep=([^\n"]?)"?[,; \t]*(?=\n|$)/i.exec(text) ?? [];
  if (line === undefined) return undefined;
  return { line, separator: SEPARATORS.find((known) => known === character) };
}

/** Counted outside quotes in the first line that holds anything: the data hold decimal commas. */
function separatorOf(text: string): Separator {
  const headings = /[^\n]*\S[^\n]*/.exec(text)?.[0].replace(/"[^"]*"/g, '') ?? '';
  const count = (separator: Separator) => headings.split(separator).length;
  return SEPARATORS.reduce((best, next) => (count(next) > count(best) ? next : best));
}

function rowsOf(text: string, separator: Separator): TableRow[] {
  return text.includes('"') ? quotedRows(text, separator) : plainRows(text, separator);
}

const holdsAnything = (cell: string) => cell.trim() !== '';

/** Without a quote a line is a row and a separator an end of a cell: a long file is read in a third of the time. */
function plainRows(text: string, separator: Separator): TableRow[] {
  const rows: TableRow[] = [];
  for (const [i, line] of text.split('\n').entries()) {
    const cells = line.split(separator);
    if (cells.some(holdsAnything)) rows.push({ line: i + 1, cells, faults: [] });
  }
  return rows;
}

function quotedRows(text: string, separator: Separator): TableRow[] {
  const records: unknown = parse(text, {
    columns: false,
    delimiter: separator,
    record_delimiter: '\n',
    relax_column_count: true,
    relax_quotes: true,
    info: true,
  });
  let line = 1;
  const rows: TableRow[] = [];
  for (const { record, info } of records as { record: string[]; info: { lines: number } }[]) {
    // csv-parse counts to the line on which a row ends.
    if (record.some(holdsAnything)) rows.push({ line, cells: record, faults: [] });
    line = info.lines + 1;
  }
  return rows;
}

function withFaults(file: string, rows: TableRow[], stray: readonly StrayQuote[]): TableRow[] {
  const strayByLine = grouped(stray, (quote) => quote.line);
  const headings = rows[0]?.cells ?? [];
  return rows.map((row) => {
    const faults = [
      ...(strayByLine.get(row.line) ?? []).map((quote) => ({
        cell: quote.cell,
        message: `expected quotes only around a whole cell, got ${quoted(quote.found)}`,
      })),
      ...longCells(row.cells),
    ].map(({ cell, message }) => {
      const column = headings[cell]?.trim() || `column ${cell + 1}`;
      return { file, line: row.line, column: column.slice(0, LIMITS.nameCharacters), message };
    });
    return faults.length === 0 ? row : { ...row, faults };
  });
}

function longCells(cells: readonly string[]) {
  if (!cells.some((cell) => cell.length > LIMITS.cellCharacters)) return [];
  return cells.flatMap((text, cell) => {
    const message = `expected at most ${LIMITS.cellCharacters} characters, got ${text.length}`;
    return text.length > LIMITS.cellCharacters ? [{ cell, message }] : [];
  });
}

function sizeFaults(file: string, headings: TableRow, rows: number): Fault[] {
  const faults: Fault[] = [];
  const columns = headings.cells.length;
  if (columns > LIMITS.columns) {
    const message = `expected at most ${LIMITS.columns} columns, got ${columns}`;
    faults.push({ file, line: headings.line, column: '', message });
  }
  if (rows > LIMITS.rows) {
    faults.push({
      file,
      line: 0,
      column: '',
      message: `expected at most ${LIMITS.rows} rows, got ${rows}`,
    });
  }
  return faults;
}

/**
 * Cells that stand under no heading: beyond the last one, or below a blank one.
 *
 * @param table - the table
 * @param row - one of its rows
 * @returns a fault for each such cell that is not blank
 */
export function headlessCells({ file, headings }: Table, row: TableRow): Fault[] {
  const isHeadless = (cell: string, index: number) =>
    (headings[index] ?? '') === '' && cell.trim() !== '';
  if (!row.cells.some(isHeadless)) return [];
  return row.cells.flatMap((cell, index) => {
    if (!isHeadless(cell, index)) return [];
    const message = `expected a heading above this cell, ${got(cell)}`;
    return [{ file, line: row.line, column: `column ${index + 1}`, message }];
  });
}
