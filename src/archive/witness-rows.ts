import { coneIndex } from '../firing/cone.ts';
import type { Firing, WitnessReading } from './archive.ts';
import { requiredConeCell, requiredNameCell } from './cells.ts';
import { lostZero } from './lost-zero.ts';
import { collectByName, lookUp, type Collected, type Register } from './register.ts';
import type { CellStyle, RowValues, Sheet, SheetRow } from './sheet.ts';
import { withoutBlanks } from './without-blanks.ts';

const columns = ({ allowsComma }: CellStyle) => ({
  firing: requiredNameCell('a firing name'),
  shelf: requiredNameCell('a shelf'),
  cone: requiredConeCell(allowsComma),
});

/** What witness.csv may hold. */
export const witnessKind = {
  name: 'witness.csv',
  columns,
  numbers: ['cone'],
  missing: (has: (column: string) => boolean) =>
    ['firing', 'shelf', 'cone']
      .filter((column) => !has(column))
      .map((column) => ({ column, message: 'expected this column, found none' })),
};

type WitnessValues = RowValues<ReturnType<typeof columns>>;

/**
 * The name of one shelf of one firing, in the register of witness cones; capitals make no difference.
 *
 * @param firing - name of the firing
 * @param shelf - name of the shelf
 * @returns a text that no other pair shares
 */
export function shelfKey(firing: string, shelf: string): string {
  return JSON.stringify([firing, shelf.toLowerCase()]);
}

/**
 * The readings of witness.csv, one a shelf.
 *
 * @param sheet - the file, read
 * @param firings - the firings; undefined where there is no firings.csv and names are bare labels
 * @returns readings by `shelfKey`, lines of faulty ones, and every fault of the rows
 */
export function witnessRows(
  sheet: Sheet<WitnessValues>,
  firings: Register<Firing> | undefined,
): Collected<WitnessReading> {
  const rows = sheet.rows.map((row) => {
    const { firing, shelf, cone } = row.values;
    const place = { file: sheet.file, line: row.line };
    const faults = [...row.faults, ...firingFaults(row, firings).map((f) => ({ ...place, ...f }))];
    const isSound = firing !== undefined && shelf !== undefined && cone !== undefined;
    const value =
      isSound && faults.length === 0
        ? withoutBlanks({
            firing,
            line: row.line,
            shelf,
            cone,
            coneIndex: coneIndex(cone),
            other: row.other,
          })
        : undefined;
    const name = firing === undefined || shelf === undefined ? undefined : shelfKey(firing, shelf);
    return { name, label: shelf ?? '', line: row.line, value, faults };
  });
  return collectByName(rows, sheet.file, 'shelf', sheet.headFaults.length === 0);
}

function firingFaults({ values }: SheetRow<WitnessValues>, firings: Register<Firing> | undefined) {
  const { firing, cone } = values;
  if (firing === undefined || firings === undefined) return [];
  const found = lookUp(firings, firing);
  if ('problem' in found) return [{ column: 'firing', message: found.problem }];
  const { peakC } = found.value;
  const message = peakC === undefined || cone === undefined ? undefined : lostZero(cone, peakC);
  return message === undefined ? [] : [{ column: 'cone', message }];
}
