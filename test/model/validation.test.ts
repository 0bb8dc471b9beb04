import { describe, expect, it } from 'vitest';
import { foldsByCone, foldsByGlaze, foldsByLoad, type Fold } from '../../src/model/folds.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { newLoadProbability, stageLogOdds, surfaceProbability } from '../../src/model/log-odds.ts';
import { SURFACES, type Surface } from '../../src/model/model.ts';
import {
  fitStages,
  fittedStages,
  fitWithout,
  isJudged,
  type FittedStages,
  type JudgedTile,
} from '../../src/model/stages.ts';
import { validation } from '../../src/model/validation.ts';
import { aHeat } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const tiles = inventedTiles({ tiles: 96, seed: 3, loadErrors: [0, 0.1, -0.1, 0.2, 0, 0] }).filter(
  isJudged,
);

function sharedAcross(folds: readonly Fold[], key: (tile: JudgedTile) => string | undefined) {
  const foldOf = new Map<string, string>();
  return folds.flatMap((fold) =>
    fold.tiles.filter((tile) => {
      const name = key(tile);
      if (name === undefined) return false;
      const known = foldOf.get(name) ?? fold.leftOut;
      foldOf.set(name, known);
      return known !== fold.leftOut;
    }),
  );
}

describe('folds', () => {
  it('by cone are the nearest whole cones, from cool to hot', () => {
    const between = tiles.map((tile, i) => ({
      ...tile,
      heat: aHeat(['5', '5.25', '5.75', '6.5', '7'][i % 5]),
    }));
    const folds = foldsByCone(between);
    expect(folds.map(({ leftOut }) => leftOut)).toEqual(['5', '6', '7']);
    expect(folds.map((fold) => fold.tiles.length)).toEqual([39, 19, 38]);
  });

  it('by load hold whole loads, 20 folds where there are more', () => {
    expect(foldsByLoad(tiles)).toHaveLength(6);
    const many = tiles.map((tile, i) => ({ ...tile, load: `tile ${i % 50}` }));
    const folds = foldsByLoad(many);
    expect(folds).toHaveLength(20);
    expect(sharedAcross(folds, ({ load }) => load)).toEqual([]);
    expect(folds.flatMap((fold) => fold.tiles)).toHaveLength(96);
    const sizes = folds.map((fold) => fold.tiles.length);
    expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(2);
  });

  it('by glaze never have a recipe, a blend or a formula on both sides, also over others', () => {
    const glazes = tiles.map((tile, i) => ({
      ...tile,
      ...(i % 3 === 0 && { recipe: `R${i % 7}` }),
      ...(i % 4 === 0 && { blend: `line ${i % 5}` }),
      ...(i % 10 === 9 && { unity: tiles[0].unity }),
    }));
    const folds = foldsByGlaze(glazes);
    expect(folds.length).toBeGreaterThan(2);
    expect(folds.flatMap((fold) => fold.tiles)).toHaveLength(96);
    expect(sharedAcross(folds, ({ recipe }) => recipe)).toEqual([]);
    expect(sharedAcross(folds, ({ blend }) => blend)).toEqual([]);
    expect(sharedAcross(folds, ({ unity }) => JSON.stringify(unity))).toEqual([]);
  });
});

/**
 * Averaged over the heat of a load not seen, Student's t with 5 degrees of freedom: with t = sqrt(5) tan u its
 * density is 8 / (3 pi) cos^4 u per unit of u, and the midpoint rule on 2,000 cells is exact to rounding.
 */
function denseNewLoad(
  { melt, gloss, loadSpread }: FittedStages,
  unity: Unity,
  cone: number,
): Record<Surface, number> {
  const sum = { underfired: 0, matte: 0, gloss: 0 };
  const cells = 2000;
  for (let k = 0; k < cells; k++) {
    const u = Math.PI * ((k + 0.5) / cells - 0.5);
    const share = ((8 / 3) * Math.cos(u) ** 4) / cells;
    const at = cone + loadSpread.offsetScaleCones * Math.sqrt(5) * Math.tan(u);
    const { mean, sd } = stageLogOdds(gloss, unity, at);
    const p = surfaceProbability(stageLogOdds(melt, unity, at), {
      mean,
      sd: Math.hypot(sd, loadSpread.glossSd),
    });
    for (const s of SURFACES) sum[s] += share * p[s];
  }
  return sum;
}

