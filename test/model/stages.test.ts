import { describe, expect, it } from 'vitest';
import type { Tile } from '../../src/archive/archive.ts';
import { parseArchive } from '../../src/archive/read-archive.ts';
import { evidenceFit, startingSds } from '../../src/model/evidence.ts';
import { columnValues, scaledInputs } from '../../src/model/inputs.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { GLOSS_PRIOR, MELT_PRIOR, priorColumns } from '../../src/model/priors.ts';
import {
  fitStages,
  isJudged,
  stageOf,
  STAGE_PRIOR,
  type JudgedTile,
  type StageFits,
} from '../../src/model/stages.ts';
import { lowerIndex } from '../../src/numeric/linalg.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { aHeat, aTile, csvOf, filesOf } from '../support/builders.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const judged = (tiles: readonly Tile[]): JudgedTile[] => tiles.filter(isJudged);
const START_SDS = { melt: startingSds(MELT_PRIOR), gloss: startingSds(GLOSS_PRIOR) };
const points = Array.from({ length: 20 }, (_, i) => drawnUnity(seededGenerator(100 + i)));

function logOddsOf(fits: StageFits) {
  return (['melt', 'gloss'] as const).flatMap((name) => {
    const stage = stageOf(name, fits[name], new Set());
    return points.flatMap((unity) => [5, 6, 7].map((cone) => stageLogOdds(stage, unity, cone)));
  });
}

describe('inputs and columns', () => {
  it('are 0 at the centre and 1 a scale above it', () => {
    const centre = {
      SiO2: 3.2,
      Al2O3: 0.42,
      B2O3: 0.18,
      K2O: 0.3,
      MgO: 0.06,
      ZnO: 0.03,
      CaO: 0.61,
    };
    const above = {
      SiO2: 4.2,
      Al2O3: 0.59,
      B2O3: 0.33,
      Na2O: 0.4,
      MgO: 0.14,
      ZnO: 0.09,
      CaO: 0.37,
    };
    const { ratio, ...others } = scaledInputs(centre, 6);
    for (const value of Object.values(others)) expect(value).toBeCloseTo(0, 12);
    expect(ratio).toBeCloseTo(Math.log(3.2 / 0.42 / 7) / 0.4, 12);
    const { ratio: unused, ...scaled } = scaledInputs(above, 7);
    for (const value of Object.values(scaled)) expect(value).toBeCloseTo(1, 12);
    expect(unused).toBeCloseTo(Math.log(4.2 / 0.59 / 7) / 0.4, 12);
  });

  it('counts lithia as alkali and keeps the ratio finite without alumina', () => {
    expect(scaledInputs({ Li2O: 0.3, CaO: 0.7, SiO2: 3 }, 6).KNaO).toBeCloseTo(0, 12);
    const bare = scaledInputs({ CaO: 1, SiO2: 3 }, 6).ratio;
    expect(bare).toBeCloseTo(Math.log(3 / 0.02 / 7) / 0.4, 12);
  });

  it('are 23 of melting and 20 of gloss, each made of known inputs', () => {
    expect(priorColumns(MELT_PRIOR)).toHaveLength(23);
    expect(priorColumns(GLOSS_PRIOR)).toHaveLength(20);
    expect(new Set(priorColumns(MELT_PRIOR)).size).toBe(23);
    const inputs = scaledInputs(points[0], 5.5);
    for (const prior of [MELT_PRIOR, GLOSS_PRIOR]) {
      expect(columnValues(inputs, priorColumns(prior)).every(Number.isFinite)).toBe(true);
    }
    expect(() => columnValues(inputs, ['constructor'])).toThrow(
      'column constructor names no input',
    );
  });
});

describe('evidence', () => {
  const tiles = judged(inventedTiles({ tiles: 120, seed: 1 }));

  it('keeps the starting sds where there are no tiles', () => {
    const { melt, gloss } = fitStages([]);
    expect(melt.fit.sds.groups).toEqual(START_SDS.melt.groups);
    expect(gloss.fit.sds.groups).toEqual(START_SDS.gloss.groups);
    expect(melt.fit.sds.load).toBe(0.5);
  });

  it.each(['melt', 'gloss'] as const)('ends at its fixed point: %s', (name) => {
    const { posterior, sds } = fitStages(tiles)[name].fit;
    let at = 0;
    STAGE_PRIOR[name].groups.forEach((group, g) => {
      let squares = 4 * group.startSd ** 2;
      let determined = 4;
      for (const mean of Object.values(group.means)) {
        squares += (posterior.mean[at] - mean) ** 2;
        determined += 1 - posterior.covarianceLower[lowerIndex(at, at)] / sds.groups[g] ** 2;
        at += 1;
      }
      expect(sds.groups[g] / Math.sqrt(squares / determined)).toBeCloseTo(1, 5);
    });
  });

  it('does not depend on where it begins', () => {
    const { data, fit } = fitStages(tiles).melt;
    const { groups, load } = fit.sds;
    const far = { groups: groups.map((sd, g) => (g % 2 ? sd * 3 : sd / 3)), load: load * 4 };
    const again = evidenceFit(data, MELT_PRIOR, { sds: far });
    again.sds.groups.forEach((sd, g) => {
      expect(sd / groups[g]).toBeCloseTo(1, 4);
    });
    expect(again.sds.load / load).toBeCloseTo(1, 4);
  });
});

