import { describe, expect, it } from 'vitest';
import { inventory } from '../../src/archive/inventory.ts';
import { compositionDoubts } from '../../src/archive/odd-compositions.ts';
import { readArchive } from '../../src/archive/read-archive.ts';
import { csvOf, filesOf } from '../support/builders.ts';

type Row = readonly (string | number)[];
const read = (headings: readonly string[], rows: readonly Row[]) =>
  readArchive(filesOf({ 'a.csv': csvOf([headings, ...rows]) }));
const doubts = (headings: readonly string[], rows: readonly Row[]) => {
  const { archive, faults } = read(headings, rows);
  expect(faults).toEqual([]);
  return compositionDoubts(archive);
};
const HEAD = ['tile', 'cone', 'surface', 'SiO2', 'Al2O3', 'K2O', 'CaO'];
const WHOLE = [...HEAD, 'B2O3'];

describe('a column that is not there', () => {
  it('is noted for boron and for the alkalis, in one note', () => {
    const head = ['tile', 'cone', 'surface', 'SiO2', 'Al2O3', 'CaO'];
    const rows = [
      ['A', 6, 'gloss', 3, 0.4, 1],
      ['B', 6, 'matte', 2, 0.4, 1],
    ];
    expect(doubts(head, rows)).toEqual([
      'a.csv: no B2O3 column, no K2O or Na2O column: read as 0 for all 2 tiles given by oxides',
    ]);
  });

  it('is not noted where it is there, though its cells are nought', () => {
    expect(doubts(WHOLE, [['A', 6, 'gloss', 3, 0.4, 0, 1, 0]])).toEqual([]);
  });

  it('does not matter to tiles made of recipes', () => {
    const { archive } = readArchive(
      filesOf({
        'tiles.csv': 'tile,recipe,cone,surface\nA,Clear,6,gloss\n',
        'recipes.csv': 'recipe,material,parts\nClear,Albite,50\nClear,Calcite,50\n',
        'materials.csv': 'material,formula\nAlbite,NaAlSi3O8\nCalcite,CaCO3\n',
      }),
    );
    expect(compositionDoubts(archive)).toEqual([]);
  });
});

describe('weight per cent in the place of moles', () => {
  // By hand: 66/60.083 = 1.0985, 14/101.961 = 0.1373, 7/94.195 = 0.0743, 13/56.077 = 0.2318 mol;
  // the flux is 0.3061, so SiO2 is 3.59 and Al2O3 0.45. As moles the flux is 20: 3.30 and 0.70.
  const weights = (tile: string): Row => [tile, 6, 'gloss', 66, 14, 7, 13, 0];
  const moles = (tile: string): Row => [tile, 6, 'gloss', 3, 0.4, 0.3, 0.7, 0];

  it('is pointed out, with the first tile by name read both ways, in any order of rows', () => {
    const note =
      'a.csv: 2 of 3 tiles: oxides sum to about 100, as weight per cent and mole per cent do. "A" is read ' +
      'as moles: SiO2 3.30, Al2O3 0.70; if these are weight per cent it would be SiO2 3.59, Al2O3 0.45: ' +
      'divide each by its molar mass';
    const rows = [weights('B'), moles('C'), weights('A')];
    expect(doubts(WHOLE, rows)).toEqual([note]);
    expect(doubts(WHOLE, [...rows].reverse())).toEqual([note]);
  });

  it('is not suspected of a few rows', () => {
    expect(doubts(WHOLE, [weights('A'), moles('B')])).toEqual([]);
  });

  it('is seen in what the moles would make, whatever the sum', () => {
    const rows: Row[] = [['A', 6, 'gloss', 20, 7, 0, 4, 0]];
    const [note = ''] = doubts([...HEAD.slice(0, -1), 'MgO', 'B2O3'], rows);
    expect(note).toContain('oxides make no usual glaze as moles, but do as weight per cent');
  });
});

describe('formulas that no glaze has', () => {
  it('are named by tile, in the doubts and in what is worth a second look', () => {
    const rows: Row[] = [
      ['Z', 6, 'gloss', 340, 0.4, 0.3, 0.7, 0],
      ['B', 6, 'gloss', 3.4, 0.4, 0.3, 0.7, 0],
      ['A', 6, 'matte', 3.4, 4.2, 0.3, 0.7, 0],
    ];
    const said =
      'no glaze has such a formula: "A" (Al2O3 4.2) and "Z" (SiO2 340); glazes lie within SiO2 0.5 to ' +
      '15, Al2O3 up to 3, B2O3 up to 3 moles per mole of flux (common practice)';
    expect(doubts(WHOLE, rows)).toEqual([said]);
    expect(doubts(WHOLE, [...rows].reverse())).toEqual([said]);
    expect(inventory(read(WHOLE, rows).archive).odd).toContain(said);
  });
});
