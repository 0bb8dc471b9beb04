import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { molesPer100gRaw } from '../../src/chemistry/material.ts';
import { FLUXES, OXIDES } from '../../src/chemistry/oxides.ts';
import { recipeUnity, type RecipePart } from '../../src/chemistry/recipe.ts';
import { toUnity, type Unity } from '../../src/chemistry/unity.ts';
import { CompositionError } from '../../src/errors.ts';

const MINERALS = ['KAlSi3O8', 'CaCO3', 'SiO2', 'Al2Si2O5(OH)4', 'CaMg(CO3)2', 'ZnO', 'Fe2O3'];
const line = (formula: string, parts: number): RecipePart => ({
  parts,
  molesPer100g: molesPer100gRaw({ formula, loiPercent: 0 }).moles,
});
const parts = fc.double({ min: 0.01, max: 1000, noNaN: true });
/** Whiting and any other minerals: every recipe has a flux. */
const recipes = fc
  .tuple(parts, fc.array(fc.tuple(fc.constantFrom(...MINERALS), parts), { maxLength: 8 }))
  .map(([whiting, rest]) => [line('CaCO3', whiting), ...rest.map(([f, p]) => line(f, p))]);

const expectSame = (unity: Unity, other: Unity) => {
  expect(Object.keys(unity)).toEqual(Object.keys(other));
  for (const oxide of OXIDES) {
    // 1e-12 of the value: rounding of sums of at most nine terms.
    const [a, b] = [unity[oxide] ?? 0, other[oxide] ?? 0];
    expect(Math.abs(a - b), oxide).toBeLessThanOrEqual(1e-12 * Math.abs(b));
  }
};

describe('recipeUnity', () => {
  it('weighs moles by parts', () => {
    const unity = recipeUnity([
      { parts: 50, molesPer100g: { CaO: 1, SiO2: 1 } },
      { parts: 25, molesPer100g: { SiO2: 4 } },
    ]);
    expect(unity).toEqual({ SiO2: 3, CaO: 1 });
  });

  it('has fluxes that sum to 1', () => {
    fc.assert(
      fc.property(recipes, (lines) => {
        const unity = recipeUnity(lines);
        expect(FLUXES.reduce((sum, o) => sum + (unity[o] ?? 0), 0)).toBeCloseTo(1, 12);
      }),
    );
  });

  it('does not depend on the order of the lines, to the last bit', () => {
    fc.assert(
      fc.property(recipes, (lines) => {
        expect(recipeUnity([...lines].reverse())).toStrictEqual(recipeUnity(lines));
      }),
    );
  });

  it('does not depend on the unit of the parts', () => {
    const factor = fc.double({ min: 1e-6, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(recipes, factor, (lines, times) => {
        const inOtherUnit = lines.map((l) => ({ ...l, parts: l.parts * times }));
        expectSame(recipeUnity(inOtherUnit), recipeUnity(lines));
      }),
    );
  });

  it('does not depend on the order of the lines', () => {
    fc.assert(
      fc.property(recipes, (lines) => {
        expectSame(recipeUnity(lines.toReversed()), recipeUnity(lines));
      }),
    );
  });

  it('two halves of a material equal the whole', () => {
    fc.assert(
      fc.property(recipes, (lines) => {
        const halves = lines.flatMap((l) => [1, 2].map(() => ({ ...l, parts: l.parts / 2 })));
        expectSame(recipeUnity(halves), recipeUnity(lines));
      }),
    );
  });

  it('holds at the ends of the range of numbers', () => {
    const huge = recipeUnity([line('CaCO3', 1.7e308), line('SiO2', 1.7e308)]);
    const tiny = recipeUnity([line('CaCO3', 1e-300), line('SiO2', 1e-300)]);
    expectSame(huge, recipeUnity([line('CaCO3', 1), line('SiO2', 1)]));
    expectSame(tiny, huge);
  });

  it('leaves out an oxide of which there is none', () => {
    const unity = recipeUnity([{ parts: 1, molesPer100g: { CaO: 1, PbO: 0 } }]);
    expect(unity).toEqual({ CaO: 1 });
  });

  it.each([0, -3, Number.NaN, Infinity])('refuses %f parts and says of which material', (bad) => {
    const recipe = () => recipeUnity([line('CaCO3', 10), line('SiO2', bad)]);
    expect(recipe).toThrow(CompositionError);
    expect(recipe).toThrow(`expected parts above 0, found ${bad} for material 2 of the recipe`);
  });

  it('refuses a recipe of no material and one of no flux', () => {
    expect(() => recipeUnity([])).toThrow('expected a recipe of some materials, found none');
    expect(() => recipeUnity([line('SiO2', 1)])).toThrow(
      'expected a flux, found none (oxides given: SiO2)',
    );
  });
});

describe('toUnity', () => {
  it('leaves a unity formula as it is', () => {
    fc.assert(
      fc.property(recipes, (lines) => {
        const unity = recipeUnity(lines);
        expectSame(toUnity(Object.fromEntries(Object.entries(unity))), unity);
      }),
    );
  });
});
