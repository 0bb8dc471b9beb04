import { ArchiveError, type Fault } from '../errors.ts';
import type { Point, Recipe } from '../index.ts';
import { archiveFilesAt } from './archive-input.ts';
import { asUsage } from './as-usage.ts';
import type { Io } from './io.ts';

/** Files that recipes are computed from. */
const RECIPE_FILES = /^(?:recipes|materials)\.csv$/i;

/** The sound recipes of an archive, and what is wrong with the files that they stand in. */
export interface RecipesFound {
  readonly recipes: readonly Recipe[];
  readonly faults: readonly Fault[];
  /** What the reading of those files noted. */
  readonly notes: readonly string[];
}

/**
 * The recipes of an archive. Faults of its tiles, firings and bodies do not matter here.
 *
 * @param path - the archive
 * @param io - where to read
 * @returns recipes, faults and notes
 * @throws {ArchiveError} if the archive holds no recipes at all
 */
export async function recipesAt(path: string, io: Io): Promise<RecipesFound> {
  const { readArchive } = await import('../index.ts');
  const { archive, faults } = readArchive(await archiveFilesAt(path, io));
  const own = faults.filter(({ file }) => RECIPE_FILES.test(file));
  if (archive.recipes.length === 0 && own.length === 0) {
    const message = 'expected recipes beside tiles.csv, found none';
    throw new ArchiveError([{ file: 'recipes.csv', line: 0, column: '', message }]);
  }
  const notes = archive.notes.filter((note) => /^(?:recipes|materials)\.csv/i.test(note));
  return { recipes: archive.recipes, faults: own, notes };
}

/**
 * Some recipes of those found.
 *
 * @param found - recipes; of two of one name the first counts
 * @param names - of the recipes, as the command line gives them
 * @returns their compositions, in the order of the names
 * @throws {ArchiveError} with the faults of the recipe files, if one is not among the sound ones
 * @throws {UsageError} with every name that is unknown, if the files have no faults
 */
export async function soundRecipes(
  { recipes, faults }: Pick<RecipesFound, 'recipes' | 'faults'>,
  names: readonly string[],
): Promise<Point[]> {
  const { recipePoint } = await import('../index.ts');
  const unsound = names.find((name) => !recipes.some(({ recipe }) => recipe === name));
  if (faults.length > 0 && unsound !== undefined) {
    throw new ArchiveError(
      faults,
      `Mend the files: "${unsound}" is not among the recipes without faults.`,
    );
  }
  return asUsage(names, (name) => recipePoint({ recipes }, name));
}
