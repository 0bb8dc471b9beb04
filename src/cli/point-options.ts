import { basename } from 'node:path';
import type { Command } from 'commander';
import { UsageError } from '../errors.ts';
import type { Model, Point } from '../index.ts';
import { asUsage } from './as-usage.ts';
import { STDIN, type Io } from './io.ts';
import { recipesAt, soundRecipes } from './recipe-input.ts';

/** Ways to name the glazes that are asked about; they add up, in this order. */
export interface PointOptions {
  readonly glaze?: readonly string[];
  readonly points?: string;
  readonly recipe?: readonly string[];
  readonly archive?: string;
}

/** The glazes that a command answers for. */
export interface Asked {
  readonly points: readonly Point[];
  /** What is to be said about how they were given. */
  readonly notes: readonly string[];
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
 * @returns the points of --glaze, then of --points, then of --recipe, and notes
 * @throws {UsageError} if two inputs claim standard input, or a word names no glaze
 * @throws {ArchiveError} if a file cannot be read
 */
export async function pointsOf(
  options: PointOptions,
  { model, path }: { readonly model: Model; readonly path: string },
  io: Io,
): Promise<Asked> {
  const { glaze = [], points, recipe = [], archive } = options;
  if ([path, points, archive].filter((input) => input === STDIN).length > 1) {
    throw new UsageError('expected one input from standard input, got more than one -');
  }
  const named = await glazes(glaze);
  const listed = points === undefined ? NONE : await pointsIn(points, io);
  const recipes = recipe.length === 0 ? [] : await recipePoints(recipe, model, archive, io);
  return {
    points: [...named.points, ...listed.points, ...recipes],
    notes: [...named.notes, ...listed.notes],
  };
}

const NONE: Asked = { points: [], notes: [] };

async function glazes(texts: readonly string[]): Promise<Asked> {
  const { readGlaze } = await import('../index.ts');
  const read = asUsage(texts, (text, i) => {
    const point = texts.length === 1 ? 'glaze' : `glaze ${i + 1}`;
    return { point, ...readGlaze(text, point) };
  });
  return {
    points: read.map(({ point, unity }) => ({ point, unity })),
    notes: read.flatMap(({ notes }) => notes),
  };
}

async function pointsIn(path: string, io: Io): Promise<Asked> {
  const { readPoints } = await import('../index.ts');
  const file = path === STDIN ? 'standard input' : basename(path);
  return readPoints(file, await io.readBytes(path));
}

/**
 * The glazes that a command was asked about, at least one.
 *
 * @param options - as given
 * @param from - model that the command works on, and where it came from
 * @param io - where to read
 * @returns the points and notes
 * @throws {UsageError} if no option names a glaze
 */
export async function somePoints(
  options: PointOptions,
  from: { readonly model: Model; readonly path: string },
  io: Io,
): Promise<Asked> {
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
    throw new UsageError(
      `expected recipes in the model, found none (asked for ${names.join(', ')})`,
      'Name the archive that holds them by --archive, or give the glaze by --glaze.',
    );
  }
  const found = archive === undefined ? { recipes: [], faults: [] } : await recipesAt(archive, io);
  const recipes = [...found.recipes, ...held];
  return soundRecipes({ recipes, faults: found.faults }, names);
}
