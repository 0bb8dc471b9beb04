import { describe, expect, it } from 'vitest';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { isJudged } from '../../src/model/stages.ts';
import { boundaries } from '../../src/predict/boundaries.ts';
import { compositionLines, placeAlong } from '../../src/predict/lines.ts';
import { middleComposition } from '../../src/predict/middle.ts';
import { placePosterior } from '../../src/predict/place.ts';
import { anArchive, aTile } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const tiles = inventedTiles({ tiles: 160, seed: 51 }).filter(isJudged);
const model = fitUnvalidated(anArchive(tiles));
const unity = { SiO2: 3.4, Al2O3: 0.46, B2O3: 0.15, Na2O: 0.15, K2O: 0.15, MgO: 0.04, CaO: 0.66 };
const through = { point: 'P', unity };

describe('the lines through a composition', () => {
  const [alumina, silica, ratio] = compositionLines(unity, tiles);

  it('hold what they say', () => {
    expect([alumina.at, silica.at]).toEqual([{ SiO2: 3.4 }, { Al2O3: 0.46 }]);
    expect(ratio.at['SiO2+Al2O3']).toBeCloseTo(3.86, 12);
    expect(alumina.unityAt(0.7)).toEqual({ ...unity, Al2O3: 0.7 });
    expect(silica.unityAt(4)).toEqual({ ...unity, SiO2: 4 });
    for (const place of [2, 7, 14]) {
      const there = ratio.unityAt(place);
      expect(placeAlong(there, 'SiO2:Al2O3')).toBeCloseTo(place, 12);
      expect((there.SiO2 ?? 0) + (there.Al2O3 ?? 0)).toBeCloseTo(3.86, 12);
      expect({ ...there, SiO2: 0, Al2O3: 0 }).toEqual({ ...unity, SiO2: 0, Al2O3: 0 });
    }
  });

  it('cover nearly all tiles, and never go below what a glaze can hold', () => {
    for (const { along, range } of [alumina, silica, ratio]) {
      const inside = tiles.filter((tile) => {
        const place = placeAlong(tile.unity, along);
        return place >= range[0] && place <= range[1];
      });
      expect(inside.length).toBeGreaterThanOrEqual(0.96 * tiles.length);
      expect(range[0]).toBeGreaterThan(0);
    }
  });

  it('take a usual range where there is no tile, or all tiles are alike', () => {
    const usual = compositionLines(unity, []).map(({ range }) => range);
    const alike = tiles.map((tile) => ({ ...tile, unity }));
    expect(compositionLines(unity, alike).map(({ range }) => range)).toEqual(usual);
  });

  it('leave out tiles without alumina from the range of the ratio', () => {
    const bare = aTile({ tile: 'bare', unity: { SiO2: 3, CaO: 1 } });
    const [, , withBare] = compositionLines(unity, [...tiles, bare].filter(isJudged));
    expect(withBare.range).toEqual(ratio.range);
  });
});

describe('boundaries', () => {
  it('without a crossing are a row without a place, and say which side all of it is', () => {
    const soft = { ...unity, Al2O3: 0.25, B2O3: 0.35 };
    const rows = boundaries(model, [8], { through: { point: 'soft', unity: soft } }).boundaries;
    const row = rows.find(({ kind, along }) => kind === 'melt' && along === 'SiO2')!;
    expect(row).toMatchObject({ value: null, perCone: null, tilesNear: 0 });
    expect([row.below, row.above]).toEqual(['melted', 'melted']);
    expect(row.noCrossing).toBeGreaterThan(0.3);
  });

  it('of gloss are not shown where the glaze has not melted', () => {
    const hard = { ...unity, SiO2: 4.2, B2O3: 0 };
    const rows = boundaries(model, [4], { through: { point: 'hard', unity: hard } }).boundaries;
    const row = rows.find(({ kind, along }) => kind === 'gloss' && along === 'Al2O3')!;
    const [line] = compositionLines(hard, tiles);
    const [low, high] = line.range;
    const logOddsAt = (place: number) => stageLogOdds(model.gloss, line.unityAt(place), 4).mean;
    expect(logOddsAt(low) > 0 && logOddsAt(high) < 0).toBe(true);
    expect(row.value).toBeNull();
  });

  it('name what lies on either side as the mean log-odds have it', () => {
    for (const row of boundaries(model, [5, 6], { through }).boundaries) {
      if (row.value === null) continue;
      const line = compositionLines(unity, tiles).find(({ along }) => along === row.along)!;
      const width = 0.001 * (row.lookedAt[1] - row.lookedAt[0]);
      const after = stageLogOdds(model[row.kind], line.unityAt(row.value + width), row.coneIndex);
      const yes = row.kind === 'melt' ? 'melted' : 'gloss';
      expect(row.above === yes).toBe(after.mean > 0);
      expect(row.below === yes).toBe(after.mean <= 0);
    }
  });

  it('have an interval about the place, wider with fewer tiles', () => {
    const few = fitUnvalidated(anArchive(tiles.slice(0, 24)));
    const row = (of: typeof model) =>
      boundaries(of, [6], { through }).boundaries.find(
        ({ kind, along }) => kind === 'melt' && along === 'Al2O3',
      )!;
    const width = ({ interval90, lookedAt }: ReturnType<typeof row>) =>
      (interval90[1] ?? lookedAt[1]) - (interval90[0] ?? lookedAt[0]);
    expect(width(row(few))).toBeGreaterThan(width(row(model)));
    expect(row(few).tilesNear).toBeLessThan(row(model).tilesNear);
  });

  it('run through the tile that is nearest to all others where no composition is given', () => {
    const { through: middle, throughSource } = boundaries(model, [6]);
    const own = tiles.find((tile) => throughSource.includes(tile.tile))!;
    expect(own.unity).toEqual(middle);
    const outlier = aTile({ tile: 'far', unity: { ...unity, SiO2: 20 } });
    const three = [outlier, ...tiles.slice(0, 2)].filter(isJudged);
    expect(middleComposition(three).point).not.toContain('far');
  });
});

describe('placePosterior', () => {
  it('counts a place that left at the lower end there', () => {
    const places = [...Array<'below'>(20).fill('below'), ...Array.from({ length: 80 }, () => 6)];
    expect(placePosterior(places)).toEqual({
      interval90: [null, 6],
      noCrossing: expect.closeTo(0.2, 12) as number,
    });
  });

  it('keeps both ends where fewer than 5 % left', () => {
    const places = [...Array<'beyond'>(4).fill('beyond'), ...Array.from({ length: 96 }, () => 6)];
    expect(placePosterior(places).interval90).toEqual([6, 6]);
  });
});
