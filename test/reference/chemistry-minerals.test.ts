import { describe, expect, it } from 'vitest';
import { ATOMIC_WEIGHT } from '../../src/chemistry/atomic-weights.ts';
import {
  formulaMassGPerMol,
  lossOnIgnitionPercent,
  mineralMoles,
} from '../../src/chemistry/formula.ts';
import { molesPer100gRaw } from '../../src/chemistry/material.ts';
import { isOxide, MOLAR_MASS, OXIDES } from '../../src/chemistry/oxides.ts';
import { publishedTable } from './chemistry-tables.ts';

// Source: CIAAW, Standard Atomic Weights 2021 (verified up to Z = 53; Ba and Ce verified in an older
// IUPAC table, Pb from memory; status word by row in datasets/published/atomic-weights.csv).
describe('atomic weights against the standard ones of 2021', () => {
  const rows = publishedTable('atomic-weights.csv');
  const standard = new Map(rows.map((row) => [row['symbol'], row['standard_2021']]));

  it.each(Object.entries(ATOMIC_WEIGHT))('%s %f', (symbol, abridged) => {
    const written = standard.get(symbol) ?? '';
    // '[low, high]', or a value with its uncertainty: '22.98976928(2)'.
    const bounds = written.match(/\d+\.\d+/g)?.map(Number) ?? [];
    const [weight = Number.NaN] = bounds;
    // Abridged to five figures: half a unit of the fifth, beyond the interval where there is one.
    const halfUnit = 0.5 * 10 ** (Math.floor(Math.log10(weight)) - 4) + 1e-9;
    expect(abridged).toBeGreaterThanOrEqual(weight - halfUnit);
    expect(abridged).toBeLessThanOrEqual(Math.max(...bounds) + halfUnit);
  });

  it('uses the abridged value of the table for every element', () => {
    const abridged = Object.fromEntries(rows.map((r) => [r['symbol'], Number(r['abridged_used'])]));
    expect(abridged).toMatchObject(ATOMIC_WEIGHT);
  });
});

// Source: datasets/published/oxide-molar-masses.csv (computed here from the abridged weights).
describe('molar masses against the table, to its last printed digit', () => {
  const rows = publishedTable('oxide-molar-masses.csv').map(
    (row) => [row['oxide'], Number(row['molar_mass_g_per_mol'])] as const,
  );

  it('the table holds every oxide that a composition may hold', () => {
    expect(rows.map(([oxide]) => oxide)).toEqual(expect.arrayContaining([...OXIDES]));
  });

  it.each(rows.filter(([oxide]) => isOxide(oxide)))('%s %f', (oxide, massGPerMol) => {
    expect(isOxide(oxide) ? MOLAR_MASS[oxide] : Number.NaN).toBeCloseTo(massGPerMol, 4);
  });

  // Antimony and bismuth are in the table and not among our oxides.
  const known = rows.filter(([oxide]) => !/^(Sb|Bi)/.test(oxide));
  it.each(known)('%s %f, read as a formula', (oxide, massGPerMol) => {
    expect(formulaMassGPerMol(oxide)).toBeCloseTo(massGPerMol, 4);
  });
});

// Source: datasets/published/mineral-materials.csv, 37 theoretical minerals (computed here from the
// oxide formula, apart from this program). Printed to 0.001 wt%.
describe('minerals against the table, to its last printed digit', () => {
  const rows = publishedTable('mineral-materials.csv');
  const cases = rows.flatMap((row) =>
    ['formula', 'oxide_formula'].map((column) => ({ mineral: row['mineral'], column, row })),
  );

  it('the table holds 37 minerals', () => {
    expect(rows).toHaveLength(37);
  });

  it.each(cases)('$mineral by $column', ({ column, row }) => {
    const formula = row[column];
    const massGPerMol = formulaMassGPerMol(formula);
    const moles = mineralMoles(formula);
    const raw = molesPer100gRaw({ formula, loiPercent: 0 });
    for (const oxide of OXIDES) {
      const printed = Number(row[`${oxide}_wt_pct`] ?? 0);
      const percent = (100 * (moles[oxide] ?? 0) * MOLAR_MASS[oxide]) / massGPerMol;
      expect(percent, oxide).toBeCloseTo(printed, 3);
      expect((raw.moles[oxide] ?? 0) * MOLAR_MASS[oxide], oxide).toBeCloseTo(printed, 3);
    }
    expect(lossOnIgnitionPercent(formula)).toBeCloseTo(Number(row['LOI_wt_pct']), 3);
    expect(raw.loiPercent).toBeCloseTo(Number(row['LOI_wt_pct']), 3);
  });

  it.each(rows)('$mineral: mass of the oxide formula', (row) => {
    const printed = Number(row['formula_mass_of_oxide_formula']);
    expect(formulaMassGPerMol(row['oxide_formula'])).toBeCloseTo(printed, 3);
  });

  it.each(rows)(
    '$mineral: the printed analysis, raw, gives the same moles as the formula',
    (row) => {
      const analysis = Object.fromEntries(OXIDES.map((o) => [o, Number(row[`${o}_wt_pct`] ?? 0)]));
      const loiPercent = Number(row['LOI_wt_pct']);
      const byAnalysis = molesPer100gRaw({ analysis, basis: 'raw', loiPercent }).moles;
      const byFormula = molesPer100gRaw({ formula: row['formula'], loiPercent: 0 }).moles;
      for (const oxide of OXIDES) {
        // Half of the last printed digit of the wt%, over the molar mass.
        const off = Math.abs((byAnalysis[oxide] ?? 0) - (byFormula[oxide] ?? 0));
        expect(off * MOLAR_MASS[oxide], oxide).toBeLessThanOrEqual(0.00051);
      }
    },
  );
});
