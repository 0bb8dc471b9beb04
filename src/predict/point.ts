import { readGlaze } from '../archive/glaze-text.ts';
import { nameAdvice } from '../archive/nearest-name.ts';
import { quoted } from '../archive/found-text.ts';
import { CompositionError } from '../errors.ts';
import type { Model } from '../model/model.ts';
import type { Point } from './answers.ts';

/**
 * A composition written as text.
 *
 * @param text - as `readGlaze` takes it
 * @param name - how answers name the point
 * @returns the point, as a unity formula
 * @throws {CompositionError} with everything that is wrong with the text
 * @example
 * glazePoint('SiO2=7 Al2O3=0.8 K2O=0.6 CaO=1.4').unity.SiO2; // 3.5
 */
export function glazePoint(text: string, name = 'glaze'): Point {
  return { point: name, unity: readGlaze(text, name).unity };
}

/**
 * A recipe that the archive holds, as a point.
 *
 * @param archive - archive, or that of a model
 * @param name - name of the recipe
 * @returns the point
 * @throws {CompositionError} if there is no such recipe; names the nearest
 */
export function recipePoint({ recipes }: Pick<Model['archive'], 'recipes'>, name: string): Point {
  const recipe = recipes.find((candidate) => candidate.recipe === name);
  if (recipe) return { point: name, unity: recipe.unity };
  const advice = nameAdvice(recipes.map((candidate) => candidate.recipe))(name);
  throw new CompositionError(`expected a recipe, got ${quoted(name)}${advice}`);
}
