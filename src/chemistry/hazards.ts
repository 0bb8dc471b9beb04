import type { Oxide } from './oxides.ts';
import type { Unity } from './unity.ts';

/**
 * What holds for every answer; lines of at most 78 columns.
 *
 * @example
 * GENERAL_CAUTIONS.length; // 3
 */
export const GENERAL_CAUTIONS: readonly string[] = Object.freeze([
  'A prediction is no promise: fire a test tile before any ware.',
  'A gloss surface is not a food-safe one; underfired glaze can release metals.',
  "Kiln and dust: follow the kiln maker's instructions and local rules.",
]);

/** Oxides of the metals that a glaze may give off to food and drink, and the metals' names. */
const METALS = [
  ['PbO', 'lead'],
  ['BaO', 'barium'],
  ['CuO', 'copper'],
  ['MnO', 'manganese'],
  ['Cr2O3', 'chromium'],
  ['CoO', 'cobalt'],
  ['NiO', 'nickel'],
  ['V2O5', 'vanadium'],
  ['Li2O', 'lithium'],
] as const satisfies readonly (readonly [Oxide, string])[];

const LEACH_TEST = 'Before use with food or drink, a licensed laboratory must leach-test the ware.';

/**
 * What has to be said of a glaze that holds a metal it may give off to food or drink.
 *
 * Any amount counts: what a glaze gives off depends on far more than how much it holds. No
 * note does not mean safe.
 *
 * @param unity - unity formula
 * @returns none, or two sentences: the metals by name, and what to have done
 * @example
 * hazardNotes({ CaO: 0.7, PbO: 0.3, CuO: 0.05, SiO2: 3 })[0]; // 'Holds lead and copper.'
 * hazardNotes({ CaO: 1, Al2O3: 0.4, SiO2: 3 }); // []
 */
export function hazardNotes(unity: Unity): string[] {
  const held = METALS.filter(([oxide]) => (unity[oxide] ?? 0) > 0);
  if (held.length === 0) return [];
  return [`Holds ${listed(held.map(([, name]) => name))}.`, LEACH_TEST];
}

function listed(words: readonly string[]): string {
  const last = words.at(-1) ?? '';
  return words.length < 2 ? last : `${words.slice(0, -1).join(', ')} and ${last}`;
}
