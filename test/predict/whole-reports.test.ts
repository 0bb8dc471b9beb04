import { describe, expect, it } from 'vitest';
import { fitModel, fitUnvalidated } from '../../src/model/fit.ts';
import { modelText, parseModel } from '../../src/model/model-file.ts';
import { boundaries } from '../../src/predict/boundaries.ts';
import { glazePoint } from '../../src/predict/point.ts';
import { predict } from '../../src/predict/predict.ts';
import { shift } from '../../src/predict/shift.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const { unity } = aTile();

describe('glazePoint', () => {
  it('names all that is missing at once', () => {
    expect(() => glazePoint('ZrO2=1')).toThrow(
      /SiO2=\.\.\., found none[^]*Al2O3=\.\.\., found none[^]*flux/,
    );
    expect(() => glazePoint('SiO2=3.4 K2O=x')).toThrow(/moles of K2O[^]*Al2O3=\.\.\., found none/);
  });
});

it('shift names every overfired tile near by, not the five nearest', () => {
  const over = Array.from({ length: 12 }, (_, i) =>
    aTile({ tile: `O${i}`, unity, verdict: 'overfired', heat: aHeat('7') }),
  );
  const model = fitUnvalidated(anArchive([...inventedTiles({ tiles: 40, seed: 2 }), ...over]));
  const [answer] = shift(model, [{ point: 'P', unity }], [6, 7]).points;
  expect(answer.overfiredNear).toHaveLength(12);
});

it('the order of the rows changes neither the nearest of equal tiles nor the middle of many', () => {
  const equal = Array.from({ length: 9 }, (_, i) => aTile({ tile: `E${i}`, unity }));
  const turned = fitUnvalidated(anArchive([...equal].reverse()));
  const plain = fitUnvalidated(anArchive(equal));
  const point = { point: 'P', unity };
  expect(predict(turned, [point], [6])).toEqual(predict(plain, [point], [6]));
  const many = inventedTiles({ tiles: 1200, seed: 2 });
  const [a, b] = [many, [...many.slice(1), many[0]]].map((tiles) =>
    fitUnvalidated(anArchive(tiles)),
  );
  expect(boundaries(a, [6]).throughSource).toBe(boundaries(b, [6]).throughSource);
});

it('a note about one tile says one tile', () => {
  const { notes } = fitModel(anArchive([aTile()]));
  expect(notes.join('\n')).toContain('1 tile judged gloss');
});

describe('a model file', () => {
  const text = modelText(fitModel(anArchive(inventedTiles({ tiles: 30, seed: 21 }))));
  interface Held {
    archive: { tiles: { heat?: { coneIndex: number } }[]; counts: Record<string, number> };
  }
  const changed = (change: (archive: Held['archive']) => void) => {
    const data = JSON.parse(text) as Held;
    change(data.archive);
    return JSON.stringify(data);
  };
  it.each<[string, string, (archive: Held['archive']) => void]>([
    [
      'counts that add up but are not of these tiles',
      'counts',
      ({ counts }) => {
        counts['fitted'] -= 3;
        counts['unjudged'] += 3;
      },
    ],
    ['a judged tile without heat', 'counts', ({ tiles }) => delete tiles[0].heat],
    [
      'a cone and its number that differ',
      'archive.tiles.0.heat',
      ({ tiles }) => {
        tiles[0].heat!.coneIndex += 1;
      },
    ],
    [
      'one tile twice',
      'every name once',
      ({ tiles }) => {
        tiles[1] = tiles[0];
      },
    ],
  ])('with %s is refused', (_, message, change) => {
    expect(() => parseModel(changed(change))).toThrow(message);
  });
});
