import { describe, expect, it } from 'vitest';
import type { Archive } from '../../src/archive/archive.ts';
import { inventory } from '../../src/archive/inventory.ts';
import type { Fault } from '../../src/errors.ts';
import { fitModel } from '../../src/model/fit.ts';
import type { HeldOut, LoadEffect, Model } from '../../src/model/model.ts';
import { fitAnswer, unityAnswer } from '../../src/render/answers-json.ts';
import { checkPage } from '../../src/render/check-page.ts';
import { fitPage } from '../../src/render/fit-page.ts';
import { loadSection } from '../../src/render/load-sections.ts';
import { PLAIN_LOOK } from '../../src/render/page.ts';
import { textWidth } from '../../src/render/printable.ts';
import { unityPage } from '../../src/render/unity-page.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';

const joined = (page: string) => page.replace(/\s+/g, ' ');
const widest = (page: string) => Math.max(...page.split('\n').map(textWidth));
const check = (archive: Archive, faults: readonly Fault[] = []) =>
  checkPage({ archive, faults }, inventory(archive), PLAIN_LOOK);
const aFault = (line: number): Fault => ({
  file: 'tiles.csv',
  line,
  column: 'cone',
  message: 'expected a cone from 022 to 42 such as 6, 06 or 6.5, got "x"',
});

describe('the page of check', () => {
  it('says what became of every row, then lists every fault at the end', () => {
    const counts = { read: 53, fitted: 1, unjudged: 1, setAside: 1, refused: 50 };
    const tiles = [
      aTile(),
      aTile({ tile: 'U', verdict: 'unjudged' }),
      aTile({ tile: 'O', verdict: 'overfired' }),
    ];
    const faults = Array.from({ length: 50 }, (_, i) => aFault(i + 5));
    const page = check(anArchive(tiles, { counts }), faults);
    expect(page.split('\n').slice(0, 2)).toEqual([
      '53 tiles read = 1 fitted + 1 unjudged + 1 set aside + 50 refused',
      '50 faults, listed at the end; mend them, then fit.',
    ]);
    expect(page.match(/^ {2}tiles\.csv:\d+ cone: expected a cone/gm)).toHaveLength(50);
    expect(joined(page).trimEnd().endsWith('got "x"')).toBe(true);
    expect(page).not.toContain('can be fitted');
  });

  it('shows loads kiln by kiln with readings, and loads that firings.csv does not know', () => {
    const tiles = [aTile({ firing: 'K1' }), aTile({ tile: 'B', firing: 'Label' })];
    const firings = [
      { firing: 'K1', line: 2, date: '2024-05-01', kiln: 'North', setCone: '6', cone: '5.5' },
      { firing: 'K2', line: 3, date: '2024-06-01', kiln: 'North', setCone: '6' },
    ];
    const page = check(anArchive(tiles, { firings }));
    expect(page).toMatch(/K1 +2024-05-01 +6 +5\.5 +-0\.50 +\. +\. +1 +\./);
    expect(page).toMatch(/K2 +2024-06-01 +6 +- +- +\. +\. +\. +\./);
    expect(joined(page)).toContain('it reads 0.50 cone below what it was set to');
    expect(page).toMatch(/Other loads\n.*\n +Label +\. +\. +1 +\./);
  });

  it('neutralises names and fits 80 columns however long they are', () => {
    const long = `${'Glaze '.repeat(30)}\u001b[31m`;
    const tiles = [aTile({ recipe: long, firing: long })];
    const firings = [
      { firing: long, line: 2, date: '2024-05-01', kiln: 'N', setCone: '05.5', cone: '06' },
    ];
    const recipes = [{ recipe: long, lines: [], unity: { SiO2: 3, CaO: 1 } }];
    const page = check(anArchive(tiles, { firings, recipes, notes: [long] }), [
      { ...aFault(2), message: long },
    ]);
    expect(page).not.toContain('\u001b');
    expect(widest(page)).toBeLessThanOrEqual(80);
  });

  it('does not promise a fit where no tile is judged', () => {
    const page = joined(check(anArchive([aTile({ verdict: 'unjudged' })])));
    expect(page).toContain(
      'No faults, but no judged tile: fit will answer from the prior alone, from what is usual ' +
        'elsewhere; nothing is learnt yet.',
    );
    expect(page).not.toContain('can be fitted');
    expect(joined(check(anArchive()))).not.toContain('can be fitted');
    expect(check(anArchive([aTile()]))).toContain('No faults: the archive can be fitted.');
  });

  it('says in what order it took the firings of a kiln that lack a date', () => {
    const cones = ['6', '5.8', '5.6'];
    const firings = (date?: string) =>
      cones.map((cone, i) => ({
        ...{ firing: `K${i}`, line: 2, kiln: 'North', setCone: '6', cone },
        ...(date === undefined ? {} : { date: `${date}${i + 1}` }),
      }));
    const words = 'taken by name: not all have a date';
    expect(joined(check(anArchive([], { firings: firings() })))).toContain(words);
    expect(joined(check(anArchive([], { firings: firings('2024-05-0') })))).not.toContain(words);
  });

  it('bears an archive without tiles', () => {
    expect(check(anArchive())).toContain('0 tiles read = 0 fitted');
  });
});