describe('a load not seen', () => {
  const stages = fittedStages(fitStages(tiles), new Set());
  const spread = (offsetScaleCones: number) => ({
    ...stages,
    loadSpread: { ...stages.loadSpread, offsetScaleCones },
  });

  // Eleven equal shares leave the far tails out: they cost 0.0015 of a probability where loads spread as they
  // usually do, and 0.0105 at a spread of one cone, wider than any archive has.
  it.each([
    { sd: 0.2, most: 0.002 },
    { sd: 0.5, most: 0.006 },
    { sd: 1, most: 0.012 },
  ])('is averaged over a heat that is $sd cones off', ({ sd, most }) => {
    let worst = 0;
    for (const { unity } of tiles.slice(0, 40)) {
      for (const cone of [4, 6, 7.5]) {
        const found = newLoadProbability(spread(sd), unity, cone);
        const exact = denseNewLoad(spread(sd), unity, cone);
        for (const s of SURFACES) worst = Math.max(worst, Math.abs(found[s] - exact[s]));
        expect(SURFACES.reduce((sum, s) => sum + found[s], 0)).toBeCloseTo(1, 10);
      }
    }
    expect(worst).toBeLessThan(most);
  });

  it('is less sure than one that truly reaches the cone', () => {
    const called = (p: Readonly<Record<Surface, number>>) => Math.max(...SURFACES.map((s) => p[s]));
    const sure = tiles.flatMap(({ unity }) => {
      const sharp = surfaceProbability(
        stageLogOdds(stages.melt, unity, 6),
        stageLogOdds(stages.gloss, unity, 6),
      );
      return called(sharp) > 0.8
        ? [called(sharp) - called(newLoadProbability(spread(0.8), unity, 6))]
        : [];
    });
    expect(sure.length).toBeGreaterThan(20);
    expect(sure.filter((loss) => loss <= 0)).toEqual([]);
  });
});

describe('validation', () => {
  const account = validation(tiles, fitStages(tiles));

  it('predicts each cone from the others, averaged over the error of a new load', () => {
    const out = tiles.filter(({ heat }) => heat.coneIndex === 5);
    const kept = tiles.filter(({ heat }) => heat.coneIndex !== 5);
    const refit = fittedStages(fitWithout(fitStages(tiles), new Set(out)), new Set());
    const logs = (of: typeof newLoadProbability | typeof denseNewLoad) =>
      out.map(({ unity, heat, verdict }) =>
        Math.log(of(refit, unity, heat.coneIndex)[verdict as 'matte']),
      );
    const scores = logs(newLoadProbability);
    const underfired = kept.filter(({ verdict }) => verdict === 'underfired').length;
    const glossy = kept.filter(({ verdict }) => verdict === 'gloss').length;
    const u = (underfired + 0.5) / (kept.length + 1);
    const g = (glossy + 0.5) / (kept.length - underfired + 1);
    const rates = { underfired: u, matte: (1 - u) * (1 - g), gloss: (1 - u) * g };
    const baseScores = out.map(({ verdict }) => Math.log(rates[verdict as 'matte']));
    const average = (values: number[]) => values.reduce((a, b) => a + b, 0) / values.length;
    const part = account.byCone.parts.find(({ leftOut }) => leftOut === 'cone 5')!;
    expect(part.tiles).toBe(out.length);
    expect(part.logScore).toBeCloseTo(average(scores), 9);
    expect(Math.abs(part.logScore - average(logs(denseNewLoad)))).toBeLessThan(0.002);
    expect(part.baseRateLogScore).toBeCloseTo(average(baseScores), 12);
  });

  it.each(['byCone', 'byLoad', 'byGlaze'] as const)('accounts for every tile %s', (scheme) => {
    const held = account[scheme];
    expect(held.tiles).toBe(tiles.length);
    expect(held.parts.reduce((sum, part) => sum + part.tiles, 0)).toBe(tiles.length);
    expect(held.parts).toHaveLength(held.folds);
    expect(held.reliability.reduce((sum, row) => sum + row.tiles, 0)).toBe(tiles.length);
    const weighted = held.parts.reduce((sum, part) => sum + part.tiles * part.logScore, 0);
    expect(held.logScore).toBeCloseTo(weighted / tiles.length, 12);
    expect(held.logScore!).toBeGreaterThan(held.baseRateLogScore!);
    const { called, right } = held.sure;
    const sureRows = held.reliability.filter(({ from }) => from >= 0.9);
    expect(called).toBe(sureRows.reduce((sum, row) => sum + row.tiles, 0));
    expect(right).toBeLessThanOrEqual(called);
  });

  it('has no folds and no score where all tiles are of one cone', () => {
    const one = tiles.map((tile) => ({ ...tile, heat: aHeat('6') }));
    const { byCone, byLoad } = validation(one, fitStages(one));
    expect(byCone).toMatchObject({ folds: 0, logScore: null, baseRateLogScore: null, tiles: 0 });
    expect(byLoad.folds).toBe(6);
  });

  it('scores a tile that only melted, and leaves it out of the reliability', () => {
    const some = tiles.map((tile, i) =>
      i % 8 === 0 && tile.verdict !== 'underfired' ? { ...tile, verdict: 'melted' as const } : tile,
    );
    const melted = some.filter(({ verdict }) => verdict === 'melted').length;
    const { byLoad } = validation(some, fitStages(some));
    expect(byLoad.tiles).toBe(tiles.length);
    const counted = byLoad.reliability.reduce((sum, row) => sum + row.tiles, 0);
    expect(counted).toBe(tiles.length - melted);
  });

  it('says when no tile names its blend', () => {
    expect(account.notes.join()).toContain('no tile names its blend');
    const named = tiles.map((tile, i) => (i === 0 ? { ...tile, blend: 'line 1' } : tile));
    expect(validation(named, fitStages(named)).notes).toEqual([]);
  });
});
