import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ATOMIC_WEIGHT, type Element } from '../../src/chemistry/atomic-weights.ts';
import {
  formulaMassGPerMol,
  lossOnIgnitionPercent,
  mineralMoles,
  parseFormula,
  type AtomCounts,
} from '../../src/chemistry/formula.ts';
import { OXIDES } from '../../src/chemistry/oxides.ts';
import { CompositionError } from '../../src/errors.ts';

describe('parseFormula', () => {
  it.each([
    ['SiO2', { Si: 1, O: 2 }],
    ['Al2Si2O5(OH)4', { Al: 2, Si: 2, O: 9, H: 4 }],
    ['Pb3(CO3)2(OH)2', { Pb: 3, C: 2, O: 8, H: 2 }],
    ['3MgO.4SiO2.H2O', { Mg: 3, O: 12, Si: 4, H: 2 }],
    ['Na2O.2B2O3.10H2O', { Na: 2, O: 17, B: 4, H: 20 }],
    ['2PbCO3.Pb(OH)2', { Pb: 3, C: 2, O: 8, H: 2 }],
    ['K[Al(SO4)2]·12H2O', { K: 1, Al: 1, S: 2, O: 20, H: 24 }],
    ['Ca{Mg[(CO3)2]}', { Ca: 1, Mg: 1, C: 2, O: 6 }],
    ['Al₂Si₂O₅(OH)₄', { Al: 2, Si: 2, O: 9, H: 4 }],
    [' CaO * Al2O3 · 2 SiO2 ', { Ca: 1, O: 8, Al: 2, Si: 2 }],
    ['CoO', { Co: 1, O: 1 }],
    ['COO', { C: 1, O: 2 }],
  ])('%s', (formula, atoms) => {
    expect(parseFormula(formula)).toEqual(atoms);
  });

  // The rule for a dot between two digits, as the docstring states it.
  it.each<[string, AtomCounts, string]>([
    ['Ca2B6O11.5H2O', { Ca: 2, B: 6, O: 16, H: 10 }, 'next part after oxygen'],
    ['NaCaB5O9.8H2O', { Na: 1, Ca: 1, B: 5, O: 17, H: 16 }, 'next part after oxygen'],
    ['Al2(SO4)3.18H2O', { Al: 2, S: 3, O: 30, H: 36 }, 'next part after a bracket'],
    ['MgCl2.6H2O', { Mg: 1, Cl: 2, H: 12, O: 6 }, 'next part after chlorine'],
    ['Al2Si2O5(OH)4.2(H2O)', { Al: 2, Si: 2, O: 11, H: 8 }, 'next part before a bracket'],
    ['CaSO4.0.5H2O', { Ca: 1, S: 1, O: 4.5, H: 1 }, 'a part that counts 0.5'],
    ['CaO.1.5SiO2.H2O', { Ca: 1, O: 5, Si: 1.5, H: 2 }, 'a part that counts 1.5'],
    ['2.5CaO.SiO2', { Ca: 2.5, O: 4.5, Si: 1 }, 'the first part counts 2.5'],
    ['Mg1.8Fe0.2SiO4', { Mg: 1.8, Fe: 0.2, Si: 1, O: 4 }, 'decimals after metals'],
    ['Mg2.5Ca0.5Al2Si3O12', { Mg: 2.5, Ca: 0.5, Al: 2, Si: 3, O: 12 }, 'decimals after metals'],
    ['Na(Cl2.5H2)', { Na: 1, Cl: 2.5, H: 2 }, 'decimal in brackets'],
    ['Al2SiO4(OH)1.1F0.9', { Al: 2, Si: 1, O: 5.1, H: 1.1, F: 0.9 }, 'decimals below 2'],
    ['CaSiO3.5', { Ca: 1, Si: 1, O: 3.5 }, 'decimal at the end'],
    ['CaSiO3.05H2', { Ca: 1, Si: 1, O: 3.05, H: 2 }, 'no part counts 05'],
    ['Fe1.05O1.05.2H2O', { Fe: 1.05, O: 3.05, H: 4 }, 'decimal, then a part'],
    ['FeO1.1.2H2O', { Fe: 1, O: 3.1, H: 4 }, 'decimal below 2, then a part'],
  ])('%s: %j (%s)', (formula, atoms) => {
    expect(parseFormula(formula)).toEqual(atoms);
  });

  it.each([
    ['', 'expected a formula, found a blank'],
    ['  ', 'expected a formula, found a blank'],
    ['Sb2O3', 'expected a known element, found "Sb" at character 1 of "Sb2O3"'],
    ['CaXO3', 'expected a known element, found "X" at character 3 of "CaXO3"'],
    ['SIO2', 'expected a known element, found "I" at character 2 of "SIO2"'],
    ['sio2', 'expected an element or an opening bracket, found "s" at character 1 of "sio2"'],
    ['Al(OH3', 'expected ")" for the "(" at character 3, found the end at character 7 of "Al(OH3"'],
    ['Al(OH]3', 'expected ")" for the "(" at character 3, found "]" at character 6 of "Al(OH]3"'],
    ['AlOH)3', 'expected an element, a bracket or a dot, found ")" at character 5 of "AlOH)3"'],
    ['Al()3', 'expected an element or an opening bracket, found ")" at character 4 of "Al()3"'],
    ['Si02', 'expected a count above 0 and at most 1000, found "02" at character 3 of "Si02"'],
    ['SiO0', 'expected a count above 0 and at most 1000, found "0" at character 4 of "SiO0"'],
    ['SiO2000', 'expected a count above 0 and at most 1000, found "2000" at character 4'],
    ['SiO2.', 'expected an element or an opening bracket, found the end at character 6 of "SiO2."'],
    ['SiO2..H2O', 'expected an element or an opening bracket, found "." at character 6'],
    ['.SiO2', 'expected an element or an opening bracket, found "." at character 1 of ".SiO2"'],
    ['10', 'expected an element or an opening bracket, found the end at character 3 of "10"'],
    ['(Mg,Fe)2SiO4', 'expected ")" for the "(" at character 1, found "," at character 4'],
    ['CaCO3 H2O', 'expected an element, a bracket or a dot, found " " at character 6'],
    ['CaSO4.1/2H2O', 'expected an element, a bracket or a dot, found "/" at character 8'],
    ['SiO2.5.2H2O', 'expected a · or * where the next part begins, found "." at character 5'],
    ['Ca🔥', 'expected an element, a bracket or a dot, found "🔥" at character 3 of "Ca🔥"'],
  ])('refuses "%s" and says where', (formula, message) => {
    expect(() => parseFormula(formula)).toThrow(CompositionError);
    expect(() => parseFormula(formula)).toThrow(message);
  });

  it('refuses a page of text and ten thousand brackets alike', () => {
    const brackets = '('.repeat(10_000);
    expect(() => parseFormula(brackets)).toThrow('at most 200 characters, found 10000 characters');
    expect(() => parseFormula('('.repeat(200))).toThrow(CompositionError);
  });

  it('reads any run of oxides joined by dots, with counts before them', () => {
    const part = fc.tuple(fc.integer({ min: 1, max: 40 }), fc.constantFrom(...OXIDES));
    fc.assert(
      fc.property(fc.array(part, { minLength: 1, maxLength: 8 }), (parts) => {
        const formula = parts.map(([n, oxide]) => (n === 1 ? oxide : `${n}${oxide}`)).join('.');
        const moles = mineralMoles(formula);
        for (const oxide of OXIDES) {
          const count = parts.reduce((sum, [n, o]) => sum + (o === oxide ? n : 0), 0);
          expect(moles[oxide] ?? 0).toBe(count);
        }
        expect(lossOnIgnitionPercent(formula)).toBe(0);
      }),
    );
  });

  it('a bracket counts like its contents written out', () => {
    const elements = Object.keys(ATOMIC_WEIGHT) as Element[];
    const atom = fc.tuple(fc.constantFrom(...elements), fc.integer({ min: 2, max: 9 }));
    fc.assert(
      fc.property(
        fc.array(atom, { minLength: 1, maxLength: 6 }),
        fc.integer({ min: 2, max: 9 }),
        (run, n) => {
          const inside = run.map(([element, count]) => `${element}${count}`).join('');
          const writtenOut = run.map(([element, count]) => `${element}${count * n}`).join('');
          expect(parseFormula(`[(${inside})]${n}`)).toEqual(parseFormula(writtenOut));
        },
      ),
    );
  });

  it('refuses any other text with a CompositionError, and nothing with another', () => {
    const scraps = fc.constantFrom(...'SiOAlCaH()[]{}.·*0123456789 ,x'.split(''));
    const text = fc.oneof(fc.string(), fc.string({ unit: scraps, maxLength: 30 }));
    fc.assert(
      fc.property(text, (formula) => {
        try {
          expect(formulaMassGPerMol(formula)).toBeGreaterThan(0);
        } catch (error) {
          expect(error).toBeInstanceOf(CompositionError);
        }
      }),
      { numRuns: 1000 },
    );
  });
});

