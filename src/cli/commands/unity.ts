import { Command } from 'commander';
import { ArchiveError } from '../../errors.ts';
import { helpText } from '../help-text.ts';
import type { Io } from '../io.ts';
import { lookOf } from '../look.ts';
import { recipesAt, soundRecipes } from '../recipe-input.ts';
import { tellNotes } from '../report-error.ts';

const HELP = `
Without a name, all recipes of the archive. Faults of its tiles do not matter
here.

Example:
  coneshift unity datasets/demo-studio Bellringer "Slate Hen"`;

/** `coneshift unity`: recipe to unity formula. */
export const unityCommand = (io: Io): Command =>
  new Command('unity')
    .description('recipe to unity formula')
    .argument('<archive>', 'folder that holds recipes.csv and materials.csv')
    .argument('[recipe...]', 'names of recipes')
    .option('--json', 'write JSON instead of a page')
    .addHelpText('after', () => helpText(HELP, io.columns))
    .action(async (path: string, names: string[], { json = false }: { json?: boolean }) => {
      const { toJson, unityAnswer, unityPage } = await import('../../index.ts');
      const found = await recipesAt(path, io);
      if (names.length === 0 && found.faults.length > 0) throw new ArchiveError(found.faults);
      // By name, so that the order of the rows changes nothing.
      const all = names.length > 0 ? names : found.recipes.map(({ recipe }) => recipe).sort();
      const points = await soundRecipes(found, all);
      const recipes = points.map(({ point, unity }) => ({ recipe: point, unity }));
      await tellNotes(found.notes, io);
      io.out(json ? toJson(unityAnswer(recipes)) : unityPage(recipes, lookOf(io)));
    });
