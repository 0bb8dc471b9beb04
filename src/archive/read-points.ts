import type { Unity } from '../chemistry/unity.ts';
import { ArchiveError, type Fault } from '../errors.ts';
import { requiredNameCell } from './cells.ts';
import { missingOxides, molesOfCells, oxideColumns, unityOfCells } from './composition-cells.ts';
import { missingColumnNotes, weightNotes, wildNotes } from './composition-notes.ts';
import { collectByName } from './register.ts';
import { readSheet, type CellStyle, type RowValues } from './sheet.ts';
import { OXIDES } from '../chemistry/oxides.ts';

const columns = ({ mark }: CellStyle) => ({
  point: requiredNameCell('a name for the point'),
  ...oxideColumns(mark),
});

const WORDS = { noun: 'point' };

const pointKind = {
  name: 'points',
  columns,
  numbers: OXIDES,
  missing: (has: (column: string) => boolean) => [
    ...(has('point') ? [] : [{ column: 'point', message: 'expected this column, found none' }]),
    ...missingOxides(has),
  ],
  unknownColumns: 'not used',
  noted: (
    rows: readonly RowValues<ReturnType<typeof columns>>[],
    has: (column: string) => boolean,
  ) => [...missingColumnNotes(has, rows.length, WORDS), ...weightNotes(amountsGiven(rows), WORDS)],
};

/** One by one: a long file need not be held twice. */
function* amountsGiven(rows: readonly RowValues<ReturnType<typeof columns>>[]) {
  for (const row of rows) yield { name: row.point ?? '', amounts: molesOfCells(row) };
}

/** Compositions to ask about, and what is to be said about the file that gave them. */
export interface PointsRead {
  /** In the order of the file. */
  readonly points: readonly { readonly point: string; readonly unity: Unity }[];
  /** Columns not used, headings read as another, columns that are not there, amounts in doubt. */
  readonly notes: readonly string[];
}

/**
 * Compositions to ask about: a CSV with a column `point` and oxides in moles, read by the rules of
 * tiles.csv.
 *
 * @param file - name of the file, for messages
 * @param bytes - what it holds
 * @returns the points in the order of the file, as unity formulas, and notes
 * @throws {ArchiveError} with every fault, also if there is no point
 * @example
 * const csv = 'point,SiO2,Al2O3,CaO\nP0,7,0.8,2\n';
 * readPoints('points.csv', new TextEncoder().encode(csv)).points[0].unity.SiO2; // 3.5
 */
export function readPoints(file: string, bytes: Uint8Array): PointsRead {
  const sheet = readSheet(file, bytes, pointKind);
  const isWhole = sheet.headFaults.length === 0;
  const rows = sheet.rows.map(({ line, values, faults: cellFaults }) => {
    const isUnread = (column: string) => cellFaults.some((fault) => fault.column === column);
    const read = unityOfCells(values, isUnread, sheet.has);
    const found = 'faults' in read && isWhole ? read.faults : [];
    const faults =
      found.length === 0
        ? cellFaults
        : [...cellFaults, ...found.map((fault) => ({ file, line, ...fault }))];
    const value = 'unity' in read && faults.length === 0 ? read.unity : undefined;
    return { name: values.point, line, value, faults };
  });
  const { sound, faults } = collectByName(rows, file, 'point');
  const empty: Fault = { file, line: 0, column: '', message: 'expected a point, got none' };
  const all = [...sheet.headFaults, ...faults, ...(rows.length === 0 && isWhole ? [empty] : [])];
  if (all.length > 0) throw new ArchiveError(all.sort((a, b) => a.line - b.line));
  const points = [...sound].map(([point, unity]) => ({ point, unity }));
  const named = points.map(({ point, unity }) => ({ name: point, unity }));
  const wild = wildNotes(named).map((note) => `${file}: ${note}`);
  return { points, notes: [...sheet.notes, ...wild] };
}
