import { describe, expect, it } from 'vitest';
import { readTable } from '../../src/archive/csv-table.ts';
import { mapHeadings } from '../../src/archive/headings.ts';
import { OXIDES } from '../../src/chemistry/oxides.ts';
import { readArchive } from '../../src/archive/read-archive.ts';
import { faultLine } from '../../src/errors.ts';
import { bytesOf, filesOf } from '../support/builders.ts';

const KNOWN = ['tile', 'recipe', ...OXIDES, 'firing', 'cone', 'surface', 'thickness_mm', 'note'];
const map = (headings: string, known: readonly string[] = KNOWN) => {
  const read = readTable('a.csv', bytesOf(`${headings}\n`));
  if ('fault' in read) throw new Error(read.fault.message);
  return mapHeadings(read.table, known);
};

describe('mapHeadings', () => {
  it('finds known columns in any order, and keeps unknown ones', () => {
    const { places, unknown, faults, notes } = map('cone,SiO2,colour,__proto__,tile');
    expect([...places]).toEqual([
      ['cone', 0],
      ['SiO2', 1],
      ['tile', 4],
    ]);
    expect(unknown).toEqual([
      { heading: 'colour', place: 2 },
      { heading: '__proto__', place: 3 },
    ]);
    expect([faults, notes]).toEqual([[], []]);
  });

  it('accepts other capitals and lowered digits, and says so', () => {
    const { places, notes } = map('Tile,SIO2,Al₂O₃');
    expect([...places.keys()]).toEqual(['tile', 'SiO2', 'Al2O3']);
    expect(notes).toEqual([
      'a.csv: heading "Tile" read as tile',
      'a.csv: heading "SIO2" read as SiO2',
      'a.csv: heading "Al₂O₃" read as Al2O3',
    ]);
  });

  it.each([
    ['surfce', 'expected a known column, got "surfce"; nearest known: surface'],
    ['notes', 'expected a known column, got "notes"; nearest known: note'],
    ['Si02', 'expected a known column, got "Si02"; nearest known: SiO2'],
    ['A1203', 'expected a known column, got "A1203"; nearest known: Al2O3'],
    ['thickness mm', 'expected a known column, got "thickness mm"; nearest known: thickness_mm'],
    ['FeO', 'expected an oxide that is known, got "FeO"; nearest known: Fe2O3'],
    ['MnO2', 'expected an oxide that is known, got "MnO2"; nearest known: MnO'],
    ['SiO2 %', 'expected an oxide that is known, got "SiO2 %"; nearest known: SiO2'],
    ['SiO2_wt', 'expected an oxide that is known, got "SiO2_wt"; nearest known: SiO2'],
    ['KNaO', 'expected an oxide that is known, got "KNaO"; nearest known: K2O'],
    ['Pr2O3', 'expected an oxide that is known, got "Pr2O3"; nearest known: Cr2O3'],
  ])(
    'a heading that is nearly known, or looks like an oxide, is a fault: %s',
    (heading, message) => {
      const { faults, unknown } = map(`tile,${heading}`);
      expect(unknown).toEqual([]);
      expect(faults).toEqual([{ file: 'a.csv', line: 1, column: heading, message }]);
    },
  );

  it.each(['SiO2:Al2O3', 'SiO2 / Al2O3', 'NO', 'No.', 'colour', 'photo', 'Oxides'])(
    'leaves alone what is neither: %s',
    (heading) => {
      expect(map(`tile,${heading}`).unknown).toEqual([{ heading, place: 1 }]);
    },
  );

  it('points from water and carbon dioxide to loi where an analysis is read', () => {
    const known = ['material', ...OXIDES, 'loi'];
    expect(map('material,H2O', known).faults[0]?.message).toBe(
      'expected an oxide that is known, got "H2O"; nearest known: loi',
    );
  });

  it('a column that comes twice is a fault, also in other capitals or if unknown', () => {
    const message = 'expected each column once, got it in columns 1 and 2';
    for (const heading of ['SiO2,sio2', 'colour,colour']) {
      expect(map(heading).faults).toMatchObject([{ column: heading.split(',')[1], message }]);
    }
  });

  it('says what a faulty heading stands for, so that it is not missing as well', () => {
    expect([...map('tile,Al203,SiO2 %').meant]).toEqual(['Al2O3', 'SiO2']);
    expect([...map('tile,colour').meant]).toEqual([]);
  });

  it('bounds the length of a heading', () => {
    expect(map('x'.repeat(201)).faults[0]?.message).toBe(
      'expected a heading of at most 200 characters, got 201',
    );
  });
});

describe('a misspelt heading beside one that is missing', () => {
  it('hides nothing: both faults come at once', () => {
    const csv = 'tile,cone,Finish,SiO2,Al203,CaO\nA,6,gloss,3,0.4,1\n';
    const { faults } = readArchive(filesOf({ 'a.csv': csv }));
    expect(faults.filter(({ line }) => line === 1).map(faultLine)).toEqual([
      'a.csv:1 Al203: expected a known column, got "Al203"; nearest known: Al2O3',
      'a.csv:1 surface: expected this column, found none',
    ]);
  });
});
