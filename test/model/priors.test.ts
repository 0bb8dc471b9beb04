import { describe, expect, it } from 'vitest';
import { columnValues, heatSlopes, scaledInputs, type Inputs } from '../../src/model/inputs.ts';
import {
  GLOSS_PRIOR,
  LOAD_PRIOR,
  MELT_PRIOR,
  priorColumns,
  WRONG_VERDICTS,
  type StagePrior,
} from '../../src/model/priors.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { drawnUnity } from '../support/invented-tiles.ts';

// The priors as they were chosen, typed here a second time: column, prior mean, sd of its group. A change
// of one must be meant.
const MELT = `
  1 3 2, SiO2 -2 1, Al2O3 -0.5 1, B2O3 1.5 0.7, KNaO 0.7 0.7, MgO -0.3 0.7, ZnO 0 0.7, heat 1.7 0.6,
  SiO2^2 -0.5 0.4, Al2O3^2 -0.8 0.4, SiO2*Al2O3 0.5 0.4, ratio 0 0.4, ratio^2 0 0.4,
  SiO2*B2O3 0 0.25, Al2O3*B2O3 0 0.25, SiO2*heat 0 0.25, Al2O3*heat 0 0.25, B2O3*heat 0 0.25,
  SiO2*KNaO 0 0.25, Al2O3*KNaO 0 0.25, B2O3^2 0 0.25, heat^2 0 0.25, KNaO*heat 0 0.25`;
const GLOSS = `
  1 2 2, ratio 4 1.5, SiO2 0 0.6, Al2O3 0 0.6, B2O3 0.5 0.6, KNaO 0 0.6, MgO -0.5 0.6, ZnO 0 0.6,
  heat 0.4 0.42, ratio^2 0 0.3, SiO2^2 0 0.3, Al2O3^2 0 0.3, SiO2*Al2O3 0 0.3, ratio*B2O3 0 0.3,
  ratio*heat 0 0.3, B2O3*heat 0 0.3, heat^2 0 0.3, B2O3^2 0 0.3, ratio*KNaO 0 0.3, ratio*MgO 0 0.3`;
const RESIDUAL = { melt: 0.8, gloss: 0.6 };

const asStated = (table: string) =>
  table.split(',').map((entry) => {
    const [column, mean, sd] = entry.trim().split(' ');
    return [column, Number(mean), Number(sd)];
  });
const asBuilt = ({ groups }: StagePrior) =>
  groups.flatMap(({ means, startSd }) =>
    Object.entries(means).map(([column, mean]) => [column, mean, startSd]),
  );

describe('priors', () => {
  it.each([
    ['melt', MELT_PRIOR, MELT, RESIDUAL.melt],
    ['gloss', GLOSS_PRIOR, GLOSS, RESIDUAL.gloss],
  ])('of %s are those that were chosen, column by column', (_, prior, table, residual) => {
    expect(asBuilt(prior)).toEqual(asStated(table));
    expect(prior.startResidualSd).toBe(residual);
  });

  it('of loads and wrong verdicts are those that were chosen', () => {
    expect(LOAD_PRIOR).toEqual({ startOffsetCones: 0.2, degreesOfFreedom: 5, startGlossSd: 0.3 });
    expect(WRONG_VERDICTS).toEqual({ startShare: 0.015, pseudoTiles: 100 });
  });

  it('put columns of unlike sd in groups of their own', () => {
    expect(MELT_PRIOR.groups.map((group) => Object.keys(group.means).length)).toEqual([
      1, 2, 4, 1, 5, 10,
    ]);
    expect(GLOSS_PRIOR.groups.map((group) => Object.keys(group.means).length)).toEqual([
      1, 1, 6, 1, 11,
    ]);
  });

  it('are 23 columns of melting and 20 of gloss, each made of known inputs', () => {
    expect(priorColumns(MELT_PRIOR)).toHaveLength(23);
    expect(priorColumns(GLOSS_PRIOR)).toHaveLength(20);
    expect(new Set(priorColumns(MELT_PRIOR)).size).toBe(23);
    expect(new Set(priorColumns(GLOSS_PRIOR)).size).toBe(20);
    const inputs = scaledInputs(drawnUnity(seededGenerator(100)), 5.5);
    for (const prior of [MELT_PRIOR, GLOSS_PRIOR]) {
      expect(columnValues(inputs, priorColumns(prior)).every(Number.isFinite)).toBe(true);
    }
    expect(() => columnValues(inputs, ['constructor'])).toThrow(
      'column constructor names no input',
    );
  });
});

