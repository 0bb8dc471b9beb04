import { describe, expect, it } from 'vitest';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { quantile } from '../../src/numeric/summary.ts';
import { DRAWS, normalTable, pathDraws } from '../../src/predict/path-draws.ts';
import { anArchive } from '../support/builders.ts';
import { denseLogOdds, type Asked } from '../support/dense-draws.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const unity = { SiO2: 3.4, Al2O3: 0.46, B2O3: 0.15, Na2O: 0.15, K2O: 0.15, MgO: 0.04, CaO: 0.66 };
const seen = fitUnvalidated(anArchive(inventedTiles({ tiles: 160, seed: 51 })));
const unseen = fitUnvalidated(anArchive());

const overHeat: Asked[] = Array.from({ length: 81 }, (_, i) => ({ unity, coneIndex: 4 + i / 20 }));
/** A line of compositions at three heats, as boundaries are drawn; its ends are outside the archive. */
const overAlumina: Asked[] = [5.5, 6, 6.5].flatMap((coneIndex) =>
  Array.from({ length: 41 }, (_, i) => ({
    unity: { ...unity, Al2O3: 0.1 + i / 50 },
    coneIndex,
  })),
);
const cases = (['melt', 'gloss'] as const).flatMap((stage) =>
  [
    { what: 'heat', path: overHeat },
    { what: 'alumina and heat', path: overAlumina },
    { what: 'a single point', path: overHeat.slice(40, 41) },
    { what: 'one point twice', path: [overHeat[7], overHeat[7], overHeat[30]] },
  ].flatMap(({ what, path }) => [
    { stage, what, path, with: '160 tiles', model: seen },
    { stage, what, path, with: 'no tile', model: unseen },
  ]),
);

describe.each(cases)('draws of $stage over $what, $with', ({ stage, path, model }) => {
  const fitted = model[stage];
  const { mean, covariance } = denseLogOdds(fitted, path);

  it('have the covariance of the dense formula between all points', () => {
    // A table of unit vectors: draw k is then the mean and the k-th factor.
    const directions = normalTable(stage).length;
    const units = Array.from({ length: directions }, (_, k) =>
      Float64Array.from({ length: directions }, (__, draw) => Number(draw === k)),
    );
    const draws = pathDraws(fitted, path, units);
    const factors = units.map((_, k) => [...draws.logOdds(k)].map((value, i) => value - mean[i]));
    const most = Math.max(...covariance.diag());
    let worst = 0;
    path.forEach((_, i) => {
      path.forEach((__, j) => {
        const shared = factors.reduce((sum, factor) => sum + factor[i] * factor[j], 0);
        worst = Math.max(worst, Math.abs(shared - covariance.get(i, j)));
      });
    });
    // What may be left out is a ten-millionth of the largest variance.
    expect(worst).toBeLessThan(2e-7 * most);
  });

  it('have the mean and the 90 % interval that a single point has', () => {
    const draws = pathDraws(fitted, path, normalTable(stage));
    expect(draws.count).toBe(DRAWS);
    const all = Array.from({ length: DRAWS }, (_, draw) => draws.logOdds(draw));
    path.forEach((point, i) => {
      if (i % 10 !== 0 && i !== path.length - 1) return;
      const alone = stageLogOdds(fitted, point.unity, point.coneIndex);
      const values = all.map((drawn) => drawn[i]);
      const average = values.reduce((sum, value) => sum + value, 0) / DRAWS;
      expect(Math.abs(average - alone.mean)).toBeLessThan((4 * alone.sd) / Math.sqrt(DRAWS));
      // A 5 % quantile of 2,000 draws has a standard error of 0.047 sd.
      for (const [p, z] of [
        [0.05, -1.6449],
        [0.5, 0],
        [0.95, 1.6449],
      ]) {
        const exact = alone.mean + z * alone.sd;
        expect(Math.abs(quantile(values, p) - exact)).toBeLessThan(4 * 0.047 * alone.sd);
      }
    });
  });
});

describe('the normal numbers', () => {
  it('are the same every time, those of the stages unlike', () => {
    expect(normalTable('melt')).toEqual(normalTable('melt'));
    const [melt, gloss] = [normalTable('melt'), normalTable('gloss')];
    let shared = 0;
    for (let draw = 0; draw < DRAWS; draw++) shared += (melt[0][draw] * gloss[0][draw]) / DRAWS;
    expect(Math.abs(shared)).toBeLessThan(4 / Math.sqrt(DRAWS));
  });
});
