import { recipeUnity } from '../chemistry/recipe.ts';
import { CompositionError, type Fault } from '../errors.ts';
import type { Material, Recipe, RecipeLine } from './archive.ts';
import { requiredNameCell, requiredNumberCell, yesNoCell } from './cells.ts';
import { listed, quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import { lookUp, type Register } from './register.ts';
import type { CellStyle, RowValues, Sheet, SheetRow } from './sheet.ts';
import { withoutBlanks } from './without-blanks.ts';

const PARTS = { what: 'parts', least: 0, most: 1e6, isAbove: true };

const columns = ({ mark }: CellStyle) => ({
  recipe: requiredNameCell('a recipe name'),
  material: requiredNameCell('a material'),
  parts: requiredNumberCell(mark, PARTS),
  over_100: yesNoCell(),
});

/** What recipes.csv may hold. */
export const recipeKind = {
  name: 'recipes.csv',
  columns,
  numbers: ['parts'],
  missing: (has: (column: string) => boolean) =>
    ['recipe', 'material', 'parts']
      .filter((column) => !has(column))
      .map((column) => ({ column, message: 'expected this column, found none' })),
};

type RecipeValues = RowValues<ReturnType<typeof columns>>;

export interface RecipesRead {
  readonly sound: ReadonlyMap<string, Recipe>;
  /** Line of the first fault, by recipe. */
  readonly faulty: ReadonlyMap<string, number>;
  readonly faults: readonly Fault[];
  /** Recipes of sound lines that make no unity formula: a fault only if a tile is made of one. */
  readonly withoutUnity: ReadonlyMap<string, Fault>;
  readonly notes: readonly string[];
}

/**
 * The recipes of recipes.csv, whose lines may stand in any order.
 *
 * @param sheet - the file, read
 * @param materials - the materials; undefined where there is no materials.csv
 * @returns recipes by name, what is wrong, and what looks odd
 */
export function recipeRows(
  sheet: Sheet<RecipeValues>,
  materials: Register<Material> | undefined,
): RecipesRead {
  const sound = new Map<string, Recipe>();
  const faulty = new Map<string, number>();
  const withoutUnity = new Map<string, Fault>();
  const notes: string[] = [];
  const lines = sheet.rows.map((row) => lineOf(sheet.file, row, materials));
  const faults: Fault[] = lines.flatMap((line) => line.faults);
  if (materials === undefined && sheet.rows.length > 0) faults.push(noMaterials(sheet.file));
  for (const [recipe, ofRecipe] of grouped(lines, ({ recipe }) => recipe)) {
    if (recipe === undefined) continue;
    const bad = ofRecipe.find((line) => line.part === undefined);
    if (bad !== undefined) {
      faulty.set(recipe, bad.line);
      continue;
    }
    const parts = ofRecipe.flatMap(({ part }) => part ?? []);
    const made = unityOf(parts);
    if ('problem' in made) {
      const line = ofRecipe[0]!.line;
      const message = `${quoted(recipe)}: ${made.problem}`;
      withoutUnity.set(recipe, { file: sheet.file, line, column: 'recipe', message });
      faulty.set(recipe, line);
      continue;
    }
    sound.set(recipe, { recipe, lines: parts.map(({ line }) => line), unity: made.unity });
    notes.push(...repeatedMaterials(sheet.file, recipe, parts));
  }
  return { sound, faulty, faults, withoutUnity, notes };
}

interface PartRead {
  readonly line: RecipeLine;
  readonly material: Material;
}

function lineOf(
  file: string,
  row: SheetRow<RecipeValues>,
  materials: Register<Material> | undefined,
) {
  const { line } = row;
  const { recipe, material, parts, over_100: over100 = false } = row.values;
  const found =
    material === undefined || materials === undefined ? undefined : lookUp(materials, material);
  const faults = [...row.faults];
  if (found !== undefined && 'problem' in found) {
    faults.push({ file, line, column: 'material', message: found.problem });
  }
  const isSound = faults.length === 0 && material !== undefined && parts !== undefined;
  const part: PartRead | undefined =
    isSound && found !== undefined && 'value' in found
      ? {
          line: withoutBlanks({ material, parts, over100, line, other: row.other }),
          material: found.value,
        }
      : undefined;
  return { recipe, line, part, faults };
}

function unityOf(parts: readonly PartRead[]) {
  try {
    const weighed = parts.map(({ line, material: { molesPer100g } }) => {
      return { parts: line.parts, molesPer100g };
    });
    return { unity: recipeUnity(weighed) };
  } catch (error) {
    if (error instanceof CompositionError) return { problem: error.message };
    throw error;
  }
}

function noMaterials(recipesFile: string): Fault {
  const message = `expected this file beside ${recipesFile}, found none`;
  return { file: 'materials.csv', line: 0, column: '', message };
}

function repeatedMaterials(file: string, recipe: string, parts: readonly PartRead[]): string[] {
  const byMaterial = grouped(parts, ({ line }) => `${line.over100} ${line.material}`);
  return [...byMaterial.values()].flatMap((same) => {
    if (same.length < 2) return [];
    const lines = listed(
      same.map(({ line }) => String(line.line)),
      'and',
    );
    const material = quoted(same[0]!.line.material);
    return [`${file}: recipe ${quoted(recipe)} lists ${material} in lines ${lines}; all count`];
  });
}
