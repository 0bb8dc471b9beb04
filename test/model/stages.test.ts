import { describe, expect, it } from 'vitest';
import type { Tile } from '../../src/archive/archive.ts';
import { parseArchive } from '../../src/archive/read-archive.ts';
import { evidenceFit } from '../../src/model/evidence.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { startingScales } from '../../src/model/scales.ts';
import {
  fitStages,
  fittedStages,
  fitWithout,
  isJudged,
  STAGE_PRIOR,
  type JudgedTile,
  type StagesFit,
} from '../../src/model/stages.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { aHeat, aTile, csvOf, filesOf } from '../support/builders.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const judged = (tiles: readonly Tile[]): JudgedTile[] => tiles.filter(isJudged);
const START = startingScales(STAGE_PRIOR);
const points = Array.from({ length: 20 }, (_, i) => drawnUnity(seededGenerator(100 + i)));

function logOddsOf(fit: StagesFit) {
  const stages = fittedStages(fit, new Set());
  return (['melt', 'gloss'] as const).flatMap((name) =>
    points.flatMap((unity) => [5, 6, 7].map((cone) => stageLogOdds(stages[name], unity, cone))),
  );
}

/** All that a fit says, its numbers in full. */
function bytesOf({ fit, design, loads, loadTiles }: StagesFit): string {
  const numbers = {
    ...fit,
    weights: fit.weights.map((own) => [...own]),
    covariances: fit.covariances.map((own) => [...own]),
    loads: [...fit.loads],
    loadVariance: [...fit.loadVariance],
  };
  return JSON.stringify([numbers, design.stages.map(({ radial }) => radial), loads, loadTiles]);
}

describe('fitStages', () => {
  const tiles = judged(inventedTiles({ tiles: 90, seed: 2 }));

  it('gives the same bytes for any order of the tiles', () => {
    const bytes = bytesOf(fitStages(tiles));
    expect(bytes.length).toBeGreaterThan(10_000);
    expect(bytesOf(fitStages([...tiles].reverse()))).toBe(bytes);
    const shuffled = tiles.map((_, i) => tiles[(7 * i + 3) % tiles.length]);
    expect(new Set(shuffled).size).toBe(90);
    expect(bytesOf(fitStages(shuffled))).toBe(bytes);
  });

  it.each([
    ['held', { heldScales: START }],
    ['re-estimated', {}],
  ])('takes a tile given twice as weight 2, sds %s', (_, settings) => {
    const radial = (fit: StagesFit) => fit.design.stages.map((stage) => stage.radial);
    // As many tiles as leave both fits the same number of centres, which grows with the rows.
    const trials = Array.from({ length: 20 }, (__, less) => {
      const own = tiles.slice(0, tiles.length - less);
      const twice = [own[0], own[7], own[40], own[41]];
      const copies = twice.map((tile) => ({ ...tile, tile: `${tile.tile} again` }));
      const weight = (tile: JudgedTile) => (twice.includes(tile) ? 2 : 1);
      return { own, more: [...own, ...copies], weight };
    });
    const { own, more, weight } = trials.find((trial) => {
      const [one, other] = [trial.own, trial.more].map((given) => radial(fitStages(given)));
      return JSON.stringify(one) === JSON.stringify(other);
    })!;
    const doubled = logOddsOf(fitStages(more, settings));
    const weighted = fitStages(own, { ...settings, weight });
    expect(radial(weighted)[0].centres.length).toBeGreaterThan(1);
    logOddsOf(weighted).forEach((logOdds, i) => {
      expect(logOdds.mean).toBeCloseTo(doubled[i].mean, 8);
      expect(logOdds.sd).toBeCloseTo(doubled[i].sd, 8);
    });
  });

  it('is surer of every point when every tile is repeated, sds held', () => {
    const copies = tiles.map((tile) => ({ ...tile, tile: `${tile.tile} again` }));
    const once = logOddsOf(fitStages(tiles, { heldScales: START }));
    const twice = logOddsOf(fitStages([...tiles, ...copies], { heldScales: START }));
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
    const { fit, design } = fitStages(apart);
    expect(fit.weights[0].every((weight) => Math.abs(weight) < 20)).toBe(true);
    // Half the decrement at which the fit stops, 1e-7, bounds what is still to be gained.
    expect(fit.gradientNorm).toBeLessThan(1e-3);
    const exact = evidenceFit(design, { scales: START, tolerance: 1e-9 });
    expect(exact.gradientNorm).toBeLessThan(1e-8);
  });

  it('counts a tile that only melted for the melt boundary alone', () => {
    const melted = aTile({ tile: 'M', verdict: 'melted', heat: aHeat('6') }) as JudgedTile;
    const [melt, gloss] = fitStages([...tiles, melted]).design.stages;
    expect([melt.count, melt.tiles.includes(melted)]).toEqual([91, true]);
    const matteOrGloss = tiles.filter(({ verdict }) => verdict !== 'underfired');
    expect([gloss.count, gloss.tiles.includes(melted)]).toEqual([matteOrGloss.length, false]);
  });

  it('does not fit tiles that are overfired or unjudged', () => {
    const kept = [aTile({ verdict: 'overfired' }), aTile({ verdict: 'unjudged' })];
    expect(kept.filter(isJudged)).toEqual([]);
  });
});

describe('fitWithout', () => {
  const tiles = judged(
    inventedTiles({ tiles: 160, seed: 6, loadErrors: [0, 0.3, -0.3, 0.1, 0, -0.2] }),
  );
  const whole = fitStages(tiles);

  it.each<[string, (tile: JudgedTile, i: number) => boolean]>([
    ['a cone', ({ heat }) => heat.coneIndex === 5],
    ['a load', ({ load }) => load === 'L1'],
    ['every fourth tile', (_, i) => i % 4 === 0],
    ['nothing', () => false],
  ])('agrees with a fit of the rest from scratch with the same centres: %s', (_, isOut) => {
    const out = new Set(tiles.filter(isOut));
    const fit = fitWithout(whole, out);
    const kept = tiles.filter((tile) => !out.has(tile));
    const own = fitStages(kept);
    // The rest in the same order, the same loads.
    expect(fit.loads).toEqual(own.loads);
    expect(fit.loadTiles).toEqual(own.loadTiles);
    fit.design.stages.forEach(({ tiles: rows, outcome, load }, s) => {
      expect(rows).toEqual(own.design.stages[s].tiles);
      expect([outcome, load]).toEqual([own.design.stages[s].outcome, own.design.stages[s].load]);
    });
    const scratch = logOddsOf({ ...fit, fit: evidenceFit(fit.design) });
    logOddsOf(fit).forEach(({ mean, sd }, i) => {
      // It stops at moves of 6 %, which is enough for scores of two digits: no probability by more than 0.006.
      expect(Math.abs(mean - scratch[i].mean)).toBeLessThan(0.025);
      expect(Math.abs(sd - scratch[i].sd)).toBeLessThan(0.025);
    });
  });

  it('has the columns of the rest as computed anew, row by row', () => {
    const out = new Set(tiles.filter((_, i) => i % 3 === 0));
    const [melt] = fitWithout(whole, out).design.stages;
    const [all] = whole.design.stages;
    melt.tiles.forEach((tile, to) => {
      const from = all.tiles.indexOf(tile);
      const row = (of: typeof all, i: number) => of.values.slice(i * of.size, (i + 1) * of.size);
      const slope = (of: typeof all, i: number) =>
        of.slopes.slice(i * of.columnCount, (i + 1) * of.columnCount);
      expect(row(melt, to)).toEqual(row(all, from));
      expect(slope(melt, to)).toEqual(slope(all, from));
    });
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
