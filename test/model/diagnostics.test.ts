import { describe, expect, it } from 'vitest';
import type { Tile, Verdict } from '../../src/archive/archive.ts';
import { fitModel } from '../../src/model/fit.ts';
import type { Diagnostic, Model } from '../../src/model/model.ts';
import { SURFACES } from '../../src/model/model.ts';
import { parseModel, modelText } from '../../src/model/model-file.ts';
import { predict } from '../../src/predict/predict.ts';
import { fitAnswer } from '../../src/render/answers-json.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { drawStudio } from '../bench/studios/studio.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const many = inventedTiles({ tiles: 300, seed: 12 });
const of = (...wanted: Verdict[]) => many.filter(({ verdict }) => wanted.includes(verdict));
const found = ({ diagnostics }: Model, kind: Diagnostic['kind']) =>
  diagnostics.filter((one) => one.kind === kind);

const points = Array.from({ length: 20 }, (_, i) => ({
  point: `P${i}`,
  unity: drawnUnity(seededGenerator(700 + i)),
}));
const answersOf = (model: Model) => predict(model, points, [5, 6, 7]).predictions;
const none = answersOf(fitModel(anArchive()));

describe('with few or no tiles on one side', () => {
  const cases: [string, Tile[]][] = [
    ['no melted tile', of('underfired').slice(0, 40)],
    ['1 melted tile', [...of('underfired').slice(0, 40), ...of('gloss').slice(0, 1)]],
    ['5 melted tiles', [...of('underfired').slice(0, 40), ...of('gloss', 'matte').slice(0, 5)]],
    ['10 melted tiles', [...of('underfired').slice(0, 40), ...of('gloss', 'matte').slice(0, 10)]],
    ['no matte tile', [...of('underfired').slice(0, 30), ...of('gloss').slice(0, 30)]],
    ['no gloss tile', [...of('underfired').slice(0, 30), ...of('matte').slice(0, 30)]],
    ['no underfired tile', of('gloss', 'matte').slice(0, 60)],
  ];

  it.each(cases)('%s: answers are sound, unsure, and say so', (_, tiles) => {
    const model = fitModel(anArchive(tiles));
    const count = (...wanted: Verdict[]) =>
      tiles.filter(({ verdict }) => wanted.includes(verdict)).length;
    const expected = [
      ['underfired', count('underfired')],
      ['melted', count('matte', 'gloss')],
      ['matte', count('matte')],
      ['gloss', count('gloss')],
    ].filter(([, tilesOnSide]) => Number(tilesOnSide) < 10);
    const few = found(model, 'few tiles');
    expect(few.map(({ about, value }) => [about, value])).toEqual(expected);
    expect(few.length).toBeGreaterThan(0);
    for (const { threshold, text } of few) {
      expect(threshold).toBe(10);
      expect(text).toContain('fire and judge more of that side');
      expect(model.notes).toContain(text);
    }
    for (const { probability, interval90 } of answersOf(model)) {
      expect(SURFACES.reduce((sum, s) => sum + probability[s], 0)).toBeCloseTo(1, 10);
      for (const s of SURFACES) {
        expect(interval90[s][0]).toBeGreaterThanOrEqual(0);
        expect(interval90[s][1]).toBeLessThanOrEqual(1);
      }
    }
  });

  it('gloss among the melted is the prior where no tile is melted', () => {
    const answers = answersOf(fitModel(anArchive(of('underfired').slice(0, 40))));
    answers.forEach(({ probability }, i) => {
      const share = (p: typeof probability) => p.gloss / (p.gloss + p.matte);
      expect(share(probability)).toBeCloseTo(share(none[i].probability), 9);
    });
  });

  it('gloss moves no farther from the prior with one tile than with ten', () => {
    const moves = [1, 10].map((melted) => {
      const tiles = [...of('underfired').slice(0, 40), ...of('matte').slice(0, melted)];
      const answers = answersOf(fitModel(anArchive(tiles)));
      return answers.reduce((sum, { probability: p }, i) => {
        const before = none[i].probability;
        return (
          sum +
          Math.abs(p.gloss / (p.gloss + p.matte) - before.gloss / (before.gloss + before.matte))
        );
      }, 0);
    });
    expect(moves[0]).toBeLessThan(moves[1]);
  });

  it('nothing is said with ten tiles and more on every side', () => {
    expect(found(fitModel(anArchive(many)), 'few tiles')).toEqual([]);
  });
});