describe('inputs', () => {
  const above = { SiO2: 4.2, Al2O3: 0.59, B2O3: 0.33, Na2O: 0.4, MgO: 0.14, ZnO: 0.09, CaO: 0.37 };

  it('are 0 at the centre and 1 a scale above it', () => {
    const [K2O, CaO] = [0.3, 0.61];
    const centre = { SiO2: 3.2, Al2O3: 0.42, B2O3: 0.18, K2O, MgO: 0.06, ZnO: 0.03, CaO };
    const { ratio, ...others } = scaledInputs(centre, 6);
    for (const value of Object.values(others)) expect(value).toBeCloseTo(0, 12);
    expect(ratio).toBeCloseTo(Math.log(3.2 / 0.42 / 7) / 0.4, 12);
    const { ratio: unused, ...scaled } = scaledInputs(above, 7);
    for (const value of Object.values(scaled)) expect(value).toBeCloseTo(1, 12);
    expect(unused).toBeCloseTo(Math.log(4.2 / 0.59 / 7) / 0.4, 12);
  });

  it('count lithia as alkali and keep the ratio finite without alumina', () => {
    expect(scaledInputs({ Li2O: 0.3, CaO: 0.7, SiO2: 3 }, 6).KNaO).toBeCloseTo(0, 12);
    const bare = scaledInputs({ CaO: 1, SiO2: 3 }, 6).ratio;
    expect(bare).toBeCloseTo(Math.log(3 / 0.02 / 7) / 0.4, 12);
  });
});

describe('columns', () => {
  const columns = ['1', 'SiO2', 'SiO2^2', 'SiO2*B2O3', 'heat', 'heat^2', 'SiO2*heat', 'ratio*heat'];
  const unity = drawnUnity(seededGenerator(101));
  const at = (cone: number) => columnValues(scaledInputs(unity, cone), columns);

  it('are the products that their names say, heat itself by the cone', () => {
    const { SiO2, B2O3 }: Inputs = scaledInputs(unity, 8.5);
    expect(at(8.5).slice(0, 5)).toEqual([1, SiO2, SiO2 * SiO2, SiO2 * B2O3, 2.5]);
  });

  it('with heat in a product level off: as good as the cone near the centre, bounded far off', () => {
    const scaled = scaledInputs(unity, 6);
    const heatIn = (cone: number) => at(cone)[6] / scaled.SiO2;
    expect(heatIn(6)).toBe(0);
    expect(Math.abs(heatIn(6.5) - 0.5)).toBeLessThan(0.02);
    expect(heatIn(4)).toBeCloseTo(-heatIn(8), 12);
    expect(at(9)[5]).toBeCloseTo(heatIn(9) ** 2, 12);
    expect(at(9)[7]).toBeCloseTo(scaled.ratio * heatIn(9), 12);
    const path = Array.from({ length: 60 }, (_, i) => heatIn(-5 + i / 2));
    for (let i = 1; i < path.length; i++) expect(path[i]).toBeGreaterThan(path[i - 1]);
    // Nothing that bends the answer is left to grow between cones 14 and 30.
    expect(heatIn(30) / heatIn(14)).toBeLessThan(1.1);
  });

  it('grow with heat at the slope that is stated', () => {
    const h = 1e-4;
    for (const cone of [-2, 4.5, 6, 6.3, 9]) {
      const slopes = heatSlopes(scaledInputs(unity, cone), columns);
      const [before, after] = [at(cone - h), at(cone + h)];
      slopes.forEach((slope, j) => {
        expect(Math.abs(slope - (after[j] - before[j]) / (2 * h))).toBeLessThan(1e-7);
      });
    }
  });
});