const NOTHING: HeldOut = {
  logScore: null,
  baseRateLogScore: null,
  folds: 0,
  tiles: 0,
  sure: { called: 0, right: 0 },
  reliability: [],
  parts: [],
};
const byCone: HeldOut = {
  logScore: Math.log(0.5),
  baseRateLogScore: Math.log(0.3),
  folds: 2,
  tiles: 130,
  sure: { called: 120, right: 113 },
  reliability: [{ from: 0.9, to: 1, tiles: 120, stated: 0.95, right: 113 / 120 }],
  parts: [
    { leftOut: 'cone 5', tiles: 60, logScore: -0.8, baseRateLogScore: -1.3 },
    { leftOut: 'cone 6', tiles: 70, logScore: -0.6, baseRateLogScore: -1.1 },
  ],
};
const model = fitModel(
  anArchive([
    aTile({ tile: 'A', firing: 'K1' }),
    aTile({ tile: 'B', firing: 'K2', heat: aHeat('5'), verdict: 'underfired' }),
  ]),
);
const withValidation = (given: Partial<Model['validation']>): Model => ({
  ...model,
  validation: { byCone, byLoad: NOTHING, byGlaze: NOTHING, notes: [], ...given },
});

describe('the page of fit', () => {
  it('tells in words and numbers how it holds by cone', () => {
    const page = fitPage({ model: withValidation({}), leftOut: [] }, PLAIN_LOOK);
    expect(joined(page)).toContain('a probability of 0.50 (geometric mean), better than the 0.30');
    expect(joined(page)).toContain('Of 120 tiles called 90 % sure or more, 113 were right.');
    expect(page).toMatch(/cone +2 +130 +-0\.69 +-1\.20 +120 +113 \(94 %\)/);
    expect(page).toMatch(/90 to 100 % +113 of 120 \(94 %\)/);
    expect(page).toMatch(/^ +load +-$/m);
    expect(page).toMatch(/cone 5 +60 +-0\.80 +-1\.30/);
  });

  it('does not hide that it holds no better than the shares of the surfaces', () => {
    const worse = { ...byCone, logScore: Math.log(0.25), sure: { called: 0, right: 0 } };
    const page = joined(
      fitPage({ model: withValidation({ byCone: worse }), leftOut: [] }, PLAIN_LOOK),
    );
    expect(page).toContain('a probability of 0.25 (geometric mean), NO better than the 0.30');
    expect(page).toContain('It called no tile 90 % sure.');
  });

  it('says what a group is, and how many shared a turn', () => {
    const part = { tiles: 5, logScore: -0.7, baseRateLogScore: -1 };
    const byGlaze = {
      ...byCone,
      folds: 2,
      parts: ['glazes 1 (3)', 'glazes 2 (8)'].map((leftOut) => ({ ...part, leftOut })),
    };
    const outcome = { model: withValidation({ byGlaze }), leftOut: [], detail: true };
    const page = fitPage(outcome, PLAIN_LOOK);
    expect(joined(page)).toContain(
      'A group: all tiles of a cone (6.5 counts to 7), of a load, or of a glaze (a recipe, a formula or ' +
        'a blend). To save time, the 11 glazes in 2 lots.',
    );
    expect(page).toMatch(/lot 1: 3 glazes +5 /);
    expect(page).toMatch(/lot 2: 8 glazes +5 /);
  });

  it('warns that so few tiles say almost nothing, on the page and in the notes of the JSON', () => {
    const few = { ...byCone, tiles: 3 };
    const said = '3 judged tiles: so few say almost nothing about how the model holds';
    const outcome = { model: withValidation({ byCone: few }), leftOut: [] };
    expect(joined(fitPage(outcome, PLAIN_LOOK))).toContain(said);
    expect(fitAnswer(outcome).notes.join()).toContain(said);
    const enough = { model: withValidation({}), leftOut: [] };
    expect(joined(fitPage(enough, PLAIN_LOOK))).not.toContain('so few');
  });

  it('says where the tiles were fired, also where none names its firing', () => {
    const words = (tiles: readonly ReturnType<typeof aTile>[]) =>
      joined(fitPage({ model: fitModel(anArchive(tiles)), leftOut: [] }, PLAIN_LOOK));
    const [named, alone] = [aTile({ tile: 'A', firing: 'K1' }), aTile({ tile: 'B' })];
    expect(words([named])).toContain('The tiles were fired in 1 load.');
    expect(words([alone])).toContain('No tile names its firing: each counts as a load of its own.');
    expect(words([named, alone])).toContain('fired in 1 load, and 1 without a firing');
  });

  it('says that one cone cannot be tested', () => {
    const page = fitPage({ model: withValidation({ byCone: NOTHING }), leftOut: [] }, PLAIN_LOOK);
    expect(joined(page)).toContain(
      'All tiles are of one cone: how well one cone is told from another',
    );
  });

  it('says where the model went, that rows were left out, and the sds only in detail', () => {
    const outcome = { model, leftOut: [aFault(3)], writtenTo: 'my\u0007.json' };
    const page = fitPage(outcome, PLAIN_LOOK);
    expect(page).toContain('Model written to my\\x07.json');
    expect(page).toContain('rows with faults were left out (1 fault; check lists them)');
    expect(page).not.toContain('sd of each group');
    expect(fitPage({ ...outcome, detail: true }, PLAIN_LOOK)).toContain(
      'Melting: sd of each group',
    );
    expect(fitPage({ model, leftOut: [] }, PLAIN_LOOK)).toContain('No model was written');
    expect(fitAnswer({ model, leftOut: [] }).writtenTo).toBeNull();
  });
});

