import { describe, expect, it } from 'vitest';
import { readGlaze } from '../../src/archive/glaze-text.ts';
import { CompositionError } from '../../src/errors.ts';

const faultsOf = (text: string): string[] => {
  try {
    readGlaze(text);
  } catch (error) {
    if (!(error instanceof CompositionError)) throw error;
    return error.message
      .split('\n')
      .slice(1)
      .map((line) => line.trim());
  }
  return [];
};

describe('a composition written as text', () => {
  it.each([
    'SiO2=7 Al2O3=0.8 CaO=2',
    'SiO2:7,Al2O3:.8,CaO:2',
    'SiO2 = 7; Al2O3= 8e-1; CaO =2.',
    ' SiO2=7, Al2O3=0.8, CaO=2, ',
  ])('is read in all its spellings: %s', (text) => {
    expect(readGlaze(text)).toEqual({ unity: { SiO2: 3.5, Al2O3: 0.4, CaO: 1 }, notes: [] });
  });

  it('in small letters is told how to write the oxide, without noise about what is there', () => {
    expect(faultsOf('sio2=3 al2o3=0.4 cao=1')).toEqual([
      'expected SiO2 in these capitals, got "sio2"',
      'expected Al2O3 in these capitals, got "al2o3"',
      'expected CaO in these capitals, got "cao"',
    ]);
  });

  it('with a decimal comma is told that a point is expected', () => {
    expect(faultsOf('SiO2=3,4 Al2O3=0,42 CaO=1')).toEqual([
      'expected moles of SiO2: a number with a decimal point such as 3.4, got "3,4"',
      'expected moles of Al2O3: a number with a decimal point such as 0.42, got "0,42"',
    ]);
  });

  it('is not said to lack what a wrong name may stand for', () => {
    expect(faultsOf('Si02=3 Al203=0.4 CaO=1')).toEqual([
      'expected an oxide, got "Si02"; nearest known: "SiO2"',
      'expected an oxide, got "Al203"; nearest known: "Al2O3"',
    ]);
    expect(faultsOf('foo=3')).toHaveLength(1);
  });

  it('tells all its faults at once, also what is lacking beside a wrong name that is clear', () => {
    expect(faultsOf('sio2=3 CaO=x CaO=1 K2O=-1 5')).toEqual([
      'expected SiO2 in these capitals, got "sio2"',
      'expected moles of CaO: a number such as 0.42, got "x"',
      'expected moles of K2O from 0 to 1000000, got "-1"',
      'expected OXIDE=MOLES, got "5"',
      'expected CaO once, got it again ("CaO=1")',
    ]);
    expect(faultsOf('sio2=3 CaO=1')).toEqual([
      'expected SiO2 in these capitals, got "sio2"',
      'expected Al2O3=..., found none',
    ]);
  });

  it.each([
    ['SiO2=0 Al2O3=0.4 CaO=1', 'expected SiO2 above 0, got 0'],
    ['SiO2=3 Al2O3=0.4 CaO=0', 'expected a flux above 0, got 0'],
    ['SiO2=3000 Al2O3=0.4 CaO=1', 'SiO2: expected at most 1000 per mole of flux, found 3.00e+3'],
    [
      'SiO2=3 Al2O3=0.4',
      'expected a flux, found none of Li2O, Na2O, K2O, MgO, CaO, SrO, BaO, ZnO, PbO, MnO',
    ],
  ])('%s: %s', (text, fault) => {
    expect(faultsOf(text)).toEqual([fault]);
  });

  it('is noted where it may be weight per cent, or is no glaze', () => {
    const weights = readGlaze('SiO2=64 Al2O3=13.4 B2O3=3.3 K2O=3 Na2O=2.9 CaO=13.4', 'mine').notes;
    expect(weights).toHaveLength(1);
    expect(weights[0]).toMatch(
      /^oxides sum to about 100, as weight per cent and mole per cent do\. "mine" is read as moles: SiO2 3\.32, .*weight per cent it would be SiO2 3\.3/,
    );
    expect(readGlaze('SiO2=340 Al2O3=0.4 CaO=1').notes.join()).toContain('"glaze" (SiO2 340)');
  });
});
