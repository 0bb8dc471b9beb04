import { describe, expect, it } from 'vitest';
import { ModelFileError } from '../../src/errors.ts';
import { fitModel } from '../../src/model/fit.ts';
import { modelText, parseModel } from '../../src/model/model-file.ts';
import type { Model } from '../../src/model/model.ts';
import { anArchive, aTile } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const tiles = [
  ...inventedTiles({ tiles: 40, seed: 4 }),
  aTile({
    tile: 'odd',
    verdict: 'unjudged',
    other: JSON.parse('{"__proto__":"kept","":"x"}') as Record<string, string>,
  }),
];
const model = fitModel(anArchive(tiles));
const text = modelText(model);

/** The model's text with one change to its data. */
function changed(change: (data: Record<string, never>) => void): string {
  const data = JSON.parse(text) as Record<string, never>;
  change(data);
  return JSON.stringify(data);
}
type Data = Record<string, Record<string, unknown[]>>;
/** The text with one change to the radial columns of melting. */
function changedRadial(change: (radial: { centres: number[][]; factorLower: number[] }) => void) {
  return changed((d) => {
    change((d as Data)['melt']['radial'] as unknown as Parameters<typeof change>[0]);
  });
}
const centres = model.melt.radial.centres.length;
const factorCells = (centres * (centres + 1)) / 2;

it('comes back from its text whole, and then byte for byte', () => {
  const again = modelText(parseModel(text));
  expect(JSON.parse(again)).toEqual(JSON.parse(text));
  expect(modelText(parseModel(again))).toBe(again);
});

it('gives the same text for the same archive in any order of rows', () => {
  const turned = fitModel(anArchive([...tiles].reverse()));
  expect(modelText({ ...turned, archive: model.archive })).toBe(text);
});

it('keeps columns with the names of object internals as data', () => {
  const other = parseModel(text).archive.tiles.find(({ tile }) => tile === 'odd')!.other!;
  expect(Object.getOwnPropertyNames(other)).toEqual(['__proto__', '']);
  expect(({} as Record<string, unknown>)['kept']).toBeUndefined();
});

it('is refused by the writer if a number is not finite', () => {
  const broken: Model = { ...model, logEvidence: Number.NaN };
  expect(() => modelText(broken)).toThrow('finite numbers only, logEvidence is NaN');
  const far: Model = { ...model, loadSpread: { ...model.loadSpread, offsetScaleCones: Infinity } };
  expect(() => modelText(far)).toThrow('finite numbers only, offsetScaleCones is Infinity');
});

describe('a file that is no model', () => {
  it.each([
    ['nothing', '', 'no JSON or was cut off'],
    ['a cut file', text.slice(0, text.length / 2), 'no JSON or was cut off'],
    ['a list', '[]', 'found schema none'],
    ['null', 'null', 'found schema none'],
    [
      'other JSON',
      '{"schema":"coneshift.predictions/1"}',
      'found schema "coneshift.predictions/1"',
    ],
    ['a later version', text.replace('model/1', 'model/2'), 'found schema "coneshift.model/2"'],
    ['a bare schema', '{"schema":"coneshift.model/1"}', 'the model file is damaged'],
    ['deep nesting', `${'['.repeat(5000)}${']'.repeat(5000)}`, 'found schema none'],
  ])('is told from one: %s', (_, given, message) => {
    expect(() => parseModel(given)).toThrow(ModelFileError);
    expect(() => parseModel(given)).toThrow(message);
  });
});

describe('a damaged model', () => {
  it('had centres: some of the damages are to them', () => {
    expect(centres).toBeGreaterThan(1);
  });

  const damages: readonly (readonly [string, string, string])[] = [
    ['an unknown key', changed((d) => Object.assign(d, { run: 'x' })), 'Unrecognized key: "run"'],
    ['a number turned null', text.replace('"sd":', '"sd":null,"x":'), 'melt.groups.0.sd'],
    ['a fingerprint', text.replace('sha256:', 'sha1:'), 'archive.fingerprint: expected sha256'],
    [
      'an unknown oxide',
      changed((d) =>
        Object.assign((d as Data)['archive']['tiles'][0] as object, { unity: { XO: 1 } }),
      ),
      'archive.tiles.0.unity',
    ],
    [
      'an impossible cone',
      changed((d) => {
        const tile = (d as Data)['archive']['tiles'][0] as { heat: { cone: string } };
        tile.heat.cone = '99';
      }),
      'archive.tiles.0.heat.cone: expected a cone',
    ],
    ['a column', text.replace('"SiO2^2"', '"SiO2^3"'), 'melt.columns: expected 1 SiO2'],
    [
      'a weight too few',
      changed((d) => (d as Data)['gloss']['mean'].pop()),
      `gloss.mean: expected ${model.gloss.mean.length} numbers, got ${model.gloss.mean.length - 1}`,
    ],
    [
      'a covariance cell too few',
      changed((d) => (d as Data)['melt']['covarianceLower'].pop()),
      `expected ${model.melt.covarianceLower.length} numbers, got`,
    ],
    [
      'a centre with a number too few',
      changedRadial((radial) => radial.centres[0].pop()),
      'melt.radial.centres.0: expected 7 numbers, got 6',
    ],
    [
      'a centre too few',
      changedRadial((radial) => radial.centres.pop()),
      `melt.mean: expected ${22 + centres} numbers, got ${23 + centres}`,
    ],
    [
      'a factor cell too few',
      changedRadial((radial) => radial.factorLower.pop()),
      `melt.radial.factorLower: expected ${factorCells} numbers, got ${factorCells - 1}`,
    ],
    [
      'a factor that is none',
      changedRadial((radial) => {
        radial.factorLower[2] = -0.5;
      }),
      'melt.radial.factorLower: expected a positive diagonal',
    ],
    [
      'a share of wrong verdicts above 1',
      changed((d) => Object.assign((d as Data)['gloss'], { wrongVerdicts: 1.01 })),
      'gloss.wrongVerdicts',
    ],
    [
      'a spread of loads below 0',
      text.replace('"offsetScaleCones":', '"offsetScaleCones":-'),
      'loadSpread.offsetScaleCones',
    ],
    [
      'a weight changed by hand',
      changed((d) => {
        (d as Data)['melt']['mean'][1] = -3;
      }),
      'it was changed after it was written',
    ],
    [
      'a covariance that is none',
      changed((d) => {
        (d as Data)['melt']['covarianceLower'][2] = -1;
      }),
      'not positive definite',
    ],
    ['a tile too few', changed((d) => (d as Data)['archive']['tiles'].pop()), 'counts that add up'],
  ];

  it.each(damages)('is refused: %s', (_, given, message) => {
    expect(() => parseModel(given)).toThrow(ModelFileError);
    expect(() => parseModel(given)).toThrow(message);
  });

  it('ends with exit code 3, says what to do, and stays short', () => {
    const broken = changed((d) => {
      for (const tile of (d as Data)['archive']['tiles'] as { line: unknown }[]) tile.line = 'x';
    });
    try {
      parseModel(broken);
      expect.unreachable();
    } catch (error) {
      expect(error).toMatchObject({
        exitCode: 3,
        hint: expect.stringContaining('coneshift fit') as string,
      });
      expect((error as Error).message.split('\n')).toHaveLength(10);
    }
  });
});
