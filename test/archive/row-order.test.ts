import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inventory } from '../../src/archive/inventory.ts';
import { readArchive } from '../../src/archive/read-archive.ts';
import { checkAnswer, unityAnswer } from '../../src/render/answers-json.ts';
import { checkPage } from '../../src/render/check-page.ts';
import { toJson } from '../../src/render/json.ts';
import { PLAIN_LOOK } from '../../src/render/page.ts';
import { unityPage } from '../../src/render/unity-page.ts';
import { bytesOf, csvOf, filesOf } from '../support/builders.ts';
import { demoFiles } from '../support/demo-archive.ts';

type Files = ReadonlyMap<string, Uint8Array>;

/** All that `check` and `unity` say of an archive; its fingerprint is that of the bytes and left out. */
function told(files: Files) {
  const reading = readArchive(files);
  const held = inventory(reading.archive);
  const recipes = reading.archive.recipes.map(({ recipe, unity }) => ({ recipe, unity }));
  return {
    page: checkPage(reading, held, PLAIN_LOOK),
    json: toJson({ ...checkAnswer(reading, held), archive: '' }),
    unity: unityPage(recipes, PLAIN_LOOK),
    unityJson: toJson(unityAnswer(recipes)),
  };
}

/** The same files with the rows below each heading in another order; no cell holds a line end. */
function shuffled(files: Files, turn: (rows: readonly string[]) => readonly string[]): Files {
  return new Map(
    [...files].map(([file, bytes]) => {
      const [head = '', ...rows] = new TextDecoder().decode(bytes).trimEnd().split(/\r?\n/);
      return [file, bytesOf(`${[head, ...turn(rows)].join('\n')}\n`)];
    }),
  );
}

/** Rows in an order drawn anew from a seed. */
function byLot(seed: number) {
  return (rows: readonly string[]) =>
    fc.sample(fc.shuffledSubarray([...rows], { minLength: rows.length }), { seed, numRuns: 1 })[0];
}

const demo: Files = new Map(
  Object.entries(demoFiles()).map(([path, bytes]) => [path.replace('demo/', ''), bytes]),
);

/** An archive in which much is odd and much is tied. */
const GLAZE = [3.2, 0.42, 0.15, 0.25, 0.75];
const HEADINGS = ['tile', 'SiO2', 'Al2O3', 'B2O3', 'K2O', 'CaO', 'firing', 'shelf', 'surface'];
const odd = filesOf({
  'tiles.csv': csvOf([
    [...HEADINGS, 'drip', 'cone', 'body'],
    ...Array.from({ length: 24 }, (_, i) => [
      `T${i}`,
      ...GLAZE,
      `F${(i % 4) + 1}`,
      ['top', 'attic', 'cellar'][i % 3],
      i % 2 === 0 ? 'underfired' : 'overfired',
      i % 2 === 0 ? 'melted' : 'unmelted',
      i === 7 ? '06' : i === 11 ? '42' : '',
      `Clay ${i % 7}`,
    ]),
  ]),
  'firings.csv': csvOf([
    ['firing', 'kiln', 'set_cone', 'peak_c'],
    ['F1', 'Big', 6, 1300],
    ['F2', 'big', 6, 1140],
    ['F3', 'Big', 6, 1304],
    ['F4', 'Small', 6, 1222],
    ['f4', 'Small', 6, 1222],
  ]),
  'witness.csv': csvOf([
    ['firing', 'shelf', 'cone'],
    ...['F1', 'F2', 'F3', 'F4'].flatMap((firing) => [
      [firing, 'top', 7],
      [firing, 'middle', 6],
      [firing, 'bottom', '06'],
    ]),
  ]),
  'bodies.csv': 'body\nClay\n',
});

describe('the order of rows changes nothing that check and unity say', () => {
  it.each([
    ['the demo studio', demo],
    ['an archive full of odd and tied things', odd],
  ])('%s', (_, files) => {
    const before = told(files);
    for (const seed of [1, 2, 3]) {
      const after = told(shuffled(files, byLot(seed)));
      expect(after.page).toBe(before.page);
      expect(after).toEqual(before);
    }
  });

  it('and the rows were in another order', () => {
    const tiles = (files: Files) => readArchive(files).archive.tiles.map(({ tile }) => tile);
    expect(tiles(shuffled(demo, byLot(1)))).not.toEqual(tiles(demo));
    expect(tiles(shuffled(demo, byLot(1))).sort()).toEqual(tiles(demo).sort());
  });

  it('the odd archive has what is to be put in order', () => {
    const text = told(odd).page.replace(/\s+/g, ' ');
    expect(text).toContain('peaks that do not fit the cone: F2');
    expect(text).toContain('witness cones unlike the others of their load');
    expect(text).toContain('kilns "Big" and "big" are taken as two');
    expect(text).toContain('no witness cone was read on');
    expect(text).toContain('drip and surface contradict each other');
  });
});
