import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseArchive } from '../../src/archive/read-archive.ts';
import { ModelFileError } from '../../src/errors.ts';
import { fitModel } from '../../src/model/fit.ts';
import { modelText, parseModel } from '../../src/model/model-file.ts';
import { predict } from '../../src/predict/predict.ts';
import { filesOf } from '../support/builders.ts';

/** An archive that uses every file and every optional column. */
const FILES = {
  'tiles.csv': [
    'tile,recipe,firing,cone,surface,drip,crazing,shivering,body,shelf,thickness_mm,gloss_units,judged_by,note,blend,colour',
    'A1,White,F1,,gloss,melted,fine,no,Stone,top,1.2,85,EV,"a note, with comma",line 1,blue',
    'A2,White,F1,5.5,matte,,none,yes,Stone,low,0.8,12,EV,,line 1,',
    'A3,Dry,F2,,underfired,unmelted,,,,,,,,,,',
    'A4,White,F2,,overfired,,,,,,,,,,,',
    'A5,Dry,,7,,,,,,,,,,,,',
    'A6,White,F2,,melted,,,,,,,,,,,',
  ],
  'firings.csv': [
    'firing,date,kiln,set_cone,cone,peak_c,hold_min,cooling_c_per_h,atmosphere,log,mood',
    'F1,2024-02-03,North,6,5.8,1215,12,90,oxidation,,calm',
    'F2,2024-03-03,South,6,,1220,10,120,reduction,,',
  ],
  'witness.csv': ['firing,shelf,cone', 'F1,top,6', 'F1,low,5.5'],
  'recipes.csv': [
    'recipe,material,parts,over_100',
    'White,Potash feldspar,40,',
    'White,Quartz,28,',
    'White,Chalk,20,',
    'White,Kaolin,12,',
    'White,Cobalt carbonate,1,yes',
    'Dry,Potash feldspar,20,',
    'Dry,Chalk,15,',
    'Dry,Kaolin,65,',
  ],
  'materials.csv': [
    'material,SiO2,Al2O3,K2O,Na2O,CaO,loi,basis,formula,soluble',
    'Potash feldspar,66,18.5,11,3.5,0.5,0.5,raw,,',
    'Quartz,,,,,,,,SiO2,',
    'Chalk,,,,,,,,CaCO3,',
    'Kaolin,,,,,,,,Al2Si2O5(OH)4,no',
    'Cobalt carbonate,,,,,,,,CoCO3,',
  ],
  'bodies.csv': ['body,cone,absorption_pct,expansion_per_k', 'Stone,6,1.5,0.0000058'],
};
const bytes = filesOf(
  Object.fromEntries(Object.entries(FILES).map(([file, lines]) => [file, lines.join('\n') + '\n'])),
);
const model = fitModel(parseArchive(bytes));
const text = modelText(model);

type Json = null | boolean | number | string | Json[] | { [key: string]: Json };
type Path = readonly (string | number)[];

/** Every value in the file, by the way to it. */
function pathsOf(value: Json, path: Path = []): Path[] {
  if (typeof value !== 'object' || value === null) return [path];
  const entries: [string | number, Json][] = Array.isArray(value)
    ? value.map((entry, i) => [i, entry])
    : Object.entries(value);
  return [path, ...entries.flatMap(([key, entry]) => pathsOf(entry, [...path, key]))];
}

function withChange(path: Path, change: (holder: { [key: string]: Json }, key: string) => void) {
  const data = JSON.parse(text) as { [key: string]: Json };
  let holder: { [key: string]: Json } = data;
  for (const key of path.slice(0, -1)) holder = holder[key] as { [key: string]: Json };
  change(holder, String(path.at(-1)));
  return JSON.stringify(data);
}

/** The file is read, or refused as damaged: never a bug. */
function reading(given: string): 'read' | 'refused' {
  try {
    parseModel(given);
    return 'read';
  } catch (error) {
    expect(error).toBeInstanceOf(ModelFileError);
    expect((error as ModelFileError).exitCode).toBe(3);
    return 'refused';
  }
}

const data = JSON.parse(text) as Json;
const paths = pathsOf(data).filter((path) => path.length > 0);
const anyPath = fc.constantFrom(...paths);
const isOther = (path: Path) => path.includes('other');

