import { materialFaults, molesPer100gRaw, type MaterialGiven } from '../chemistry/material.ts';
import { OXIDES, type Oxide } from '../chemistry/oxides.ts';
import type { Fault } from '../errors.ts';
import type { Material } from './archive.ts';
import { numberCell, requiredNameCell, textCell, wordCell, yesNoCell } from './cells.ts';
import type { DecimalMark } from './decimal-mark.ts';
import { collectByName, type Collected } from './register.ts';
import type { CellStyle, RowValues, Sheet, SheetRow } from './sheet.ts';
import { withoutBlanks } from './without-blanks.ts';

const share = (mark: DecimalMark, what: string) =>
  numberCell(mark, { what: `${what} in wt%`, least: 0, most: 100 });

const columns = ({ mark }: CellStyle) => ({
  material: requiredNameCell('a material name'),
  ...(Object.fromEntries(OXIDES.map((oxide) => [oxide, share(mark, oxide)])) as Record<
    Oxide,
    ReturnType<typeof share>
  >),
  loi: share(mark, 'a loss on ignition'),
  basis: wordCell(['raw', 'fired']),
  formula: textCell(),
  soluble: yesNoCell(),
});

/** What materials.csv may hold. */
export const materialKind = {
  name: 'materials.csv',
  columns,
  numbers: [...OXIDES, 'loi'],
  missing: (has: (column: string) => boolean) => [
    ...(has('material')
      ? []
      : [{ column: 'material', message: 'expected this column, found none' }]),
    ...(has('formula') || OXIDES.some(has)
      ? []
      : [{ column: 'formula', message: 'expected this column or oxides in wt%, found neither' }]),
  ],
};

type MaterialValues = RowValues<ReturnType<typeof columns>>;

/**
 * The materials of materials.csv.
 *
 * @param sheet - the file, read
 * @returns materials by name, lines of faulty ones, and every fault of the rows
 */
export function materialRows(sheet: Sheet<MaterialValues>): Collected<Material> {
  const rows = sheet.rows.map((row) => {
    const given = givenOf(row.values);
    const isComplete = row.faults.length === 0 && sheet.headFaults.length === 0;
    const faults = [...row.faults, ...(isComplete ? partFaults(sheet.file, row.line, given) : [])];
    const { material: name } = row.values;
    const isSound = isComplete && name !== undefined && faults.length === 0;
    return {
      name,
      line: row.line,
      value: isSound ? materialOf(name, row, given) : undefined,
      faults,
    };
  });
  return collectByName(rows, sheet.file, 'material');
}

function givenOf(values: MaterialValues): MaterialGiven {
  const analysis = Object.fromEntries(
    OXIDES.flatMap((oxide) => (values[oxide] === undefined ? [] : [[oxide, values[oxide]]])),
  );
  const { loi: loiPercent = 0, basis, formula } = values;
  return { analysis, loiPercent, basis, formula };
}

function partFaults(file: string, line: number, given: MaterialGiven): Fault[] {
  return materialFaults(given).map(({ part, message }) => ({ file, line, column: part, message }));
}

function materialOf(
  material: string,
  { line, values, other }: SheetRow<MaterialValues>,
  given: MaterialGiven,
): Material {
  const { moles, loiPercent } = molesPer100gRaw(given);
  const isFormula = given.formula !== undefined;
  return withoutBlanks({
    material,
    line,
    analysis: isFormula ? undefined : given.analysis,
    basis: isFormula ? undefined : (given.basis ?? 'raw'),
    formula: given.formula,
    loiPercent,
    molesPer100g: moles,
    soluble: values.soluble ?? false,
    other,
  });
}
