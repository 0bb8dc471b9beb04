import type { Separator, Table } from './csv-table.ts';

export type DecimalMark = '.' | ',';

const WITH_COMMA = /^\s*[+-]?\d*,\d+(?:e[+-]?\d+)?\s*$/i;
const WITH_POINT = /^\s*[+-]?\d*\.\d+(?:e[+-]?\d+)?\s*$/i;

/**
 * The decimal mark of a file: a comma only where commas do not separate the cells.
 *
 * One mark holds for the whole file, the more frequent one, so that a number in the other mark is
 * noticed and not read as something else.
 *
 * @param table - the table
 * @param places - the columns that hold numbers
 * @returns the mark
 */
export function decimalMark(table: Table, places: readonly number[]): DecimalMark {
  const separator: Separator = table.separator;
  if (separator === ',') return '.';
  let commas = 0;
  let points = 0;
  for (const { cells } of table.rows) {
    for (const place of places) {
      const cell = cells[place] ?? '';
      if (WITH_COMMA.test(cell)) commas++;
      else if (WITH_POINT.test(cell)) points++;
    }
  }
  return commas > 0 && commas >= points ? ',' : '.';
}

const NUMBER = {
  '.': /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d{1,3})?$/i,
  ',': /^[+-]?(?:\d+,?\d*|,\d+)(?:e[+-]?\d{1,3})?$/i,
} as const;

/**
 * A finite number in the file's decimal mark.
 *
 * The pattern comes first: `Number('')` is 0 and `Number('0x10')` is 16.
 *
 * @param text - a cell
 * @param mark - the decimal mark of its file
 * @returns the number, or undefined where the text is none
 */
export function parseDecimal(text: string, mark: DecimalMark): number | undefined {
  const trimmed = text.trim();
  if (!NUMBER[mark].test(trimmed)) return undefined;
  const value = Number(mark === ',' ? trimmed.replace(',', '.') : trimmed);
  return Number.isFinite(value) ? value : undefined;
}

/**
 * What was expected in place of a text that is no number, as exactly as can be said.
 *
 * @param text - the cell
 * @param mark - the decimal mark of its file
 * @returns words that follow "expected"
 */
export function expectedNumber(text: string, mark: DecimalMark): string {
  const trimmed = text.trim();
  const isGrouped = /^[+-]?\d{1,3}(?:[.,'’\s]\d{3})*[.,'’\s]\d{3}(?:[.,]\d+)?$/.test(trimmed);
  const other = mark === ',' ? '.' : ',';
  if (parseDecimal(trimmed, other) !== undefined) {
    return `a number with a decimal ${mark === ',' ? 'comma' : 'point'}`;
  }
  return isGrouped ? 'a number without a thousands mark' : 'a number';
}