describe('a model of an archive with every file and column', () => {
  it('uses them', () => {
    expect(model.archive.counts).toMatchObject({ read: 6, fitted: 4, unjudged: 1, setAside: 1 });
    expect(model.archive.tiles[0].other).toEqual({ colour: 'blue' });
    expect(model.archive.firings[0].other).toEqual({ mood: 'calm' });
    for (const list of ['firings', 'witness', 'recipes', 'materials', 'bodies'] as const) {
      expect(model.archive[list].length).toBeGreaterThan(0);
    }
  });

  it('comes back byte for byte, and answers the same', () => {
    const back = parseModel(text);
    expect(modelText(back)).toBe(text);
    const point = { point: 'P', unity: model.archive.recipes[0].unity };
    expect(predict(back, [point], [5, 6])).toEqual(predict(model, [point], [5, 6]));
  });
});

describe('damage of any kind', () => {
  it('by cutting the text anywhere is refused', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: text.trimEnd().length - 1 }), (length) => {
        expect(reading(text.slice(0, length))).toBe('refused');
      }),
      { numRuns: 60, seed: 5 },
    );
  });

  it('by turning any number into null or text is refused, but where null says "no folds"', () => {
    const numbers = paths.filter((path) => typeof valueAt(path) === 'number');
    const nullable = new Set(['logScore', 'baseRateLogScore', 'stated', 'right']);
    fc.assert(
      fc.property(fc.constantFrom(...numbers), fc.constantFrom(null, '1', true), (path, value) => {
        const given = withChange(path, (holder, key) => {
          holder[key] = value;
        });
        const mayBeNull = value === null && nullable.has(String(path.at(-1)));
        if (!mayBeNull) expect(reading(given)).toBe('refused');
      }),
      { numRuns: 120, seed: 6 },
    );
  });

  it('by a key that does not belong is refused everywhere but among the kept columns', () => {
    const holders = paths.filter((path) => {
      const value = valueAt(path);
      return typeof value === 'object' && value !== null && !Array.isArray(value);
    });
    fc.assert(
      fc.property(fc.constantFrom(...holders), (path) => {
        if (isOther(path)) return;
        const given = withChange([...path, 'x'], (holder) => {
          holder['unknownKey'] = 1;
        });
        expect(reading(given)).toBe('refused');
      }),
      { numRuns: 80, seed: 7 },
    );
  });

  it('by deleting any value is refused, or leaves a model that can be asked', () => {
    const point = { point: 'P', unity: model.archive.recipes[0].unity };
    fc.assert(
      fc.property(anyPath, (path) => {
        const given = withChange(path, (holder, key) => {
          if (Array.isArray(holder)) holder.splice(Number(key), 1);
          else Reflect.deleteProperty(holder, key);
        });
        if (reading(given) === 'refused') return;
        const [answer] = predict(parseModel(given), [point], [6]).predictions;
        expect(Number.isFinite(answer.probability.gloss)).toBe(true);
      }),
      { numRuns: 120, seed: 8 },
    );
  });

  it.each([
    ['at the top', '{"schema"', '{"__proto__":{"polluted":1},"schema"'],
    ['in a tile', '"tile":"A1"', '"__proto__":{"polluted":1},"tile":"A1"'],
    ['in a stage', '"melt":{', '"melt":{"__proto__":{"polluted":1},'],
    ['as a constructor', '"melt":{', '"melt":{"constructor":{"prototype":{"polluted":1}},'],
  ])('by keys of object internals %s is refused, and taints nothing', (_, from, to) => {
    expect(text).toContain(from);
    expect(reading(text.replace(from, to))).toBe('refused');
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });

  it('by nesting deeper than any stack is refused', () => {
    const deep = `${'['.repeat(200_000)}${']'.repeat(200_000)}`;
    expect(reading(text.replace('"note":"a note, with comma"', `"note":${deep}`))).toBe('refused');
    expect(reading(text.replace('"colour":"blue"', `"colour":${deep}`))).toBe('refused');
    expect(reading(deep)).toBe('refused');
  });

  it.each(['melt', 'gloss'] as const)('of the covariance of %s is refused', (stage) => {
    const { covarianceLower } = model[stage];
    const scaled = covarianceLower.map((cell, i) => (i === 1 ? 1e3 : cell));
    const given = withChange([stage, 'covarianceLower'], (holder, key) => {
      holder[key] = scaled;
    });
    expect(() => parseModel(given)).toThrow(`${stage}.covarianceLower: expected a covariance`);
  });
});

function valueAt(path: Path): Json {
  return path.reduce<Json>((value, key) => (value as { [key: string]: Json })[key], data);
}
