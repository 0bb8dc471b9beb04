import type * as z from 'zod';
import { recipeUnity } from '../chemistry/recipe.ts';
import type { Fault } from '../errors.ts';
import type { Body, Firing, Material, Recipe, WitnessReading } from './archive.ts';
import type { FilesFound } from './archive-files.ts';
import { bodyKind, bodyRows } from './body-rows.ts';
import { firingKind, firingRows } from './firing-rows.ts';
import { materialKind, materialRows } from './material-rows.ts';
import { recipeKind, recipeRows, type RecipesRead } from './recipe-rows.ts';
import { inNameOrder } from './name-order.ts';
import { register, type Register } from './register.ts';
import { withRepeatsMarked } from './repeated-recipe-lines.ts';
import { readSheet, type RowValues, type Sheet, type SheetKind } from './sheet.ts';
import { witnessKind, witnessRows } from './witness-rows.ts';

/** What an archive holds beside its tiles; undefined where there is no such file. */
export interface ArchiveParts {
  readonly firings: Register<Firing> | undefined;
  readonly witness: Register<WitnessReading> | undefined;
  readonly recipes: Register<Recipe> | undefined;
  readonly materials: Register<Material> | undefined;
  readonly bodies: Register<Body> | undefined;
  readonly recipesRead: RecipesRead;
  readonly sheets: readonly Sheet<unknown>[];
  readonly faults: readonly Fault[];
}

const NO_RECIPES: RecipesRead = {
  sound: new Map(),
  faulty: new Map(),
  faults: [],
  withoutUnity: new Map(),
  notes: [],
};

/**
 * Opens one file of an archive, if it is there.
 *
 * @param found - the files
 * @param kind - which of them, and what it may hold
 * @returns its rows, or undefined
 */
export function openSheet<Shape extends z.ZodRawShape>(
  { found }: FilesFound,
  kind: SheetKind<Shape>,
): Sheet<RowValues<Shape>> | undefined {
  const named = found.get(kind.name);
  return named && readSheet(named.file, named.bytes, kind);
}

/**
 * Reads all files of an archive but its tiles, in the order in which they rely on each other.
 *
 * @param found - the files
 * @returns what they define by name, and every fault
 */
export function archiveParts(found: FilesFound): ArchiveParts {
  const firingSheet = openSheet(found, firingKind);
  const firings = partOf(firingSheet, 'firing', firingRows);
  const witnessSheet = openSheet(found, witnessKind);
  const witness = partOf(witnessSheet, 'witness cone', (sheet) =>
    witnessRows(sheet, firings.register),
  );
  const materialSheet = openSheet(found, materialKind);
  const materials = partOf(materialSheet, 'material', materialRows);
  const recipeSheet = openSheet(found, recipeKind);
  const recipesRead = recipeSheet
    ? inAnyOrder(recipeRows(withRepeatsMarked(recipeSheet), materials.register), materials.register)
    : NO_RECIPES;
  const recipes = partOf(recipeSheet, 'recipe', () => recipesRead);
  const bodySheet = openSheet(found, bodyKind);
  const bodies = partOf(bodySheet, 'body', bodyRows);
  const sheets = [firingSheet, witnessSheet, recipeSheet, materialSheet, bodySheet];
  return {
    firings: firings.register,
    witness: witness.register,
    recipes: recipes.register,
    materials: materials.register,
    bodies: bodies.register,
    recipesRead,
    sheets: sheets.filter((sheet) => sheet !== undefined),
    faults: [firings, witness, recipes, materials, bodies].flatMap(({ faults }) => faults),
  };
}

/**
 * Recipes whose unity formula is the same to the last bit in whatever order their lines stand: sums of
 * the same numbers in another order differ by a rounding.
 */
function inAnyOrder(read: RecipesRead, materials: Register<Material> | undefined): RecipesRead {
  const molesOf = (material: string) => materials?.sound.get(material)?.molesPer100g ?? {};
  const sound = [...read.sound].map(([name, recipe]): [string, Recipe] => {
    const lines = inNameOrder(recipe.lines, ({ material, parts }) => `${material} ${parts}`);
    const parts = lines.map((line) => ({
      parts: line.parts,
      molesPer100g: molesOf(line.material),
    }));
    return [name, { ...recipe, unity: recipeUnity(parts) }];
  });
  return { ...read, sound: new Map(sound) };
}

interface RowsRead<Value> {
  readonly sound: ReadonlyMap<string, Value>;
  readonly faulty: ReadonlyMap<string, number>;
  readonly faults: readonly Fault[];
}

function partOf<Values, Value>(
  sheet: Sheet<Values> | undefined,
  noun: string,
  read: (sheet: Sheet<Values>) => RowsRead<Value>,
): { register: Register<Value> | undefined; faults: readonly Fault[] } {
  if (sheet === undefined) return { register: undefined, faults: [] };
  const { sound, faulty, faults } = read(sheet);
  const isUnreadable = sheet.headFaults.length > 0;
  return {
    register: register(sheet.file, noun, sound, faulty, isUnreadable),
    faults: [...sheet.headFaults, ...faults],
  };
}
