import { nameAdvice } from '../archive/nearest-name.ts';
import { quoted } from '../archive/found-text.ts';
import { FLUXES, isOxide, OXIDES, type Oxide } from '../chemistry/oxides.ts';
import { toUnity } from '../chemistry/unity.ts';
import { CompositionError } from '../errors.ts';
import type { Model } from '../model/model.ts';
import type { Point } from './answers.ts';

const oxideAdvice = nameAdvice(OXIDES);

/**
 * A composition written as text.
 *
 * @param text - `OXIDE=MOLES` separated by spaces or commas, at any scale; SiO2, Al2O3 and at least
 *   one flux are needed
 * @param name - how answers name the point
 * @returns the point, as a unity formula
 * @throws {CompositionError} with everything that is wrong with the text
 * @example
 * glazePoint('SiO2=7 Al2O3=0.8 K2O=0.6 CaO=1.4').unity.SiO2; // 3.5
 */
export function glazePoint(text: string, name = 'glaze'): Point {
  const parts = text.split(/[\s,;]+/).filter((part) => part !== '');
  const moles = new Map<Oxide, number>();
  const faults = parts.flatMap((part) => partFault(part, moles));
  const names = (oxides: readonly Oxide[]) =>
    parts.some((part) => oxides.some((oxide) => part.split(/[=:]/)[0] === oxide));
  for (const oxide of ['SiO2', 'Al2O3'] as const) {
    if (!names([oxide])) faults.push(`expected ${oxide}=..., found none`);
  }
  if (!names(FLUXES)) faults.push(`expected a flux, found none of ${FLUXES.join(', ')}`);
  if (faults.length > 0) {
    throw new CompositionError(
      `${quoted(text)} is no composition\n${faults.map((fault) => `  ${fault}`).join('\n')}`,
      'Write moles of oxides, such as "SiO2=3.4 Al2O3=0.42 K2O=0.25 CaO=0.75".',
    );
  }
  return { point: name, unity: toUnity(Object.fromEntries(moles)) };
}

/** Reads one part into the moles; what is wrong with it, if anything. */
function partFault(part: string, moles: Map<Oxide, number>): string[] {
  const [, oxide = '', amount = ''] = /^([^=:]+)[=:](.*)$/.exec(part) ?? [];
  if (oxide === '') return [`expected OXIDE=MOLES, got ${quoted(part)}`];
  if (!isOxide(oxide)) return [`expected an oxide, got ${quoted(oxide)}${oxideAdvice(oxide)}`];
  if (!/^\d*\.?\d+(e-?\d+)?$/i.test(amount) || !(Number(amount) < 1e6)) {
    return [`expected moles of ${oxide} such as 0.42, got ${quoted(amount)}`];
  }
  if (oxide === 'SiO2' && !(Number(amount) > 0)) return ['expected SiO2 above 0, got 0'];
  if (moles.has(oxide)) return [`expected ${oxide} once, got it again (${quoted(part)})`];
  moles.set(oxide, Number(amount));
  return [];
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