describe('loads that stand out', () => {
  const load = (name: string, offset: number, gloss = 0): LoadEffect => ({
    load: name,
    tiles: 9,
    offsetCones: { mean: offset, sd: 0.2 },
    glossLogOdds: { mean: gloss, sd: 0.5 },
  });
  const told = (...loads: readonly LoadEffect[]) => {
    const loadSpread = { offsetScaleCones: 0.21, glossSd: 0.5 };
    return joined(loadSection({ loads, loadSpread }, PLAIN_LOOK).lines.join(' '));
  };

  it('are those whose 90 % interval leaves out nought, told in cones', () => {
    const text = told(load('K1', -0.6), load('K2', 0.3));
    expect(text).toContain(
      'K1 (9 tiles): as if fired 0.6 cone cooler than its cone on paper (sd 0.2)',
    );
    expect(text).not.toContain('K2');
    expect(text).toContain('About two loads in three lie within 0.21 cone of their cone on paper');
    expect(text).toContain('may stand out by chance');
  });

  it('are told for gloss, too, and none is told as none', () => {
    expect(told(load('K1', 0), load('K2', 0, 1.4))).toContain(
      'K2 (9 tiles): more gloss than its heat explains (log-odds +1.4, sd 0.5)',
    );
    const none = told(load('K1', 0), load('K2', 0));
    expect(none).toContain('None. About two loads in three');
    expect(none).not.toContain('by chance');
  });
});

describe('the page of unity', () => {
  const unity = { SiO2: 3.5, Al2O3: 0.5, K2O: 0.3, CaO: 0.7, CuO: 0.04 };

  it('shows formula, ratio, alkali share and hazards', () => {
    const page = unityPage([{ recipe: 'Clear', unity }], PLAIN_LOOK);
    expect(page).toMatch(/Clear +3\.500 +0\.500 +\. +7\.0 +0\.30/);
    expect(page).toMatch(/K2O +CaO\n +Clear +0\.300 +0\.700/);
    expect(page).toContain('- Clear: holds copper.');
    expect(joined(page)).toContain('a licensed laboratory must leach-test the ware');
  });

  it('breaks many oxides into tables that fit, losing none', () => {
    const fluxes = ['Li2O', 'Na2O', 'K2O', 'MgO', 'CaO', 'SrO', 'BaO', 'ZnO', 'PbO', 'MnO'];
    const many = { ...unity, ...Object.fromEntries(fluxes.map((oxide) => [oxide, 0.1])) };
    const page = unityPage(
      [{ recipe: 'A name that is far too long for its column', unity: many }],
      PLAIN_LOOK,
    );
    expect(widest(page)).toBeLessThanOrEqual(80);
    expect(fluxes.filter((oxide) => !new RegExp(`\\b${oxide}\\b`).test(page))).toEqual([]);
    expect(page.match(/0\.100/g)).toHaveLength(10);
  });

  it('has no ratio without alumina, also in JSON', () => {
    const slip = { recipe: 'Slip', unity: { SiO2: 3, CaO: 1 } };
    expect(unityPage([slip], PLAIN_LOOK)).toMatch(/Slip +3\.000 +\. +\. +- +0\.00/);
    expect(unityAnswer([slip]).recipes[0]).toMatchObject({ silicaToAlumina: null, hazards: [] });
  });
});
