import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { materialFaults, molesPer100gRaw } from '../../src/chemistry/material.ts';
import { MOLAR_MASS, OXIDES, type Oxide } from '../../src/chemistry/oxides.ts';
import { CompositionError } from '../../src/errors.ts';

const RAW_CLAY = { SiO2: 47, Al2O3: 38, Fe2O3: 1 };

describe('molesPer100gRaw', () => {
  it('takes a raw analysis as it stands', () => {
    const { moles, loiPercent } = molesPer100gRaw({ analysis: RAW_CLAY, loiPercent: 14 });
    expect(moles.SiO2).toBeCloseTo(47 / MOLAR_MASS.SiO2, 12);
    expect(moles.Al2O3).toBeCloseTo(38 / MOLAR_MASS.Al2O3, 12);
    expect(loiPercent).toBe(14);
  });

  it('a fired analysis gives the same moles as the raw one of the same material', () => {
    const weights = fc.dictionary(
      fc.constantFrom(...OXIDES),
      fc.double({ min: 0.01, max: 100, noNaN: true }),
      { minKeys: 1, maxKeys: 8 },
    );
    const loi = fc.double({ min: 0, max: 60, noNaN: true });
    fc.assert(
      fc.property(weights, loi, (weight, loiPercent) => {
        const total = Object.values(weight).reduce((sum, w) => sum + w, 0);
        const to = (sum: number) =>
          Object.fromEntries(Object.entries(weight).map(([o, w]) => [o, (w / total) * sum]));
        const fired = molesPer100gRaw({ analysis: to(100), basis: 'fired', loiPercent }).moles;
        const raw = molesPer100gRaw({
          analysis: to(100 - loiPercent),
          basis: 'raw',
          loiPercent,
        }).moles;
        for (const oxide of Object.keys(weight) as Oxide[]) {
          expect(fired[oxide]).toBeCloseTo(raw[oxide] ?? Number.NaN, 10);
        }
      }),
    );
  });

  it('takes a formula, with its own loss on ignition', () => {
    const { moles, loiPercent } = molesPer100gRaw({ formula: 'CaCO3', loiPercent: 0 });
    expect(Object.keys(moles)).toEqual(['CaO']);
    // What stays of 100 g is the oxide.
    expect((moles.CaO ?? 0) * MOLAR_MASS.CaO + loiPercent).toBeCloseTo(100, 10);
  });

  it('takes a formula beside an analysis of blanks read as 0', () => {
    const given = { formula: 'SiO2', analysis: { SiO2: 0, Al2O3: 0 }, loiPercent: 0 };
    expect(molesPer100gRaw(given).moles.SiO2).toBeCloseTo(100 / MOLAR_MASS.SiO2, 12);
  });

  it('takes what burns away altogether', () => {
    expect(molesPer100gRaw({ loiPercent: 100 })).toEqual({ moles: {}, loiPercent: 100 });
  });

  it('names every fault at once, and where', () => {
    const given = { analysis: { SiO2: -47, Al2O3: Number.NaN }, loiPercent: 101 };
    expect(() => molesPer100gRaw(given)).toThrow(CompositionError);
    expect(() => molesPer100gRaw(given)).toThrow(
      'SiO2: expected 0 to 100 wt%, found -47; Al2O3: expected 0 to 100 wt%, found NaN; ' +
        'loi: expected 0 to 100 wt%, found 101',
    );
  });
});

describe('materialFaults', () => {
  const faultOf = (given: Parameters<typeof materialFaults>[0]) => {
    const faults = materialFaults(given);
    expect(faults).toHaveLength(1);
    return faults[0];
  };

  it.each([
    ['raw by default', { analysis: RAW_CLAY, loiPercent: 14 }],
    ['raw, said', { analysis: RAW_CLAY, basis: 'raw', loiPercent: 14 }],
    ['fired, said', { analysis: { SiO2: 55, Al2O3: 45 }, basis: 'fired', loiPercent: 14 }],
    ['no loss to speak of, no basis', { analysis: { SiO2: 99.4 }, loiPercent: 1.5 }],
    ['a sum of 97', { analysis: { SiO2: 97 }, loiPercent: 0 }],
    ['a sum of 103', { analysis: { SiO2: 60, Al2O3: 43 }, loiPercent: 0 }],
    ['a small loss and a raw sum of 100', { analysis: { SiO2: 97.5 }, loiPercent: 2.5 }],
    ['a loss as the formula gives it', { formula: 'CaCO3', loiPercent: 43.5 }],
  ] as const)('finds none: %s', (_, given) => {
    expect(materialFaults(given)).toEqual([]);
  });

  it('asks for the basis where oxides near 100 stand beside a loss', () => {
    expect(faultOf({ analysis: { SiO2: 55, Al2O3: 45.2 }, loiPercent: 14 })).toEqual({
      part: 'basis',
      message:
        'expected raw or fired, found a blank: the oxides sum to 100.2 beside a loi of 14, ' +
        'as if of the fired material',
    });
    expect(faultOf({ analysis: { SiO2: 100 }, loiPercent: 1.6 }).part).toBe('basis');
  });

  it.each([
    [{ analysis: { SiO2: 96.9 }, loiPercent: 0 }, 'found 96.9 (oxides 96.9, loi 0)'],
    [{ analysis: { SiO2: 50, Al2O3: 53.1 }, loiPercent: 0 }, 'found 103.1 (oxides 103.1, loi 0)'],
    [{ analysis: { SiO2: 94 }, loiPercent: 12 }, 'found 106 (oxides 94, loi 12)'],
    [
      { analysis: { SiO2: 100 }, basis: 'raw', loiPercent: 14 },
      'expected oxides and loi that sum to 97 to 103, found 114 (oxides 100, loi 14)',
    ],
    [
      { analysis: RAW_CLAY, basis: 'fired', loiPercent: 14 },
      'expected fired oxides that sum to 97 to 103, found 86 (loi 14)',
    ],
    [{ analysis: { SiO2: 100 }, basis: 'fired', loiPercent: 100 }, 'found 100 (loi 100)'],
  ] as const)('states the sum of %j', (given, message) => {
    const fault = faultOf(given);
    expect(fault.part).toBe('');
    expect(fault.message).toContain(message);
  });

  it('refuses a formula beside an analysis', () => {
    expect(faultOf({ analysis: { SiO2: 100 }, formula: 'SiO2', loiPercent: 0 })).toEqual({
      part: 'formula',
      message: 'expected a formula or an analysis, found both',
    });
  });

  it.each([{ loiPercent: 0 }, { analysis: {}, formula: ' ', loiPercent: 0 }])(
    'refuses a material of nothing: %j',
    (given) => {
      expect(faultOf(given).message).toBe('expected oxides in wt% or a formula, found neither');
    },
  );

  it('says what is wrong with a formula', () => {
    expect(faultOf({ formula: 'CaX', loiPercent: 0 })).toEqual({
      part: 'formula',
      message: 'expected a known element, found "X" at character 3 of "CaX"',
    });
  });

  it('refuses a loss that is not the formula’s own', () => {
    expect(faultOf({ formula: 'CaCO3', loiPercent: 12 })).toEqual({
      part: 'loi',
      message: 'expected 43.97 as the formula gives, or a blank, found 12',
    });
  });

  it('refuses a negative amount even where the sum is right', () => {
    expect(faultOf({ analysis: { SiO2: 60, Al2O3: 42, CaO: -2 }, loiPercent: 0 })).toEqual({
      part: 'CaO',
      message: 'expected 0 to 100 wt%, found -2',
    });
  });
});
