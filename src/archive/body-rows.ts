import type { Body } from './archive.ts';
import { coneCell, numberCell, requiredNameCell } from './cells.ts';
import { collectByName, type Collected } from './register.ts';
import type { CellStyle, RowValues, Sheet } from './sheet.ts';
import { withoutBlanks } from './without-blanks.ts';

const ABSORPTION = { what: 'an absorption in wt%', least: 0, most: 60 };
const EXPANSION = {
  what: 'an expansion per kelvin',
  least: 1e-7,
  most: 3e-5,
  reason: '6.5e-6 is usual: give it per K, not in millionths',
};

const columns = ({ mark, allowsComma }: CellStyle) => ({
  body: requiredNameCell('a body name'),
  cone: coneCell(allowsComma),
  absorption_pct: numberCell(mark, ABSORPTION),
  expansion_per_k: numberCell(mark, EXPANSION),
});

/** What bodies.csv may hold. */
export const bodyKind = {
  name: 'bodies.csv',
  columns,
  numbers: ['cone', 'absorption_pct', 'expansion_per_k'],
  missing: (has: (column: string) => boolean) =>
    has('body') ? [] : [{ column: 'body', message: 'expected this column, found none' }],
};

type BodyValues = RowValues<ReturnType<typeof columns>>;

/**
 * The clay bodies of bodies.csv.
 *
 * @param sheet - the file, read
 * @returns bodies by name, lines of faulty ones, and every fault of the rows
 */
export function bodyRows(sheet: Sheet<BodyValues>): Collected<Body> {
  const rows = sheet.rows.map(({ line, values, faults, other }) => {
    const { body: name, cone, absorption_pct, expansion_per_k } = values;
    const value =
      name === undefined || faults.length > 0
        ? undefined
        : withoutBlanks({
            body: name,
            line,
            maturesAtCone: cone,
            absorptionPercent: absorption_pct,
            expansionPerK: expansion_per_k,
            other,
          });
    return { name, line, value, faults };
  });
  return collectByName(rows, sheet.file, 'body', sheet.headFaults.length === 0);
}