describe('other doubts, each with its number, threshold and advice', () => {
  it('stages whose verdicts stand clear of each other', () => {
    const clear = many
      .filter(({ unity: { SiO2 = 0 } }) => Math.abs(SiO2 - 3.4) > 0.3)
      .map((tile) => {
        const verdict: Verdict = (tile.unity.SiO2 ?? 0) > 3.4 ? 'underfired' : 'melted';
        return { ...tile, verdict };
      });
    const separated = found(fitModel(anArchive(clear)), 'separated');
    expect(separated.map(({ about }) => about)).toEqual(['melt']);
    expect(separated[0].value).toBeGreaterThan(separated[0].threshold);
    expect(separated[0].text).toContain('every melted tile stands clear of every underfired one');
    expect(found(fitModel(anArchive(many)), 'separated')).toEqual([]);
  });

  it('a verdict that its neighbours contradict so far that two answers are left open', () => {
    const { archive } = drawStudio({ family: 'planes', seed: 507, size: 1000 });
    const [doubt, ...others] = found(fitModel(archive), 'approximation doubtful');
    expect(others).toEqual([]);
    expect(doubt.value).toBeGreaterThan(doubt.threshold);
    expect(archive.tiles.map(({ tile }) => tile)).toContain(doubt.about);
    expect(doubt.text).toContain(`near "${doubt.about}" is far from Gaussian`);
    for (const seed of [508, 509]) {
      const usual = drawStudio({ family: 'planes', seed, size: 300 }).archive;
      expect(found(fitModel(usual), 'approximation doubtful')).toEqual([]);
    }
  });

  it('cones without tiles, one cone alone, a cone of one load', () => {
    const atSix = many.map((tile) => ({ ...tile, heat: aHeat('6') }));
    const one = fitModel(anArchive(atSix));
    expect(found(one, 'cone without tiles').map(({ about }) => about)).toEqual(['5', '7']);
    expect(found(one, 'one cone')).toHaveLength(1);
    const some = many.filter(({ heat, firing }) => heat?.cone !== '7' || firing === 'L3');
    const [only, ...others] = found(fitModel(anArchive(some)), 'one load');
    expect(others).toEqual([]);
    expect([only.about, only.value]).toEqual(['5, 7', 2]);
    expect(only.text).toContain('of cones 5 (L0) and 7 (L3) are of one load each');
    expect(only.text).toContain('fire another load there');
  });

  it('hotter tiles that came out less melted, not to be taken for heat that hardly shows', () => {
    const told = (truth: (cone: number) => number) => {
      const tiles = inventedTiles({
        tiles: 120,
        seed: 33,
        truth: {
          melt: ({ SiO2 = 0 }, cone) => -2 * (SiO2 - 3.2) + truth(cone),
          gloss: () => 2,
        },
      });
      return found(fitModel(anArchive(tiles)), 'heat hardly shows').map(({ text }) => text);
    };
    expect(told((cone) => -3 * (cone - 6))[0]).toContain('cones, firings or verdicts are mixed up');
    expect(told((cone) => 1.5 * (cone - 6))).toEqual([]);
  });

  it('an oxide that many tiles hold and no column stands for', () => {
    const iron = many.map((tile, i) =>
      i % 4 === 0 ? { ...tile, unity: { ...tile.unity, Fe2O3: 0.06, TiO2: 0.01 } } : tile,
    );
    const [diagnostic, ...others] = found(fitModel(anArchive(iron)), 'oxide without a column');
    expect(others).toEqual([]);
    expect([diagnostic.about, diagnostic.value, diagnostic.threshold]).toEqual([
      'Fe2O3',
      0.25,
      0.1,
    ]);
    expect(diagnostic.text).toContain('(Fe2O3 in 75, a step or more each)');
    expect(found(fitModel(anArchive(many)), 'oxide without a column')).toEqual([]);
  });

  it('come back from the model file, and stand in the JSON of the fit', () => {
    const model = fitModel(anArchive([aTile()]));
    expect(model.diagnostics.length).toBeGreaterThan(2);
    expect(parseModel(modelText(model)).diagnostics).toEqual(model.diagnostics);
    expect(fitAnswer({ model, leftOut: [] }).diagnostics).toEqual(model.diagnostics);
    for (const { text } of model.diagnostics) expect(model.notes).toContain(text);
  });
});
