import { describe, expect, it } from 'vitest';
import { GENERAL_CAUTIONS, hazardNotes } from '../../src/chemistry/hazards.ts';
import { OXIDES } from '../../src/chemistry/oxides.ts';

const HAZARDS = {
  PbO: 'lead',
  BaO: 'barium',
  CuO: 'copper',
  MnO: 'manganese',
  Cr2O3: 'chromium',
  CoO: 'cobalt',
  NiO: 'nickel',
  V2O5: 'vanadium',
  Li2O: 'lithium',
} as const;

describe('hazardNotes', () => {
  it.each(Object.entries(HAZARDS))('a trace of %s is named as %s', (oxide, metal) => {
    const [named, test] = hazardNotes({ CaO: 1, SiO2: 3, [oxide]: 1e-6 });
    expect(named).toBe(`Holds ${metal}.`);
    expect(test).toBe(
      'Before use with food or drink, a licensed laboratory must leach-test the ware.',
    );
  });

  it.each(OXIDES.filter((oxide) => !(oxide in HAZARDS)))('says nothing of %s', (oxide) => {
    expect(hazardNotes({ CaO: 1, [oxide]: 1 })).toEqual([]);
  });

  it('says nothing of a metal of which there is none', () => {
    expect(hazardNotes({ CaO: 1, PbO: 0 })).toEqual([]);
  });

  it('joins several metals', () => {
    expect(hazardNotes({ Li2O: 0.1, CaO: 0.9, CoO: 0.02, BaO: 0.1 })[0]).toBe(
      'Holds barium, cobalt and lithium.',
    );
  });

  it('names all nine by name, however long the sentence', () => {
    const all = Object.fromEntries(Object.keys(HAZARDS).map((oxide) => [oxide, 0.1]));
    expect(hazardNotes(all)[0]).toBe(
      'Holds lead, barium, copper, manganese, chromium, cobalt, nickel, vanadium and lithium.',
    );
  });
});

it('the general cautions name the test tile, food and metals, the kiln and dust', () => {
  const text = GENERAL_CAUTIONS.join(' ');
  for (const word of ['test tile', 'food-safe', 'metals', 'kiln maker', 'Dust', 'local rules']) {
    expect(text.toLowerCase()).toContain(word.toLowerCase());
  }
});
