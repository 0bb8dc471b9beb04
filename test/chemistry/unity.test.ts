import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ATOMIC_WEIGHT } from '../../src/chemistry/atomic-weights.ts';
import { isOxide, MOLAR_MASS, OXIDES, oxideMakeUp } from '../../src/chemistry/oxides.ts';
import { alkaliShare, molesOf, toUnity, unityFormula } from '../../src/chemistry/unity.ts';
import { CompositionError } from '../../src/errors.ts';

describe('oxides', () => {
  it.each([
    ['SiO2', { element: 'Si', atoms: 1, oxygens: 2 }],
    ['Al2O3', { element: 'Al', atoms: 2, oxygens: 3 }],
    ['K2O', { element: 'K', atoms: 2, oxygens: 1 }],
    ['CaO', { element: 'Ca', atoms: 1, oxygens: 1 }],
    ['P2O5', { element: 'P', atoms: 2, oxygens: 5 }],
  ] as const)('%s is %j', (oxide, makeUp) => {
    expect(oxideMakeUp(oxide)).toEqual(makeUp);
  });

  it('each has an element of its own with an atomic weight', () => {
    const elements = OXIDES.map((oxide) => oxideMakeUp(oxide).element);
    expect(new Set(elements).size).toBe(OXIDES.length);
    expect(Object.keys(ATOMIC_WEIGHT)).toEqual(expect.arrayContaining(elements));
  });

  it.each(['sio2', 'SiO', ' SiO2', 'FeO', 'toString', ''])('"%s" is none of them', (text) => {
    expect(isOxide(text)).toBe(false);
  });
});

describe('unityFormula', () => {
  const amounts = fc.dictionary(
    fc.constantFrom(...OXIDES),
    fc.double({ min: 0, max: 100, noNaN: true }),
    { maxKeys: 8 },
  );

  it('does not depend on the total of the analysis', () => {
    const factor = fc.double({ min: 1e-3, max: 1e3, noNaN: true });
    fc.assert(
      fc.property(amounts, factor, (weights, times) => {
        const analysis = { ...weights, CaO: 10 };
        const other = Object.fromEntries(Object.entries(analysis).map(([o, w]) => [o, w * times]));
        const [unity, scaled] = [unityFormula(analysis), unityFormula(other)];
        for (const oxide of OXIDES) {
          const value = unity[oxide] ?? 0;
          // 1e-12 of the value; below 1e-300 a scaled amount loses digits or becomes 0.
          const off = Math.abs((scaled[oxide] ?? 0) - value);
          expect(off).toBeLessThanOrEqual(1e-12 * value + 1e-300);
        }
      }),
    );
  });

  it('turns moles of an oxide into its molar mass and back', () => {
    for (const oxide of OXIDES) {
      expect(molesOf({ [oxide]: MOLAR_MASS[oxide] })[oxide]).toBe(1);
    }
  });

  it('counts iron and the colouring oxides as no flux', () => {
    const unity = toUnity({ CaO: 2, Fe2O3: 1, CuO: 1, CoO: 1, NiO: 1, Cr2O3: 1 });
    expect(unity.CaO).toBe(1);
    expect(() => toUnity({ Fe2O3: 1, CuO: 1 })).toThrow(CompositionError);
  });

  it('names what was given where there is no flux', () => {
    expect(() => unityFormula({ SiO2: 60, Al2O3: 40, CaO: 0 })).toThrow(
      'expected a flux, found none (oxides given: SiO2, Al2O3)',
    );
    expect(() => unityFormula({})).toThrow('expected a flux, found none (oxides given: none)');
  });
});

it('the alkali share counts potash, soda and lithia', () => {
  expect(alkaliShare({ K2O: 0.25, Na2O: 0.125, Li2O: 0.125, CaO: 0.5 })).toBe(0.5);
  expect(alkaliShare({ CaO: 1 })).toBe(0);
});