describe('mineralMoles', () => {
  it.each([
    ['KAlSi3O8', { K2O: 0.5, Al2O3: 0.5, SiO2: 3 }],
    ['FeO', { Fe2O3: 0.5 }],
    ['Fe3O4', { Fe2O3: 1.5 }],
    ['MnO2', { MnO: 1 }],
    ['CuCO3.Cu(OH)2', { CuO: 2 }],
    ['Co3O4', { CoO: 3 }],
    ['CaF2', { CaO: 1 }],
    ['Ca3(PO4)2', { CaO: 3, P2O5: 1 }],
    ['V2O5.Cr2O3', { Cr2O3: 1, V2O5: 1 }],
    ['Na2SO4.NH4Cl', { Na2O: 1 }],
  ])('%s leaves %j', (formula, moles) => {
    expect(mineralMoles(formula)).toEqual(moles);
  });

  it.each(['COO', 'H2O', 'C', 'NH4Cl', 'C6H10O5'])(
    'refuses %s, which leaves nothing',
    (formula) => {
      expect(() => mineralMoles(formula)).toThrow(CompositionError);
      expect(() => mineralMoles(formula)).toThrow(
        `expected an oxide to stay after firing, found none in "${formula}"`,
      );
    },
  );
});

describe('lossOnIgnitionPercent', () => {
  it('is the mass of the formula less that of its oxides', () => {
    // CaF2: two F leave, one O comes.
    const { Ca, F, O } = ATOMIC_WEIGHT;
    const loss = (100 * (2 * F - O)) / (Ca + 2 * F);
    expect(lossOnIgnitionPercent('CaF2')).toBeCloseTo(loss, 12);
  });

  it('is below 0 where firing adds oxygen', () => {
    const { Fe, O } = ATOMIC_WEIGHT;
    expect(lossOnIgnitionPercent('FeO')).toBeCloseTo((-100 * O) / 2 / (Fe + O), 12);
  });

  it('is 100 for water', () => {
    expect(lossOnIgnitionPercent('H2O')).toBeCloseTo(100, 12);
  });
});