describe('fitStages', () => {
  const tiles = judged(inventedTiles({ tiles: 90, seed: 2 }));

  it('gives the same bytes for any order of the tiles', () => {
    const turned = [...tiles].reverse();
    expect(JSON.stringify(fitStages(turned).melt.fit)).toBe(
      JSON.stringify(fitStages(tiles).melt.fit),
    );
  });

  it.each([
    ['held', { heldSds: START_SDS }],
    ['re-estimated', {}],
  ])('takes a tile given twice as weight 2, sds %s', (_, settings) => {
    const twice = tiles.slice(0, 15);
    const copies = twice.map((tile) => ({ ...tile, tile: `${tile.tile} again` }));
    const doubled = logOddsOf(fitStages([...tiles, ...copies], settings));
    const weight = (tile: JudgedTile) => (twice.includes(tile) ? 2 : 1);
    logOddsOf(fitStages(tiles, { ...settings, weight })).forEach((logOdds, i) => {
      expect(logOdds.mean).toBeCloseTo(doubled[i].mean, 8);
      expect(logOdds.sd).toBeCloseTo(doubled[i].sd, 8);
    });
  });

  it('is surer of every point when every tile is repeated, sds held', () => {
    const copies = tiles.map((tile) => ({ ...tile, tile: `${tile.tile} again` }));
    const once = logOddsOf(fitStages(tiles, { heldSds: START_SDS }));
    const twice = logOddsOf(fitStages([...tiles, ...copies], { heldSds: START_SDS }));
    once.forEach(({ sd }, i) => {
      expect(twice[i].sd).toBeLessThan(sd);
    });
  });

  const kinds: readonly (readonly [string, readonly JudgedTile[]])[] = [
    ['no tile', []],
    ['one tile', tiles.slice(0, 1)],
    ['all underfired', tiles.filter(({ verdict }) => verdict === 'underfired')],
    ['all gloss', tiles.filter(({ verdict }) => verdict === 'gloss')],
    ['no matte', tiles.filter(({ verdict }) => verdict !== 'matte')],
    ['melted only', tiles.map((tile) => ({ ...tile, verdict: 'melted' as const }))],
  ];
  it.each(kinds)('stays finite and wider than with all tiles: %s', (_, few) => {
    const full = logOddsOf(fitStages(tiles));
    const answers = logOddsOf(fitStages(few));
    expect(answers.every(({ mean, sd }) => Number.isFinite(mean) && sd > 0 && sd < 50)).toBe(true);
    const wider = answers.filter(({ sd }, i) => sd > full[i].sd).length;
    expect(wider).toBeGreaterThan(0.8 * answers.length);
  });

  it('takes perfectly separated tiles', () => {
    const apart = tiles.map((tile) => ({
      ...tile,
      verdict: (tile.unity.Al2O3 ?? 0) > 0.45 ? ('underfired' as const) : ('gloss' as const),
    }));
    const { posterior } = fitStages(apart).melt.fit;
    expect(posterior.gradientNorm).toBeLessThan(1e-8);
    expect(posterior.mean.every((weight) => Math.abs(weight) < 20)).toBe(true);
  });

  it('counts a tile that only melted for the melt boundary alone', () => {
    const melted = aTile({ tile: 'M', verdict: 'melted', heat: aHeat('6') }) as JudgedTile;
    const { melt, gloss } = fitStages([...tiles, melted]);
    expect(melt.data.rows).toHaveLength(91);
    const matteOrGloss = tiles.filter(({ verdict }) => verdict !== 'underfired');
    expect(gloss.data.rows).toHaveLength(matteOrGloss.length);
  });

  it('does not fit tiles that are overfired or unjudged', () => {
    const kept = [aTile({ verdict: 'overfired' }), aTile({ verdict: 'unjudged' })];
    expect(kept.filter(isJudged)).toEqual([]);
  });

  it('finds the load that fired cool', () => {
    const errors = [0, 0, 0, -1.2, 0, 0, 0, 0];
    const fits = fitStages(judged(inventedTiles({ tiles: 400, seed: 5, loadErrors: errors })));
    const names = new Set(errors.map((__, l) => `L${l}`));
    const { loads } = stageOf('melt', fits.melt, names);
    const lowest = [...loads].sort((a, b) => a.mean - b.mean)[0];
    expect(lowest.load).toBe('L3');
    expect(lowest.mean).toBeLessThan(-2 * lowest.sd);
    expect(loads.map(({ tiles: n }) => n)).toEqual(Array.from({ length: 8 }, () => 50));
  });
});

describe('from the archive to the fit', () => {
  const rows = inventedTiles({ tiles: 40, seed: 8 }).map(
    ({ tile, unity, heat, verdict, firing }) => ({
      tile,
      firing: firing!,
      cone: heat!.cone,
      surface: verdict,
      unity,
    }),
  );
  const oxides = ['SiO2', 'Al2O3', 'B2O3', 'Na2O', 'K2O', 'MgO', 'CaO'] as const;
  const fitOf = (columns: readonly string[], scale: (row: number) => number) => {
    const body = rows.map((row, i) =>
      columns.map((column) => {
        if (column === 'tile' || column === 'firing' || column === 'cone' || column === 'surface') {
          return row[column];
        }
        return (row.unity[column as (typeof oxides)[number]] ?? 0) * scale(i);
      }),
    );
    const archive = parseArchive(filesOf({ 'tiles.csv': csvOf([columns, ...body]) }));
    return logOddsOf(fitStages(judged(archive.tiles)));
  };
  const columns = ['tile', 'firing', 'cone', 'surface', ...oxides];

  it('does not depend on the order of the columns or the scale of the moles', () => {
    const plain = fitOf(columns, () => 1);
    const turned = fitOf([...columns].reverse(), (row) => 1 + row / 7);
    turned.forEach(({ mean, sd }, i) => {
      expect(mean).toBeCloseTo(plain[i].mean, 9);
      expect(sd).toBeCloseTo(plain[i].sd, 9);
    });
  });
});
