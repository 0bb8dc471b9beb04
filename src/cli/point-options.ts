import { basename } from 'node:path';
import type { Command } from 'commander';
import { CompositionError, UsageError } from '../errors.ts';
import type { Model, Point } from '../index.ts';
import { STDIN, type Io } from './io.ts';
import { recipesAt, soundRecipe } from './recipe-input.ts';

/** Ways to name the glazes that are asked about; they add up, in this order. */
export interface PointOptions {
  readonly glaze?: readonly string[];
  readonly points?: string;
  readonly recipe?: readonly string[];
  readonly archive?: string;
}

/**
 * Gives a command the options that name glazes.
 *
 * @param command - the command
 * @returns the same command
 */
export function withPointOptions(command: Command): Command {
  return command
    .option('--glaze <oxides...>', 'moles at any scale: "SiO2=3.4 Al2O3=0.42 K2O=0.25 CaO=0.75"')
    .option('--points <file>', 'CSV with a column point and oxide columns in moles, - for stdin')
    .option('--recipe <name...>', 'recipes of the archive that the model was learnt from')
    .option('--archive <archive>', 'where to look up --recipe first, the model second');
}

/**
 * The glazes that a command was asked about.
 *
 * @param options - as given
 * @param model - model that the command works on, and where it came from
 * @param io - where to read
 * @returns the points: of --glaze, then of --points, then of --recipe
 * @throws {UsageError} if two inputs claim standard input
 * @throws {CompositionError} or {ArchiveError} if a glaze cannot be read
 */
export async function pointsOf(
  options: PointOptions,
  { model, path }: { readonly model: Model; readonly path: string },
  io: Io,
): Promise<Point[]> {
  const { glaze = [], points, recipe = [], archive } = options;
  if ([path, points, archive].filter((input) => input === STDIN).length > 1) {
    throw new UsageError('expected one input from standard input, got more than one -');
  }
  const { glazePoint, readPoints } = await import('../index.ts');
  const named = glaze.map((text, i) =>
    glazePoint(text, glaze.length === 1 ? 'glaze' : `glaze ${i + 1}`),
  );
  const listed =
    points === undefined
      ? []
      : readPoints(
          points === STDIN ? 'standard input' : basename(points),
          await io.readBytes(points),
        );
  const recipes = recipe.length === 0 ? [] : await recipePoints(recipe, model, archive, io);
  return [...named, ...listed, ...recipes];
}

/**
 * The glazes that a command was asked about, at least one.
 *
 * @param options - as given
 * @param from - model that the command works on, and where it came from
 * @param io - where to read
 * @returns the points
 * @throws {UsageError} if no option names a glaze
 */
export async function somePoints(
  options: PointOptions,
  from: { readonly model: Model; readonly path: string },
  io: Io,
): Promise<Point[]> {
  const { glaze, points, recipe } = options;
  if (glaze === undefined && points === undefined && recipe === undefined) {
    throw new UsageError(
      'expected a glaze to answer for, got none',
      'Name it by --glaze "SiO2=3.4 ...", --points FILE.csv or --recipe NAME.',
    );
  }
  return pointsOf(options, from, io);
}

async function recipePoints(
  names: readonly string[],
  model: Model,
  archive: string | undefined,
  io: Io,
): Promise<Point[]> {
  const held = model.archive.recipes;
  if (archive === undefined && held.length === 0) {
    throw new CompositionError(
      `expected recipes in the model, found none (asked for ${names.join(', ')})`,
      'Name the archive that holds them by --archive, or give the glaze by --glaze.',
    );
  }
  const found = archive === undefined ? { recipes: [], faults: [] } : await recipesAt(archive, io);
  const recipes = [...found.recipes, ...held];
  return Promise.all(names.map((name) => soundRecipe({ recipes, faults: found.faults }, name)));
}
