import { describe, expect, it } from 'vitest';
import { readArchive } from '../../src/archive/read-archive.ts';
import { faultLine } from '../../src/errors.ts';
import { csvOf, filesOf } from '../support/builders.ts';

const GLAZE = ['3.2', '0.42', '0.1', '0.2', '0.8'];
const HEADINGS = ['tile', 'SiO2', 'Al2O3', 'B2O3', 'K2O', 'CaO', 'firing', 'surface'];
const tilesCsv = (...rows: [string, string, string][]) =>
  csvOf([HEADINGS, ...rows.map(([tile, firing, surface]) => [tile, ...GLAZE, firing, surface])]);
const read = (texts: Readonly<Record<string, string>>) => {
  const { archive, faults } = readArchive(filesOf(texts));
  const { read: all, fitted, unjudged, setAside, refused } = archive.counts;
  expect(fitted + unjudged + setAside + refused).toBe(all);
  return { archive, faults: faults.map(faultLine), names: archive.tiles.map(({ tile }) => tile) };
};
const FIRINGS = 'firing,set_cone\nF1,6\nF2,6\n';

describe('a name that two rows give', () => {
  it('two tiles of one name: neither is fitted, whichever stands first', () => {
    const rows: [string, string, string][] = [
      ['A', 'F1', 'gloss'],
      ['B', 'F1', 'gloss'],
      ['A', 'F1', 'underfired'],
    ];
    const { faults, names, archive } = read({
      'tiles.csv': tilesCsv(...rows),
      'firings.csv': FIRINGS,
    });
    expect(faults).toEqual([
      'tiles.csv:2 tile: expected each tile once, got "A" in line 4 as well',
      'tiles.csv:4 tile: expected each tile once, got "A" in line 2 as well',
    ]);
    expect(names).toEqual(['B']);
    expect(archive.counts).toMatchObject({ read: 3, fitted: 1, refused: 2 });
  });

  it('a row repeated cell by cell is told as such', () => {
    const row: [string, string, string] = ['A', 'F1', 'gloss'];
    const { faults, names } = read({
      'tiles.csv': tilesCsv(row, ['B', 'F1', 'gloss'], row),
      'firings.csv': `${FIRINGS}F2,6\n`,
    });
    expect(faults).toEqual([
      'tiles.csv:2 tile: expected each tile once, got "A" in line 4 as well: an exact repeat',
      'tiles.csv:4 tile: expected each tile once, got "A" in line 2 as well: an exact repeat',
      'firings.csv:3 firing: expected each firing once, got "F2" in line 4 as well: an exact repeat',
      'firings.csv:4 firing: expected each firing once, got "F2" in line 3 as well: an exact repeat',
    ]);
    expect(names).toEqual(['B']);
  });

  it('of many, the message names some lines and counts the rest', () => {
    const rows = Array.from({ length: 9 }, (): [string, string, string] => ['A', 'F1', '']);
    const { faults } = read({ 'tiles.csv': tilesCsv(...rows), 'firings.csv': FIRINGS });
    expect(faults).toHaveLength(9);
    expect(faults[8]).toBe(
      'tiles.csv:10 tile: expected each tile once, got "A" in lines 2, 3, 4, 5, 6 and 3 others as ' +
        'well: an exact repeat',
    );
  });

  it('a firing given twice refuses its tiles, with a pointer', () => {
    const { faults, names } = read({
      'tiles.csv': tilesCsv(['A', 'F1', 'gloss'], ['B', 'F2', 'gloss']),
      'firings.csv': 'firing,set_cone\nF1,6\nF2,6\nF1,5\n',
    });
    expect(faults).toEqual([
      'tiles.csv:2 firing: expected a firing without faults, got "F1"; see firings.csv:2',
      'firings.csv:2 firing: expected each firing once, got "F1" in line 4 as well',
      'firings.csv:4 firing: expected each firing once, got "F1" in line 2 as well',
    ]);
    expect(names).toEqual(['B']);
  });

  it('a material given twice refuses the recipes of it, and their tiles', () => {
    const { faults, names } = read({
      'tiles.csv': csvOf([
        ['tile', 'recipe', 'cone', 'surface'],
        ['A', 'Clear', '6', 'gloss'],
        ['B', 'Plain', '6', 'gloss'],
      ]),
      'recipes.csv': csvOf([
        ['recipe', 'material', 'parts'],
        ['Clear', 'Spar', 60],
        ['Clear', 'Quartz', 40],
        ['Plain', 'Spar', 100],
      ]),
      'materials.csv': 'material,formula\nSpar,KAlSi3O8\nQuartz,SiO2\nQuartz,Al2O3\n',
    });
    expect(faults).toEqual([
      'tiles.csv:2 recipe: expected a recipe without faults, got "Clear"; see recipes.csv:3',
      'recipes.csv:3 material: expected a material without faults, got "Quartz"; see materials.csv:3',
      'materials.csv:3 material: expected each material once, got "Quartz" in line 4 as well',
      'materials.csv:4 material: expected each material once, got "Quartz" in line 3 as well',
    ]);
    expect(names).toEqual(['B']);
  });
});

describe('a line of a recipe given twice', () => {
  const recipes = (...lines: [string, string, number][]) => ({
    'tiles.csv': 'tile,recipe,cone,surface\nA,Clear,6,gloss\n',
    'recipes.csv': csvOf([['recipe', 'material', 'parts'], ...lines]),
    'materials.csv': 'material,formula\nSpar,KAlSi3O8\nQuartz,SiO2\n',
  });

  it('to the last cell is a fault: the material would count twice', () => {
    const { faults, names } = read(
      recipes(['Clear', 'Spar', 60], ['Clear', 'Quartz', 20], ['Clear', 'Quartz', 20]),
    );
    expect(faults).toEqual([
      'tiles.csv:2 recipe: expected a recipe without faults, got "Clear"; see recipes.csv:3',
      'recipes.csv:3 material: expected each material of "Clear" once, got "Quartz" in line 4 as well: an exact repeat',
      'recipes.csv:4 material: expected each material of "Clear" once, got "Quartz" in line 3 as well: an exact repeat',
    ]);
    expect(names).toEqual([]);
  });

  it('with other parts is none: both count, and a note says so', () => {
    const { archive, faults } = read(
      recipes(['Clear', 'Spar', 60], ['Clear', 'Quartz', 20], ['Clear', 'Quartz', 5]),
    );
    expect(faults).toEqual([]);
    expect(archive.notes).toContain(
      'recipes.csv: recipe "Clear" lists "Quartz" in lines 3 and 4; all count',
    );
  });
});
