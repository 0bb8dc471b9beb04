import type { Fault } from '../errors.ts';
import type { Firing } from './archive.ts';
import {
  coneCell,
  dateCell,
  fileNameCell,
  nameCell,
  numberCell,
  requiredNameCell,
  wordCell,
} from './cells.ts';
import { lostZero } from './lost-zero.ts';
import { collectByName, type Collected } from './register.ts';
import type { CellStyle, RowValues, Sheet, SheetRow } from './sheet.ts';
import { withoutBlanks } from './without-blanks.ts';

const PEAK = { what: 'a peak in °C', least: 600, most: 1400, reason: 'where glazes are fired' };
const HOLD = { what: 'a hold in minutes', least: 0, most: 2880, reason: 'up to two days' };
const COOLING = {
  what: 'a cooling rate in °C per hour',
  least: 0,
  most: 2000,
  isAbove: true,
  reason: 'a kiln cools, and no faster than that',
};

const columns = ({ mark, allowsComma }: CellStyle) => ({
  firing: requiredNameCell('a firing name'),
  date: dateCell(),
  kiln: nameCell(),
  set_cone: coneCell(allowsComma),
  cone: coneCell(allowsComma),
  peak_c: numberCell(mark, PEAK),
  hold_min: numberCell(mark, HOLD),
  cooling_c_per_h: numberCell(mark, COOLING),
  atmosphere: wordCell(['oxidation', 'reduction']),
  log: fileNameCell(),
});

/** What firings.csv may hold. */
export const firingKind = {
  name: 'firings.csv',
  columns,
  numbers: ['set_cone', 'cone', 'peak_c', 'hold_min', 'cooling_c_per_h'],
  missing: (has: (column: string) => boolean) => [
    ...(has('firing') ? [] : [{ column: 'firing', message: 'expected this column, found none' }]),
    ...(has('cone') || has('set_cone')
      ? []
      : [{ column: 'cone', message: 'expected a column cone or set_cone, found neither' }]),
  ],
};

type FiringValues = RowValues<ReturnType<typeof columns>>;

/**
 * The firings of firings.csv.
 *
 * @param sheet - the file, read
 * @returns firings by name, lines of faulty ones, and every fault of the rows
 */
export function firingRows(sheet: Sheet<FiringValues>): Collected<Firing> {
  const rows = sheet.rows.map((row) => {
    const faults = [...row.faults, ...coneFaults(sheet, row)];
    const { firing: name } = row.values;
    const isSound = name !== undefined && faults.length === 0;
    const value = isSound ? firingOf(name, row) : undefined;
    return { name, line: row.line, value, faults };
  });
  return collectByName(rows, sheet.file, 'firing', sheet.headFaults.length === 0);
}

function coneFaults(sheet: Sheet<FiringValues>, row: SheetRow<FiringValues>): Fault[] {
  const { file, headFaults } = sheet;
  const { cone, set_cone: setCone, peak_c: peakC } = row.values;
  const fault = (column: string, message: string) => ({ file, line: row.line, column, message });
  const isRead = !row.faults.some(({ column }) => column === 'cone' || column === 'set_cone');
  if (isRead && headFaults.length === 0 && cone === undefined && setCone === undefined) {
    const column = sheet.has('cone') ? 'cone' : 'set_cone';
    return [fault(column, 'expected a cone reached or a set_cone, got neither')];
  }
  if (peakC === undefined) return [];
  const written = { cone, set_cone: setCone };
  return Object.entries(written).flatMap(([column, text]) => {
    const message = text === undefined ? undefined : lostZero(text, peakC);
    return message === undefined ? [] : [fault(column, message)];
  });
}

function firingOf(firing: string, { line, values, other }: SheetRow<FiringValues>): Firing {
  return withoutBlanks({
    firing,
    line,
    date: values.date,
    kiln: values.kiln,
    setCone: values.set_cone,
    cone: values.cone,
    peakC: values.peak_c,
    holdMin: values.hold_min,
    coolingCPerH: values.cooling_c_per_h,
    atmosphere: values.atmosphere,
    log: values.log,
    other,
  });
}
