// What the model says of published glazes before it has seen a single tile. Sources: H. Seger 1886
// (Dingler's Polytechnisches Journal 261, pp. 38-42; status: verified) and C. F. Binns, The Potter's
// Craft, 2nd ed. 1922 (verified); rows of datasets/published/. What has no source says so.
import { describe, expect, it } from 'vitest';
import type { Unity } from '../../src/chemistry/unity.ts';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { predict } from '../../src/predict/predict.ts';
import { anArchive } from '../support/builders.ts';
import { publishedTable } from './chemistry-tables.ts';

const model = fitUnvalidated(anArchive());
const answer = (unity: Unity, coneIndex: number) =>
  predict(model, [{ point: 'P', unity }], [coneIndex]).predictions[0];
const surface = (unity: Unity, coneIndex: number) => answer(unity, coneIndex).surface;

describe('no tiles at all', () => {
  const cones = publishedTable('seger-cones.csv').filter(({ cone }) =>
    ['4', '5', '6', '7', '8', '9', '10'].includes(cone),
  );

  it('has read seven standard cones', () => {
    expect(cones).toHaveLength(7);
  });

  // A cone only softens at its own heat work (Seger 1886).
  it.each(cones.map((row) => [row['cone'], row] as const))(
    'calls standard cone %s underfired at its own cone',
    (cone, row) => {
      const unity = Object.fromEntries(
        (['K2O', 'CaO', 'Al2O3', 'SiO2'] as const).map((oxide) => [oxide, Number(row[oxide])]),
      );
      expect(surface(unity, Number(cone))).toBe('underfired');
    },
  );

  const feldspathic = { K2O: 0.3, CaO: 0.7, Al2O3: 0.5, SiO2: 4 };

  it('calls K2O 0.3 CaO 0.7 Al2O3 0.5 SiO2 4 underfired at 4 and gloss at 9 (Seger, Binns)', () => {
    expect(surface(feldspathic, 4)).toBe('underfired');
    expect(surface(feldspathic, 9)).toBe('gloss');
  });

  it('calls the same fluxes with Al2O3 0.7 SiO2 2.6 matte at 9 (Binns)', () => {
    expect(surface({ ...feldspathic, Al2O3: 0.7, SiO2: 2.6 }, 9)).toBe('matte');
  });

  it('calls K2O 0.25 CaO 0.75 Al2O3 0.55 SiO2 2.1 matte at 7 (Binns)', () => {
    expect(surface({ K2O: 0.25, CaO: 0.75, Al2O3: 0.55, SiO2: 2.1 }, 7)).toBe('matte');
  });
});

describe('no tiles at all: common practice, no source', () => {
  const studio = { K2O: 0.12, Na2O: 0.18, CaO: 0.65, MgO: 0.05, B2O3: 0.17 };
  const grid = [2, 2.5, 3, 3.5, 4, 4.5].flatMap((SiO2) =>
    [0.25, 0.35, 0.45, 0.55, 0.65].map((Al2O3) => ({ ...studio, SiO2, Al2O3 })),
  );

  it('lets the melted region grow with the cone', () => {
    const melted = [4, 5, 6, 7, 8].map(
      (cone) => grid.filter((unity) => answer(unity, cone).probability.underfired < 0.5).length,
    );
    for (let i = 1; i < melted.length; i++) expect(melted[i]).toBeGreaterThan(melted[i - 1]);
  });

  it('calls SiO2:Al2O3 near 5 and below matte rather than gloss', () => {
    for (const ratio of [3.5, 4, 4.5, 5]) {
      const { matte, gloss } = answer({ ...studio, Al2O3: 0.5, SiO2: 0.5 * ratio }, 6).probability;
      expect(matte).toBeGreaterThan(gloss);
    }
  });

  it('ends underfired with too much alumina and with too much silica', () => {
    expect(surface({ ...studio, SiO2: 3, Al2O3: 1.1 }, 6)).toBe('underfired');
    expect(surface({ ...studio, SiO2: 7, Al2O3: 0.5 }, 6)).toBe('underfired');
  });

  it('says that it has seen no tile, and is unsure', () => {
    const {
      notes,
      support,
      interval90,
      surface: likeliest,
    } = answer({ ...studio, SiO2: 3.3, Al2O3: 0.4 }, 6);
    expect(support).toBe('outside');
    expect(notes.join('\n')).toContain('no judged tile at all');
    expect(interval90[likeliest][1] - interval90[likeliest][0]).toBeGreaterThan(0.5);
  });
});
