import { describe, expect, it } from 'vitest';
import { evidenceFit, heldFit, startingSds } from '../../src/model/evidence.ts';
import { logisticPosterior } from '../../src/model/logistic.ts';
import { GLOSS_PRIOR, MELT_PRIOR, priorColumns, type StagePrior } from '../../src/model/priors.ts';
import { fitStages, isJudged, STAGE_PRIOR } from '../../src/model/stages.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

// The priors as the design states them, typed here a second time: column, prior mean, sd of its group.
const MELT = `
  1 1.5 2, SiO2 -2 1.2, Al2O3 -2 1.2, B2O3 1 0.9, KNaO 0.5 0.9, MgO 0 0.9, ZnO 0 0.9, heat 1.5 0.6,
  SiO2^2 -0.5 0.6, Al2O3^2 -0.5 0.6, SiO2*Al2O3 0 0.6, ratio 0 0.6, ratio^2 0 0.6,
  SiO2*B2O3 0 0.3, Al2O3*B2O3 0 0.3, SiO2*heat 0 0.3, Al2O3*heat 0 0.3, B2O3*heat 0 0.3,
  SiO2*KNaO 0 0.3, Al2O3*KNaO 0 0.3, B2O3^2 0 0.3, heat^2 0 0.3, KNaO*heat 0 0.3`;
const GLOSS = `
  1 1 2, ratio 4 1.5, SiO2 0 0.6, Al2O3 0 0.6, B2O3 0.5 0.6, KNaO 0 0.6, MgO -0.5 0.6, ZnO 0 0.6,
  heat 0.4 0.42, ratio^2 0 0.3, SiO2^2 0 0.3, Al2O3^2 0 0.3, SiO2*Al2O3 0 0.3, ratio*B2O3 0 0.3,
  ratio*heat 0 0.3, B2O3*heat 0 0.3, heat^2 0 0.3, B2O3^2 0 0.3, ratio*KNaO 0 0.3, ratio*MgO 0 0.3`;

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
    ['melt', MELT_PRIOR, MELT],
    ['gloss', GLOSS_PRIOR, GLOSS],
  ])('of %s are those of the design, column by column', (_, prior, table) => {
    expect(asBuilt(prior)).toEqual(asStated(table));
    expect(prior.startLoadSd).toBe(0.5);
  });

  it('put columns of unlike sd in groups of their own', () => {
    expect(MELT_PRIOR.groups.map((group) => Object.keys(group.means).length)).toEqual([
      1, 2, 4, 1, 5, 10,
    ]);
    expect(GLOSS_PRIOR.groups.map((group) => Object.keys(group.means).length)).toEqual([
      1, 1, 6, 1, 11,
    ]);
  });
});

describe.each(['melt', 'gloss'] as const)('the re-estimated sds of %s', (name) => {
  const prior = STAGE_PRIOR[name];
  const start = startingSds(prior);

  it('are the starting ones without tiles, to the last bit, and the posterior is the prior', () => {
    const none = { rows: [], outcome: [], load: [] };
    const { sds, posterior, rounds } = evidenceFit(none, prior);
    expect(sds).toEqual(start);
    expect(rounds).toBe(1);
    expect(posterior.mean).toEqual(asBuilt(prior).map(([, mean]) => mean));
    expect(posterior.logEvidence).toBeCloseTo(0, 12);
  });

  it('of the loads end at their fixed point', () => {
    const { fit } = fitStages(inventedTiles({ tiles: 160, seed: 6 }).filter(isJudged))[name];
    const { loadMean, loadVariance } = fit.posterior;
    const squares = loadMean.reduce((sum, mean) => sum + mean ** 2, 4 * start.load ** 2);
    const determined = loadVariance.reduce((sum, v) => sum + 1 - v / fit.sds.load ** 2, 4);
    expect(fit.sds.load / Math.sqrt(squares / determined)).toBeCloseTo(1, 5);
    expect(determined).toBeLessThanOrEqual(4 + loadMean.length);
  });

  it('grow for loads that disagree and shrink for loads that agree', () => {
    const sdOf = (errors: readonly number[]) => {
      const tiles = inventedTiles({ tiles: 600, seed: 7, loadErrors: errors, cones: ['6'] });
      return fitStages(tiles.filter(isJudged)).melt.fit.sds.load;
    };
    const agreeing = sdOf(Array.from({ length: 20 }, () => 0));
    const apart = sdOf(Array.from({ length: 20 }, (_, l) => (l % 2 ? 1 : -1)));
    expect(agreeing).toBeLessThan(0.5);
    expect(apart).toBeGreaterThan(0.8);
  });

  it('move with the tiles, each never below what four observations of its start leave', () => {
    const { fit } = fitStages(inventedTiles({ tiles: 900, seed: 9 }).filter(isJudged))[name];
    fit.sds.groups.forEach((sd, g) => {
      const { startSd, means } = prior.groups[g];
      // No departures at all, every weight determined: 4 start^2 / (4 + columns).
      const least = startSd * Math.sqrt(4 / (4 + Object.keys(means).length));
      expect(sd).toBeGreaterThan(least * 0.999);
      expect(sd).not.toBe(startSd);
    });
  });

  it('are kept by a held fit, which is the plain posterior at those sds', () => {
    const { data } = fitStages(inventedTiles({ tiles: 60, seed: 8 }).filter(isJudged))[name];
    const held = { groups: start.groups.map((sd) => sd * 0.7), load: 0.3 };
    const { sds, rounds, posterior } = heldFit(data, prior, held);
    const sd = prior.groups.flatMap(({ means }, g) => Object.keys(means).map(() => held.groups[g]));
    const mean = asBuilt(prior).map(([, value]) => Number(value));
    const plain = logisticPosterior(data, { mean, sd, loadSd: 0.3 });
    expect([sds, rounds]).toEqual([held, 0]);
    expect(posterior).toEqual(plain);
    expect(posterior.mean).toHaveLength(priorColumns(prior).length);
  });
});
