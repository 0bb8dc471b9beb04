import { describe, expect, it } from 'vitest';
import { bothReadings, weightDoubt, wildAmounts } from '../../src/chemistry/plausible-glaze.ts';
import { MOLAR_MASS, type Oxide } from '../../src/chemistry/oxides.ts';
import { toUnity, type Moles, type Unity } from '../../src/chemistry/unity.ts';

// Invented; an everyday formula for cone 6.
const UNITY: Moles = { SiO2: 3.4, Al2O3: 0.42, B2O3: 0.15, K2O: 0.1, Na2O: 0.15, CaO: 0.75 };
const scaled = (amounts: Moles, to: number): Moles => {
  const sum = Object.values(amounts).reduce((total, amount) => total + amount, 0);
  return Object.fromEntries(Object.entries(amounts).map(([o, a]) => [o, (a * to) / sum]));
};
const WEIGHTS = scaled(
  Object.fromEntries(
    (Object.entries(UNITY) as [Oxide, number][]).map(([o, moles]) => [o, moles * MOLAR_MASS[o]]),
  ),
  100,
);

describe('both readings of amounts', () => {
  it('bring weights back to the formula that they were weighed for', () => {
    const back = bothReadings(WEIGHTS)?.asWeight ?? {};
    for (const [oxide, moles] of Object.entries(UNITY)) {
      // Rounding of double precision only.
      expect(back[oxide as Oxide]).toBeCloseTo(moles, 12);
    }
    expect(bothReadings(UNITY)?.asMoles).toEqual(toUnity(UNITY));
  });

  it('are none without a flux', () => {
    expect(bothReadings({ SiO2: 3 })).toBeUndefined();
  });
});

describe('amounts that may be weights', () => {
  it.each([
    ['weight per cent', WEIGHTS, 'sum'],
    ['weight per cent rounded to 98', scaled(WEIGHTS, 98), 'sum'],
    ['weight per cent of 102', scaled(WEIGHTS, 102), 'sum'],
    ['mole per cent, which has the same sum', scaled(UNITY, 100), 'sum'],
    ['a unity formula', UNITY, undefined],
    ['moles of another scale', scaled(UNITY, 97.9), undefined],
    ['grams of a lead glaze', { SiO2: 100, Al2O3: 14, PbO: 167, K2O: 2 }, 'formula'],
    [
      'grams that as moles would make a glaze of alumina',
      { SiO2: 20, Al2O3: 7, MgO: 4 },
      'formula',
    ],
    ['no flux', { SiO2: 90, Al2O3: 10 }, undefined],
  ])('%s', (_, amounts, doubt) => {
    expect(weightDoubt(amounts)).toBe(doubt);
  });
});

describe('amounts that no glaze has', () => {
  const cases: readonly (readonly [Unity, readonly string[]])[] = [
    [{ SiO2: 340, Al2O3: 0.4, CaO: 1 }, ['SiO2 340']],
    [{ SiO2: 0.0001, Al2O3: 3.2, CaO: 1 }, ['SiO2 0.0001', 'Al2O3 3.2']],
    [{ Al2O3: 0.4, CaO: 1 }, ['no SiO2']],
    [{ SiO2: 3, B2O3: 9, CaO: 1 }, ['B2O3 9']],
    [toUnity(UNITY), []],
    // The most refractory published test in the data sets.
    [{ SiO2: 11, Al2O3: 1.1, CaO: 1 }, []],
  ];

  it.each(cases)('%j: %j', (unity, wild) => {
    expect(wildAmounts(unity)).toEqual(wild);
  });
});
