import type { Fault } from '../errors.ts';
import { quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import type { recipeKind } from './recipe-rows.ts';
import { otherLines } from './repeated-names.ts';
import type { RowValues, Sheet, SheetRow } from './sheet.ts';

type RecipeRow = SheetRow<RowValues<ReturnType<typeof recipeKind.columns>>>;

/**
 * Marks the rows of recipes.csv that say the same as another row, cell by cell: pasted twice, a
 * material would count twice. Other amounts of the same material are no fault: all of them count.
 *
 * @param sheet - the file, read
 * @returns the file with a fault at each such row, which names the other lines
 */
export function withRepeatsMarked<Marked extends Sheet<RecipeRow['values']>>(sheet: Marked) {
  const { file } = sheet;
  const sound = sheet.rows.filter(({ faults }) => faults.length === 0);
  const groups = [...grouped(sound, saidBy).values()].filter((own) => own.length > 1);
  const faults = new Map<number, Fault>(
    groups.flatMap((own) => {
      const lines = own.map(({ line }) => line);
      return own.map(({ line, values }) => {
        const { recipe = '', material = '' } = values;
        const message =
          `expected each material of ${quoted(recipe)} once, got ${quoted(material)} in ` +
          `${otherLines(lines, line)} as well: an exact repeat`;
        return [line, { file, line, column: 'material', message }] as const;
      });
    }),
  );
  const rows = sheet.rows.map((row) => {
    const fault = faults.get(row.line);
    return fault === undefined ? row : { ...row, faults: [fault] };
  });
  return { ...sheet, rows };
}

function saidBy({ values, other = {} }: RecipeRow): string {
  const { recipe, material, parts, over_100: over100 = false } = values;
  return JSON.stringify([recipe, material, parts, over100, Object.entries(other)]);
}
