import { molesPer100gRaw } from '../../src/chemistry/material.ts';
import type { Moles, WeightPercent } from '../../src/chemistry/unity.ts';

/** A material on the studio's shelf: an invented analysis, or a pure mineral by its formula. */
export interface ShelfMaterial {
  readonly material: string;
  /** Wt%; invented. */
  readonly analysis?: WeightPercent;
  readonly basis?: 'raw' | 'fired';
  readonly loiPercent?: number;
  readonly formula?: string;
}

/** Every analysis here is invented, and so is every name before the word that says what it is. */
export const SHELF: readonly ShelfMaterial[] = [
  {
    material: 'Wendle potash spar',
    analysis: { SiO2: 66.5, Al2O3: 18.4, K2O: 10.9, Na2O: 3.1, CaO: 0.5, Fe2O3: 0.1 },
    basis: 'raw',
    loiPercent: 0.5,
  },
  {
    material: 'Oxter soda spar',
    analysis: { SiO2: 68.4, Al2O3: 19.1, K2O: 1.4, Na2O: 9.6, CaO: 1.0, Fe2O3: 0.1 },
    basis: 'raw',
    loiPercent: 0.4,
  },
  {
    material: 'Pemberlow kaolin',
    analysis: {
      SiO2: 46.6,
      Al2O3: 37.4,
      K2O: 1.2,
      Na2O: 0.1,
      MgO: 0.2,
      CaO: 0.1,
      Fe2O3: 0.6,
      TiO2: 0.3,
    },
    basis: 'raw',
    loiPercent: 13.5,
  },
  {
    material: 'Nettlesham ball clay',
    analysis: {
      SiO2: 57.2,
      Al2O3: 27.4,
      K2O: 2.2,
      Na2O: 0.3,
      MgO: 0.3,
      CaO: 0.2,
      Fe2O3: 1.1,
      TiO2: 1.3,
    },
    basis: 'raw',
    loiPercent: 10.0,
  },
  {
    material: 'Quern lime frit',
    analysis: { SiO2: 42.5, Al2O3: 5.5, B2O3: 25.0, Na2O: 7.5, K2O: 0.5, CaO: 19.0 },
    basis: 'raw',
    loiPercent: 0,
  },
  {
    material: 'Quern soda frit',
    analysis: { SiO2: 58.0, Al2O3: 2.0, B2O3: 16.0, Na2O: 14.5, K2O: 3.5, CaO: 6.0 },
    basis: 'raw',
    loiPercent: 0,
  },
  {
    material: 'Haverel washed ash',
    analysis: {
      SiO2: 32.0,
      Al2O3: 6.0,
      K2O: 7.0,
      Na2O: 1.0,
      MgO: 7.0,
      CaO: 42.0,
      Fe2O3: 2.0,
      P2O5: 3.0,
    },
    basis: 'fired',
    loiPercent: 28.0,
  },
  { material: 'quartz', formula: 'SiO2' },
  { material: 'calcite', formula: 'CaCO3' },
  { material: 'wollastonite', formula: 'CaSiO3' },
  { material: 'dolomite', formula: 'CaMg(CO3)2' },
  { material: 'talc', formula: 'Mg3Si4O10(OH)2' },
  { material: 'alumina hydrate', formula: 'Al(OH)3' },
  { material: 'zinc oxide', formula: 'ZnO' },
  { material: 'strontium carbonate', formula: 'SrCO3' },
  { material: 'spodumene', formula: 'LiAlSi2O6' },
  { material: 'tin oxide', formula: 'SnO2' },
  { material: 'zircon', formula: 'ZrSiO4' },
  { material: 'rutile', formula: 'TiO2' },
  { material: 'red iron oxide', formula: 'Fe2O3' },
  { material: 'cobalt carbonate', formula: 'CoCO3' },
  { material: 'malachite', formula: 'Cu2CO3(OH)2' },
];

const MOLES: ReadonlyMap<string, Moles> = new Map(
  SHELF.map(({ material, analysis, basis, loiPercent, formula }) => [
    material,
    formula === undefined
      ? molesPer100gRaw({
          analysis: analysis ?? {},
          basis: basis ?? 'raw',
          loiPercent: loiPercent ?? 0,
        }).moles
      : molesPer100gRaw({ formula, loiPercent: 0 }).moles,
  ]),
);

/**
 * Moles of each oxide in 100 g of a material of the shelf, as weighed.
 *
 * @param material - its name on the shelf
 * @returns mol per 100 g raw
 * @throws {RangeError} if the studio does not hold it
 */
export function molesPer100g(material: string): Moles {
  const moles = MOLES.get(material);
  if (!moles) throw new RangeError(`material must be on the shelf, got ${material}`);
  return moles;
}
