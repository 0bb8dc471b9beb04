import { ATOMIC_WEIGHT, type Element } from './atomic-weights.ts';

/** The oxides that a composition may hold, in the order in which they are shown. */
export const OXIDES = [
  'SiO2',
  'Al2O3',
  'B2O3',
  'Li2O',
  'Na2O',
  'K2O',
  'MgO',
  'CaO',
  'SrO',
  'BaO',
  'ZnO',
  'PbO',
  'MnO',
  'Fe2O3',
  'TiO2',
  'ZrO2',
  'P2O5',
  'SnO2',
  'CoO',
  'NiO',
  'CuO',
  'Cr2O3',
  'V2O5',
  'CeO2',
] as const;

export type Oxide = (typeof OXIDES)[number];

/**
 * The fluxes of the unity formula: R2O and RO. Iron and the colouring oxides are not counted
 * (common practice; Seger's own formulas count neither).
 */
export const FLUXES = [
  'Li2O',
  'Na2O',
  'K2O',
  'MgO',
  'CaO',
  'SrO',
  'BaO',
  'ZnO',
  'PbO',
  'MnO',
] as const satisfies readonly Oxide[];

/** What one formula unit of an oxide holds: the element other than oxygen, and both counts. */
export interface OxideMakeUp {
  readonly element: Element;
  readonly atoms: number;
  readonly oxygens: number;
}

/**
 * The element of an oxide, how many atoms of it and how many oxygens.
 *
 * @param oxide - an oxide of `OXIDES`
 * @returns element and counts per formula unit
 * @example
 * oxideMakeUp('Al2O3').atoms; // 2
 */
export function oxideMakeUp(oxide: Oxide): OxideMakeUp {
  const [, element = '', atoms = '', oxygens = ''] = /^([A-Z][a-z]?)(\d?)O(\d?)$/.exec(oxide) ?? [];
  return {
    element: element as Element,
    atoms: Number(atoms || 1),
    oxygens: Number(oxygens || 1),
  };
}

/**
 * Molar mass of every oxide, in g/mol, from the standard atomic weights.
 *
 * @example
 * MOLAR_MASS.SiO2; // ~60.083
 */
export const MOLAR_MASS: Readonly<Record<Oxide, number>> = Object.freeze(
  Object.fromEntries(
    OXIDES.map((oxide) => {
      const { element, atoms, oxygens } = oxideMakeUp(oxide);
      return [oxide, atoms * ATOMIC_WEIGHT[element] + oxygens * ATOMIC_WEIGHT.O];
    }),
  ) as Record<Oxide, number>,
);

/**
 * Whether a text names an oxide of `OXIDES`, to the letter.
 *
 * @param text - any text
 * @returns true if it does
 * @example
 * isOxide('Al2O3'); // true
 * isOxide('al2o3'); // false
 */
export function isOxide(text: string): text is Oxide {
  return (OXIDES as readonly string[]).includes(text);
}
