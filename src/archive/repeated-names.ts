import type { Fault } from '../errors.ts';
import { counted, listed, quoted } from './found-text.ts';
import { grouped } from './grouped.ts';

/** A row with the name that it gives to something. */
export interface NameGiven {
  readonly name: string | undefined;
  /** How messages show the name, if it is not plain. */
  readonly label?: string;
  readonly line: number;
  /** All that the row says, but for its line; undefined where it could not be read. */
  readonly said: () => string | undefined;
}

/** Lines that a message names; of more it gives the number. */
const SHOWN_LINES = 5;

/**
 * The faults of names that more than one row gives: nobody can know which row is right, so each of
 * them is at fault.
 *
 * @param rows - rows of one file
 * @param file - the file as the user knows it
 * @param column - the column that holds the name
 * @returns a fault for every such row, by its line; each names the other lines
 */
export function repeatedNames(
  rows: readonly NameGiven[],
  file: string,
  column: string,
): ReadonlyMap<number, Fault> {
  const named = rows.filter(({ name }) => name !== undefined);
  const repeated = [...grouped(named, ({ name }) => name).values()].filter((own) => own.length > 1);
  return new Map(
    repeated.flatMap((own) => {
      const lines = own.map(({ line }) => line);
      const said = new Set(own.map((row) => row.said()));
      const exact = said.size === 1 && !said.has(undefined) ? ': an exact repeat' : '';
      return own.map(({ name = '', label = name, line }) => {
        const message =
          `expected each ${column} once, got ${quoted(label)} in ${otherLines(lines, line)} as ` +
          `well${exact}`;
        return [line, { file, line, column, message }] as const;
      });
    }),
  );
}

/**
 * The lines of a group but one, in words.
 *
 * @param lines - all lines of the group, at least two
 * @param own - the one to leave out
 * @returns `line 3` or `lines 3 and 4`, of many the first and how many more
 */
export function otherLines(lines: readonly number[], own: number): string {
  const shown = lines.slice(0, SHOWN_LINES + 1).filter((line) => line !== own);
  const named = shown.slice(0, SHOWN_LINES).map(String);
  const left = lines.length - 1 - named.length;
  const noun = lines.length === 2 ? 'line' : 'lines';
  if (left === 0) return `${noun} ${listed(named, 'and')}`;
  return `${noun} ${named.join(', ')} and ${counted(left, 'other')}`;
}
