import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldsByCone, foldsByGlaze, foldsByLoad, type Fold } from '../../src/model/folds.ts';
import { isJudged, type JudgedTile } from '../../src/model/stages.ts';
import { aHeat, aTile } from '../support/builders.ts';

/** Any archive of up to 60 tiles that share recipes, blends, formulas and loads at random. */
const anyTiles = fc
  .array(
    fc.record({
      recipe: fc.option(fc.integer({ min: 0, max: 12 }), { nil: undefined }),
      blend: fc.option(fc.integer({ min: 0, max: 5 }), { nil: undefined }),
      silica: fc.integer({ min: 20, max: 40 }),
      load: fc.integer({ min: 0, max: 40 }),
      cone: fc.constantFrom('06', '4', '5', '5.5', '6', '6.25', '7'),
    }),
    { maxLength: 60 },
  )
  .map((rows) =>
    rows
      .map(({ recipe, blend, silica, load, cone }, i) =>
        aTile({
          tile: `T${i}`,
          unity: { SiO2: silica / 10, Al2O3: 0.4, CaO: 1 },
          heat: aHeat(cone),
          load: `L${load}`,
          ...(recipe !== undefined && { recipe: `R${recipe}` }),
          ...(blend !== undefined && { blend: `B${blend}` }),
        }),
      )
      .filter(isJudged),
  );

/** Every tile in exactly one fold, and every tile that shares the key in the same. */
function keepTogether(
  folds: readonly Fold[],
  tiles: readonly JudgedTile[],
  key: (tile: JudgedTile) => string | undefined,
): boolean {
  const foldOf = new Map(folds.flatMap((fold, f) => fold.tiles.map((tile) => [tile.tile, f])));
  const placed = folds.reduce((sum, fold) => sum + fold.tiles.length, 0);
  const together = tiles.every((a) =>
    tiles.every(
      (b) => key(a) === undefined || key(a) !== key(b) || foldOf.get(a.tile) === foldOf.get(b.tile),
    ),
  );
  return placed === tiles.length && foldOf.size === tiles.length && together;
}

const names = (folds: readonly Fold[]) =>
  folds.map(({ leftOut, tiles }) => [leftOut, tiles.map(({ tile }) => tile).sort()]);

describe('folds of any archive', () => {
  it('by load never split a load, and are 20 at most', () => {
    fc.assert(
      fc.property(anyTiles, (tiles) => {
        const folds = foldsByLoad(tiles);
        expect(folds.length).toBe(Math.min(20, new Set(tiles.map(({ load }) => load)).size));
        expect(keepTogether(folds, tiles, ({ load }) => load)).toBe(true);
      }),
      { numRuns: 60, seed: 1 },
    );
  });

  it('by glaze never split a recipe, a blend or a formula, and are 10 at most', () => {
    fc.assert(
      fc.property(anyTiles, (tiles) => {
        const folds = foldsByGlaze(tiles);
        expect(folds.length).toBeLessThanOrEqual(10);
        expect(folds.every((fold) => fold.tiles.length > 0)).toBe(true);
        expect(keepTogether(folds, tiles, ({ recipe }) => recipe)).toBe(true);
        expect(keepTogether(folds, tiles, ({ blend }) => blend)).toBe(true);
        expect(keepTogether(folds, tiles, ({ unity }) => String(unity.SiO2))).toBe(true);
      }),
      { numRuns: 60, seed: 2 },
    );
  });

  it('by glaze join no more than they must: unrelated tiles stand apart', () => {
    const apart = Array.from({ length: 8 }, (_, i) =>
      aTile({ tile: `T${i}`, recipe: `R${i}`, unity: { SiO2: 2 + i, Al2O3: 0.4, CaO: 1 } }),
    ).filter(isJudged);
    expect(foldsByGlaze(apart)).toHaveLength(8);
    const chained = apart.map((tile, i) => ({ ...tile, blend: `B${Math.floor(i / 2)}` }));
    expect(foldsByGlaze(chained)).toHaveLength(4);
  });

  it('by cone hold the tiles nearest to one whole cone', () => {
    fc.assert(
      fc.property(anyTiles, (tiles) => {
        const folds = foldsByCone(tiles);
        expect(keepTogether(folds, tiles, ({ heat }) => heat.cone)).toBe(true);
        for (const { leftOut, tiles: own } of folds) {
          for (const { heat } of own) {
            expect(Math.abs(heat.coneIndex - Number(leftOut))).toBeLessThanOrEqual(0.5);
          }
        }
        const cones = folds.map(({ leftOut }) => Number(leftOut));
        expect([...cones].sort((a, b) => a - b)).toEqual(cones);
      }),
      { numRuns: 60, seed: 3 },
    );
  });

  it('are the same for any order of the tiles', () => {
    fc.assert(
      fc.property(anyTiles, (tiles) => {
        const turned = [...tiles].reverse();
        for (const folds of [foldsByCone, foldsByLoad, foldsByGlaze]) {
          expect(names(folds(turned))).toEqual(names(folds(tiles)));
        }
      }),
      { numRuns: 40, seed: 4 },
    );
  });

  it('of more than 1,000 tiles are fewer: 8 by load, 5 by glaze, and still never split a group', () => {
    const many = Array.from({ length: 1001 }, (_, i) =>
      aTile({
        tile: `T${i}`,
        recipe: `R${i % 60}`,
        unity: { SiO2: 2 + (i % 60) / 100, Al2O3: 0.4, CaO: 1 },
        load: `L${i % 45}`,
      }),
    ).filter(isJudged);
    expect([foldsByLoad(many).length, foldsByGlaze(many).length]).toEqual([8, 5]);
    expect(keepTogether(foldsByLoad(many), many, ({ load }) => load)).toBe(true);
    expect(keepTogether(foldsByGlaze(many), many, ({ recipe }) => recipe)).toBe(true);
    const fewer = many.slice(1);
    expect([foldsByLoad(fewer).length, foldsByGlaze(fewer).length]).toEqual([20, 10]);
  });
});
