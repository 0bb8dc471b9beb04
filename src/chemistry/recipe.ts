import { CompositionError } from '../errors.ts';
import { OXIDES } from './oxides.ts';
import { toUnity, type Moles, type Unity } from './unity.ts';

/** One line of a recipe: how much, and of what. */
export interface RecipePart {
  /** Parts by weight of the raw material, in any unit that all lines share. */
  readonly parts: number;
  /** Moles of each oxide in 100 g of the raw material. */
  readonly molesPer100g: Moles;
}

/**
 * Unity formula of a recipe.
 *
 * The parts need not sum to 100; what is weighed over the hundred counts like the rest.
 *
 * @param lines - the materials of the recipe with their parts, each above 0
 * @returns mol per mol flux; holds only oxides that are there
 * @throws {CompositionError} if there is no line, parts that are no amount, or no flux
 * @example
 * recipeUnity([
 *   { parts: 3, molesPer100g: { CaO: 1 } },
 *   { parts: 6, molesPer100g: { SiO2: 1.5 } },
 * ]).SiO2; // 3
 */
export function recipeUnity(lines: readonly RecipePart[]): Unity {
  if (lines.length === 0)
    throw new CompositionError('expected a recipe of some materials, found none');
  lines.forEach(({ parts }, index) => {
    if (parts > 0 && Number.isFinite(parts)) return;
    throw new CompositionError(
      `expected parts above 0, found ${parts} for material ${index + 1} of the recipe`,
      'Leave a material out of the recipe rather than giving it no parts.',
    );
  });
  // Shares of the largest line: parts of any size then neither overflow nor vanish.
  const most = Math.max(...lines.map(({ parts }) => parts));
  const totals = OXIDES.map((oxide) => {
    const moles = lines.map((line) => (line.parts / most) * (line.molesPer100g[oxide] ?? 0));
    // Sorted, so that lines in another order give the same sum to the last bit.
    moles.sort((a, b) => a - b);
    return [oxide, moles.reduce((sum, amount) => sum + amount, 0)] as const;
  });
  return toUnity(Object.fromEntries(totals.filter(([, amount]) => amount > 0)));
}
