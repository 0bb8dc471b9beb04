import { describe, expect, it } from 'vitest';
import type { Tile } from '../../src/archive/archive.ts';
import { foldsByLoad } from '../../src/model/folds.ts';
import { fitModel, fitUnvalidated } from '../../src/model/fit.ts';
import { newLoadProbability } from '../../src/model/log-odds.ts';
import { SURFACES, type Surface } from '../../src/model/model.ts';
import { fitStages, fittedStages, fitWithout, isJudged } from '../../src/model/stages.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const tiles = inventedTiles({ tiles: 80, seed: 12 });
const notesOf = (given: readonly Tile[]) => fitModel(anArchive(given)).notes.join('\n');

describe('fitModel', () => {
  const model = fitModel(anArchive(tiles), { madeBy: 'test 1' });

  it('keeps the archive, the version and both stages with their counts', () => {
    expect(model.schema).toBe('coneshift.model/1');
    expect(model.madeBy).toBe('test 1');
    expect(model.archive.tiles).toBe(tiles);
    const count = (verdict: string) => tiles.filter((tile) => tile.verdict === verdict).length;
    expect(model.melt.tiles).toEqual({ no: count('underfired'), yes: 80 - count('underfired') });
    expect(model.gloss.tiles).toEqual({ no: count('matte'), yes: count('gloss') });
  });

  it('has the weights of the fit that is not validated', () => {
    const { melt, gloss, loads, loadSpread, logEvidence } = fitUnvalidated(anArchive(tiles));
    expect([model.melt, model.gloss]).toEqual([melt, gloss]);
    expect([model.loads, model.loadSpread]).toEqual([loads, loadSpread]);
    expect(model.logEvidence).toBe(logEvidence);
  });

  it('lists loads that have a firing, and leaves out those of single unnamed tiles', () => {
    const unnamed = aTile({ tile: 'alone', verdict: 'gloss' });
    const { loads } = fitUnvalidated(anArchive([...tiles, unnamed]));
    expect(loads.map(({ load }) => load)).toEqual(['L0', 'L1', 'L2', 'L3']);
    expect(loads.map((load) => load.tiles)).toEqual([20, 20, 20, 20]);
  });

  it('lets overfired and unjudged tiles change nothing but the archive', () => {
    const more = [
      aTile({ tile: 'over', verdict: 'overfired', heat: aHeat('7') }),
      aTile({ tile: 'blank', verdict: 'unjudged' }),
    ];
    const with2 = fitModel(anArchive([...tiles, ...more]), { madeBy: 'test 1' });
    expect({ ...with2, archive: model.archive }).toEqual(model);
  });
});

describe('notes of a fit', () => {
  it('say which side of a boundary has few tiles', () => {
    const notes = notesOf(tiles.filter(({ verdict }) => verdict !== 'matte'));
    expect(notes).toContain(
      '0 tiles judged matte (fewer than 10): the gloss boundary rests mostly',
    );
    expect(notes).not.toMatch(/judged (gloss|underfired|melted)/);
    expect(notesOf(tiles)).not.toContain('fewer than');
  });

  it('count tiles that only melted on the side of the melted', () => {
    const melted = tiles.map((tile) =>
      tile.verdict === 'underfired' ? tile : { ...tile, verdict: 'melted' as const },
    );
    expect(notesOf(melted)).not.toContain('judged melted');
    expect(notesOf(melted)).toContain('0 tiles judged gloss');
  });

  it('name the cones of 5, 6 and 7 without a tile, half a cone being near enough', () => {
    const at = (cone: string) => tiles.map((tile) => ({ ...tile, heat: aHeat(cone) }));
    expect(notesOf(at('6'))).toMatch(/cone 5: answers there.*\n.*cone 7: answers there/);
    expect(notesOf(at('5.5'))).not.toMatch(/no judged tile at cone [56]/);
    expect(notesOf(at('5.5'))).toContain('no judged tile at cone 7');
    expect(notesOf(at('6'))).toContain('all tiles are of one cone');
    expect(notesOf(tiles)).not.toMatch(/no judged tile|of one cone/);
  });

  it('name a cone that was fired in one load only', () => {
    const single = tiles.filter(({ load, heat }) => heat!.coneIndex !== 7 || load === 'L3');
    const loadsOf7 = new Set(single.filter(({ heat }) => heat!.coneIndex === 7).map((t) => t.load));
    expect(loadsOf7.size).toBe(1);
    const [load] = loadsOf7;
    expect(notesOf(single)).toContain(
      `all judged tiles of cones 5 (L0) and 7 (${load}) are of one load each`,
    );
    const unnamed = single.map(({ firing, ...tile }) => ({
      ...tile,
      load: `${tile.tile} ${firing}`,
    }));
    expect(notesOf(unnamed)).not.toContain('of one load');
  });

  it('without any tile say that nothing is learnt, and nothing else', () => {
    const { notes, validation } = fitModel(anArchive());
    expect(notes).toEqual([
      'no judged tile: every answer is what is usual elsewhere, and nothing in it comes from this studio',
    ]);
    for (const held of [validation.byCone, validation.byLoad, validation.byGlaze]) {
      expect(held).toMatchObject({ folds: 0, tiles: 0, logScore: null, baseRateLogScore: null });
      expect(held.reliability.every((row) => row.tiles === 0 && row.stated === null)).toBe(true);
    }
  });
});

describe('the account by load', () => {
  const judged = tiles.filter(isJudged);
  const account = fitModel(anArchive(tiles)).validation.byLoad;
  const whole = fitStages(judged);
  const predictions = foldsByLoad(judged).flatMap((fold) => {
    const refit = fittedStages(fitWithout(whole, new Set(fold.tiles)), new Set());
    return fold.tiles.map(({ unity, heat, verdict }) => {
      const p = newLoadProbability(refit, unity, heat.coneIndex);
      const called = SURFACES.reduce<Surface>((a, b) => (p[b] > p[a] ? b : a), 'underfired');
      return { stated: p[called], isRight: called === verdict, own: p[verdict as Surface] };
    });
  });

  it('has the score, the sure ones and the reliability of its predictions, counted again', () => {
    const score = predictions.reduce((sum, { own }) => sum + Math.log(own), 0) / 80;
    expect(account.logScore).toBeCloseTo(score, 12);
    const sure = predictions.filter(({ stated }) => stated >= 0.9);
    expect(account.sure).toEqual({
      called: sure.length,
      right: sure.filter(({ isRight }) => isRight).length,
    });
    for (const row of account.reliability) {
      const own = predictions.filter(
        ({ stated }) => stated >= row.from && (stated < row.to || row.to === 1),
      );
      expect(row.tiles).toBe(own.length);
      if (own.length === 0) continue;
      const mean = own.reduce((sum, { stated }) => sum + stated, 0) / own.length;
      expect(row.stated).toBeCloseTo(mean, 4);
      expect(row.right).toBeCloseTo(own.filter(({ isRight }) => isRight).length / own.length, 12);
    }
  });
});
