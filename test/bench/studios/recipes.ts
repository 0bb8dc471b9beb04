import type { Generator } from '../../../src/numeric/random.ts';
import { around, between, happens, oneOf } from './chance.ts';
import type { Glaze } from './truths/truth.ts';

/** Recipes that are mixed together: a grid, a line, or a loose one by itself. */
export interface RecipeSet {
  readonly blend?: string;
  readonly recipes: readonly Glaze[];
}

/** What makes a grid or a line: none of it is asked about beyond these ends, though loose ones go there. */
const LEAST_ALUMINA = 0.1;

/**
 * A grid over silica and alumina at one flux mix.
 *
 * @param chance - decides
 * @param blend - its name
 * @param most - tiles that there is room for, at least 4
 * @returns rows of silica by columns of alumina
 */
export function drawGrid(chance: Generator, blend: string, most: number): RecipeSet {
  const columns = Math.min(oneOf(chance, [3, 4, 5, 6]), Math.floor(Math.sqrt(most)));
  const rows = Math.min(oneOf(chance, [3, 4, 5, 6, 7]), Math.floor(most / columns));
  const base = { ...looseGlaze(chance), boric: usualBoron(chance) };
  const silica = spread(around(chance, 3.4, 0.3), between(chance, 1.6, 3), rows);
  const alumina = spread(around(chance, 0.47, 0.05), between(chance, 0.25, 0.5), columns);
  const recipes = silica.flatMap((s) => alumina.map((a) => ({ ...base, silica: s, alumina: a })));
  return { blend, recipes: recipes.map(possible) };
}

/**
 * A line: one amount in steps, all else held.
 *
 * @param chance - decides
 * @param blend - its name
 * @param most - tiles that there is room for, at least 3
 * @returns 3 to 8 recipes
 */
export function drawLine(chance: Generator, blend: string, most: number): RecipeSet {
  const base = looseGlaze(chance);
  const count = Math.min(most, oneOf(chance, [4, 5, 6, 7, 8]));
  const axis = oneOf(chance, [
    'silica',
    'alumina',
    'boric',
    'boric',
    'alkali',
    'magnesia',
  ] as const);
  const span = { silica: [1.8, 5], alumina: [0.2, 0.75], boric: [0, 0.4], alkali: [0.1, 0.45] };
  const [low, high] = axis === 'magnesia' ? [0, between(chance, 0.1, 0.25)] : span[axis];
  const recipes = spread((low + high) / 2, high - low, count).map((amount) => ({
    ...base,
    [axis]: amount,
  }));
  return { blend, recipes: recipes.map(possible) };
}

/**
 * A loose recipe, mostly in the usual ranges, some beyond.
 *
 * @param chance - decides
 * @returns one recipe without a blend
 */
export function drawLoose(chance: Generator): RecipeSet {
  return { recipes: [possible(looseGlaze(chance))] };
}

function looseGlaze(chance: Generator): Glaze {
  return {
    silica: around(chance, 3.3, 0.75),
    alumina: around(chance, 0.43, 0.13),
    boric: usualBoron(chance),
    alkali: around(chance, 0.29, 0.08),
    magnesia: happens(chance, 0.5) ? between(chance, 0, 0.15) : between(chance, 0, 0.04),
    zinc: happens(chance, 0.3) ? between(chance, 0, 0.15) : 0,
  };
}

/** A tenth without boron. */
function usualBoron(chance: Generator): number {
  return happens(chance, 0.1) ? 0 : Math.max(0, around(chance, 0.18, 0.1));
}

/** Evenly spaced about a middle. */
function spread(middle: number, range: number, count: number): number[] {
  if (count === 1) return [middle];
  return Array.from({ length: count }, (_, i) => middle + range * (i / (count - 1) - 0.5));
}

/** Within what can be weighed: nothing below 0, the fluxes at most 1. */
function possible(glaze: Glaze): Glaze {
  const within = (low: number, amount: number, high: number) =>
    Math.min(high, Math.max(low, amount));
  return {
    silica: within(1.2, glaze.silica, 6),
    alumina: within(LEAST_ALUMINA, glaze.alumina, 0.95),
    boric: within(0, glaze.boric, 0.5),
    alkali: within(0.08, glaze.alkali, 0.6),
    magnesia: within(0, glaze.magnesia, 0.25),
    zinc: within(0, glaze.zinc, 0.15),
  };
}
