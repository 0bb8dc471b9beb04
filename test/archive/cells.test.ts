import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { z } from 'zod';
import {
  coneCell,
  dateCell,
  fileNameCell,
  nameCell,
  numberCell,
  requiredNameCell,
  wordCell,
  yesNoCell,
} from '../../src/archive/cells.ts';
import { parseDecimal } from '../../src/archive/decimal-mark.ts';
import { got } from '../../src/archive/found-text.ts';
import { nearestNames, slips } from '../../src/archive/nearest-name.ts';

const read = (cell: z.ZodType, text: string) => {
  const result = cell.safeParse(text);
  return result.success ? result.data : result.error.issues.map(({ message }) => message).join();
};
const PEAK = { what: 'a peak in °C', least: 600, most: 1400, reason: 'where glazes are fired' };

describe('number cells', () => {
  it.each([
    ['1222', '.', 1222],
    [' 1222.5 ', '.', 1222.5],
    ['1222,5', ',', 1222.5],
    ['1.2e3', '.', 1200],
    ['', '.', undefined],
    [' ', ',', undefined],
    ['1222,5', '.', 'expected a peak in °C: a number with a decimal point, got "1222,5"'],
    ['1222.5', ',', 'expected a peak in °C: a number with a decimal comma, got "1222.5"'],
    ['1.222,5', ',', 'expected a peak in °C: a number without a thousands mark, got "1.222,5"'],
    ['1,222.5', '.', 'expected a peak in °C: a number without a thousands mark, got "1,222.5"'],
    ['0x500', '.', 'expected a peak in °C: a number, got "0x500"'],
    ['1e999', '.', 'expected a peak in °C: a number, got "1e999"'],
    ['Infinity', '.', 'expected a peak in °C: a number, got "Infinity"'],
    ['12 22', '.', 'expected a peak in °C: a number, got "12 22"'],
    ['599', '.', 'expected a peak in °C from 600 to 1400 (where glazes are fired), got "599"'],
  ] as const)('%j with decimal mark %s', (text, mark, expected) => {
    expect(read(numberCell(mark, PEAK), text)).toBe(expected);
  });

  it('reads back every number in either mark', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (drawn) => {
        const value = drawn + 0; // a written nought has no sign
        expect(parseDecimal(String(value), '.')).toBe(value);
        expect(parseDecimal(String(value).replace('.', ','), ',')).toBe(value);
      }),
      { seed: 1 },
    );
  });
});

describe('other cells', () => {
  it.each([
    ['6', '6'],
    ['06', '06'],
    ['6,5', '6.5'],
    ['6.50', '6.5'],
    ['cone 05.5', '05.5'],
    ['', undefined],
    ['0', 'expected a cone from 022 to 42 such as 6, 06 or 6.5, got "0"'],
    ['06. May', 'expected a cone from 022 to 42 such as 6, 06 or 6.5, got "06. May"'],
  ])('cone %j', (text, expected) => {
    expect(read(coneCell(true), text)).toBe(expected);
  });

  it('a cone may have a comma only where commas do not separate', () => {
    expect(read(coneCell(false), '6,5')).toContain('expected a cone from 022 to 42');
  });

  it('words in any capitals; others with the nearest', () => {
    const words = wordCell(['gloss', 'matte']);
    expect(read(words, ' Gloss ')).toBe('gloss');
    expect(read(words, 'mat')).toBe(
      'expected gloss, matte or a blank cell, got "mat"; nearest known: matte',
    );
    expect(read(yesNoCell(), 'YES')).toBe(true);
    expect(read(yesNoCell(), 'toString')).toBe('expected yes, no or a blank cell, got "toString"');
  });

  it('names keep control characters as data; messages show their codes', () => {
    expect(read(nameCell(), 'a\u001b[2Jb')).toBe('a\u001b[2Jb');
    expect(got('a\u001b[2Jb')).toBe('got "a\\u{1b}[2Jb"');
    expect(read(requiredNameCell('a tile name'), ' ')).toBe(
      'expected a tile name, got a blank cell',
    );
    expect(read(nameCell(), 'x'.repeat(201))).toBe(
      'expected a name of at most 200 characters, got 201',
    );
    expect(got('x'.repeat(61))).toBe(`got "${'x'.repeat(59)}…"`);
  });

  it.each(['2024-02-29', '2024-02-29T08:30', '2024-02-29 08:30:00Z', '2024-02-29T08:30+01:00'])(
    'date %s',
    (text) => {
      expect(read(dateCell(), text)).toBe(text);
    },
  );

  it.each(['2023-02-29', '29.02.2024', '2024-13-01', '2024-2-9', '45351', '2024-02-29x'])(
    'no date: %s',
    (text) => {
      expect(read(dateCell(), text)).toBe(`expected a date such as 2024-03-31, got "${text}"`);
    },
  );

  it.each(['../x.csv', 'logs/x.csv', 'C:x.csv', 'a\\b', '..', '.', 'a\u0000b'])(
    'no bare file name: %j',
    (text) => {
      expect(read(fileNameCell(), text)).toContain(
        'expected the name of a file in the archive, without a folder',
      );
    },
  );
});

describe('nearest names', () => {
  it('counts slips: left out, put in, exchanged, swapped', () => {
    expect(slips('cone', 'cone')).toBe(0);
    expect(slips('cone', 'con')).toBe(1);
    expect(slips('cone', 'cnoe')).toBe(1);
    expect(slips('Cone', 'bones')).toBe(2);
    expect(slips('', 'abc')).toBe(3);
  });

  it('lists up to three that are equally near', () => {
    expect(nearestNames('F11', ['F1', 'F10', 'F12', 'F13', 'G'])).toEqual(['F1', 'F10', 'F12']);
    expect(nearestNames('x', [])).toEqual([]);
  });
});
