import { describe, expect, it } from 'vitest';
import { readPoints } from '../../src/archive/read-points.ts';
import { ArchiveError } from '../../src/errors.ts';
import { bytesOf } from '../support/builders.ts';

const read = (text: string) => readPoints('p.csv', bytesOf(text));

describe('readPoints', () => {
  it('brings points to unity, in the order of the file', () => {
    expect(read('point;CaO;SiO2;Al2O3;ours\nP1;2;7;0,8;x\n\nP0;1;3;0;\n').points).toEqual([
      { point: 'P1', unity: { SiO2: 3.5, Al2O3: 0.4, CaO: 1 } },
      { point: 'P0', unity: { SiO2: 3, CaO: 1 } },
    ]);
  });

  it('notes once what it did not use, what it read as another and what is not there', () => {
    const csv = 'point,SIO2,Al2O3,B2O3,Na2O,CaO,Lead,colour\nA,3,0.4,0,0.2,0.8,1,red\n';
    expect(read(csv).notes).toEqual([
      'p.csv: heading "SIO2" read as SiO2',
      'p.csv: columns "Lead" and "colour" not known, not used',
    ]);
    expect(read('point,SiO2,Al2O3,CaO\nA,3,0.4,1\nB,3,0.4,1\n').notes).toEqual([
      'p.csv: no B2O3 column, no K2O or Na2O column: read as 0 for all 2 points',
    ]);
    expect(read('sep=;\npoint;SiO2;Al2O3;B2O3;K2O;CaO\nA;3;0.4;0;0.1;1\n').notes).toEqual([
      'p.csv: separated by semicolons, as its first line says, decimal point',
    ]);
  });

  it('notes weights given for moles, and what is no glaze', () => {
    const head = 'point,SiO2,Al2O3,B2O3,K2O,CaO\n';
    expect(read(`${head}A,66,14,0,7,13\n`).notes.join()).toMatch(
      /^p\.csv: oxides sum to about 100, .*"A" is read as moles: SiO2 3\.30.*would be SiO2 3\.59/,
    );
    expect(read(`${head}A,340,0.4,0,0.3,0.7\n`).notes.join()).toContain('"A" (SiO2 340)');
  });

  it('lists every fault', () => {
    const csv =
      'point,SiO2,Al2O3,B2O3,CaO\nA,3,0.4,0.1,1\nA,3,0.4,0,1\n,3,0.4,0,1\n' +
      'B,,0.4,0,1\nC,3,0.4,,1\nD,3,0.4,0,\nE,x,0.4,0,1\nF,3,0.4,0,1,5\nG,30000,0.4,0,1\n';
    expect(() => read(csv)).toThrow(
      [
        '9 faults in the input',
        '  p.csv:2 point: expected each point once, got "A" in line 3 as well',
        '  p.csv:3 point: expected each point once, got "A" in line 2 as well',
        '  p.csv:4 point: expected a name for the point, got a blank cell',
        '  p.csv:5 SiO2: expected moles of SiO2, got a blank cell',
        '  p.csv:6 B2O3: expected moles of B2O3, 0 if there is none, got a blank cell',
        '  p.csv:7: expected a flux, found none (oxides given: SiO2, Al2O3)',
        '  p.csv:8 SiO2: expected moles of SiO2: a number, got "x"',
        '  p.csv:9 column 6: expected a heading above this cell, got "5"',
        '  p.csv:10 SiO2: expected at most 1000 per mole of flux, found 3.00e+4',
      ].join('\n'),
    );
  });

  it.each([
    ['', 'p.csv: expected a line of headings, got an empty file'],
    ['point,SiO2,Al2O3,CaO\n', 'p.csv: expected a point, got none'],
    ['SiO2,Al2O3,CaO\n3,0.4,1\n', 'p.csv:1 point: expected this column, found none'],
    ['point,Al2O3,CaO\nA,1,1\n', 'p.csv:1 SiO2: expected this column beside the other oxides'],
    [
      'pont,SiO2,Al2O3\n',
      'p.csv:1 pont: expected a known column, got "pont"; nearest known: point',
    ],
  ])('%j', (text, message) => {
    expect(() => read(text)).toThrow(ArchiveError);
    expect(() => read(text)).toThrow(message);
  });
});
