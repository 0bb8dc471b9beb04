import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readTable } from '../../src/archive/csv-table.ts';
import { strayQuotes } from '../../src/archive/stray-quotes.ts';
import { bytesOf } from '../support/builders.ts';

const tableOf = (text: string) => {
  const read = readTable('a.csv', bytesOf(text));
  if ('fault' in read) throw new Error(read.fault.message);
  return read.table;
};
const linesAndCells = (text: string) =>
  tableOf(text).rows.map(({ line, cells }) => [line, ...cells]);

describe('readTable', () => {
  it('numbers lines as a text editor does: blank lines and quoted line ends count', () => {
    const text = 'a,b\r\n\r\n"x\r\ny",2\r\n,\r\n3,4\r\n';
    expect(linesAndCells(text)).toEqual([
      [3, 'x\ny', '2'],
      [6, '3', '4'],
    ]);
  });

  it('finds headings below blank lines', () => {
    expect(tableOf('\n\n a , b\n1,2\n')).toMatchObject({ headingLine: 3, headings: ['a', 'b'] });
  });

  it.each([
    ['tile;"a,b,c";cone\n1,5;2,5;6,5\n', ';'],
    ['tile\tcone, reached\tnote\n', '\t'],
    ['tile,cone\n1;2;3;4,5\n', ','],
    ['tile\n1;2\n', ','],
  ])('counts separators outside quotes in the headings: %j', (text, separator) => {
    expect(tableOf(text).separator).toBe(separator);
  });

  it.each([
    ['sep=;\na;b,c\n1;2,5\n', ';', 'sep=;'],
    ['sep=,\r\na,b;c;d\r\n1,2\r\n', ',', 'sep=,'],
    ['"sep=;"\na;b\n1;2\n', ';', '"sep=;"'],
    ['SEP=\t\na\tb\n1\t2\n', '\t', 'SEP='],
    ['sep=;;;\na;b;c;d\n1;2\n', ';', 'sep=;;;'],
  ])('takes the separator that a first line tells: %j', (text, separator, separatorLine) => {
    const table = tableOf(text);
    expect(table).toMatchObject({ separator, separatorLine, headingLine: 2 });
    expect(table.headings[0]).toBe('a');
    expect(table.rows.map(({ line }) => line)).toEqual([3]);
  });

  it('does not take a heading for such a line, nor a sign that separates nothing', () => {
    expect(tableOf('sep,b\n1,2\n').separatorLine).toBeUndefined();
    expect(tableOf('tile\nsep=;\n').rows).toHaveLength(1);
    const message = 'expected sep= with a comma, semicolon or tab, got "sep=|"';
    expect(readTable('a.csv', bytesOf('sep=|\na|b\n'))).toMatchObject({ fault: { message } });
  });

  it.each(['', '\n \n', ' ,,\n'])('an empty file is a fault: %j', (text) => {
    const message = 'expected a line of headings, got an empty file';
    const fault = { file: 'a.csv', line: 0, column: '', message };
    expect(readTable('a.csv', bytesOf(text))).toEqual({ fault });
  });

  it('bounds columns, rows and cells', () => {
    const wide = tableOf(`${'a,'.repeat(500)}b\n`);
    expect(wide.faults).toMatchObject([{ message: 'expected at most 500 columns, got 501' }]);
    const long = tableOf(`a,b\n${'x,y\n'.repeat(200_001)}`);
    expect(long.faults).toMatchObject([{ message: 'expected at most 200000 rows, got 200001' }]);
    const cell = tableOf(`a,b\n1,${'x'.repeat(10_001)}\n`).rows[0]?.faults;
    const message = 'expected at most 10000 characters, got 10001';
    expect(cell).toEqual([{ file: 'a.csv', line: 2, column: 'b', message }]);
  });
});

describe('strayQuotes', () => {
  it('loses only its own row to a quote that is never closed', () => {
    const table = tableOf('a,b\n1,"x\n2,y\n3,z\n');
    expect(table.rows.map(({ line, cells }) => [line, cells[0]])).toEqual([
      [2, '1'],
      [3, '2'],
      [4, '3'],
    ]);
    const message = 'expected quotes only around a whole cell, got ""x"';
    expect(table.rows.map(({ faults }) => faults)).toEqual([
      [{ file: 'a.csv', line: 2, column: 'b', message }],
      [],
      [],
    ]);
  });

  it('does not let two stray quotes swallow the rows between them', () => {
    const table = tableOf('a,b\n1,"x\n2,y\n3,z" end\n4,w\n');
    expect(table.rows.map(({ line }) => line)).toEqual([2, 3, 4, 5]);
    expect(table.rows.map(({ faults }) => faults.length)).toEqual([1, 0, 1, 0]);
  });

  it('reports a quote inside a cell, and keeps the cell', () => {
    const [row] = tableOf('a,b\n4" tile,2\n').rows;
    expect(row.cells).toEqual(['4" tile', '2']);
    expect(row.faults).toMatchObject([{ column: 'a' }]);
  });

  it('names the row, not the line, of a quote behind a quoted line end', () => {
    expect(strayQuotes('a,b\n"x\ny",z"\n1,2', ',').stray).toEqual([
      { line: 2, cell: 1, found: '"' },
    ]);
  });

  it('finds none in what a strict reader accepts, and some in what it does not', () => {
    const text = fc.string({ unit: fc.constantFrom('"', '"', ',', '\n', 'x'), maxLength: 24 });
    fc.assert(
      fc.property(text, (csv) => {
        let isStrict = true;
        try {
          parse(csv, { relax_column_count: true, record_delimiter: '\n' });
        } catch {
          isStrict = false;
        }
        const { text: mended, stray } = strayQuotes(csv, ',');
        expect(stray.length === 0).toBe(isStrict);
        if (isStrict) expect(mended).toBe(csv);
        // What is left can be read, with the quotes inside plain cells as they are.
        parse(mended, { relax_column_count: true, relax_quotes: true, record_delimiter: '\n' });
      }),
      { seed: 1, numRuns: 2000 },
    );
  });
});
