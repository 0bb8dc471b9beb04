import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { alignedLines } from '../../src/render/aligned.ts';
import {
  coneTenths,
  fixed,
  partPercent,
  percentDigits,
  placeRange,
  probabilityCell,
  signed,
} from '../../src/render/figures.ts';
import { jsonPieces, toJson } from '../../src/render/json.ts';
import { pageOf, PLAIN_LOOK, point, prose } from '../../src/render/page.ts';
import { cutTo, printable, textWidth } from '../../src/render/printable.ts';
import { wrapped } from '../../src/render/wrapped.ts';

describe('printable text', () => {
  it('lets no control character through', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        expect(printable(text)).not.toMatch(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/u);
      }),
    );
  });

  it('writes escapes, bells, line ends and reversed writing as their code', () => {
    expect(printable('\u001b]0;x\u0007\n\u009b1m\u202e')).toBe(
      '\\x1b]0;x\\x07\\x0a\\x9b1m\\u{202e}',
    );
    expect(printable('Ünïcode 釉 "quoted"')).toBe('Ünïcode 釉 "quoted"');
  });
});

describe('a text cut to a width', () => {
  it('never takes more columns, and keeps the end', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'grapheme' }),
        fc.integer({ min: 6, max: 40 }),
        (text, width) => {
          const safe = printable(text);
          expect(textWidth(cutTo(safe, width))).toBeLessThanOrEqual(Math.max(width, 0));
        },
      ),
    );
    expect(cutTo('Kiln North, load 112', 12)).toBe('Kiln ..d 112');
    expect(cutTo('釉釉釉釉釉釉', 8)).toBe('釉..釉');
  });
});

describe('a wrapped paragraph', () => {
  const words = fc.array(fc.stringMatching(/^[a-z0-9]{1,12}$/), { minLength: 1, maxLength: 40 });

  it('keeps every word in order and fits the width', () => {
    fc.assert(
      fc.property(words, fc.integer({ min: 40, max: 120 }), (given, columns) => {
        const lines = wrapped(given.join(' '), { columns, first: '  - ', next: '    ' }).split(
          '\n',
        );
        expect(lines.every((line) => line.length <= columns)).toBe(true);
        const back = lines.map((line) => line.slice(4)).join(' ');
        expect(back).toBe(given.join(' '));
      }),
    );
  });

  it('does not go below 40 columns', () => {
    const text = 'twenty letters wide, twenty letters wide';
    expect(wrapped(text, { columns: 10 })).toBe(text);
  });

  it('keeps a percent sign with its number', () => {
    const text = `${'x'.repeat(37)} 12 % of them`;
    expect(wrapped(text, { columns: 41 }).split('\n')[1]).toBe('12 % of them');
  });

  it('leaves a longer word whole', () => {
    expect(wrapped(`a ${'b'.repeat(60)} c`, { columns: 40 })).toBe(`a\n${'b'.repeat(60)}\nc`);
  });
});

describe('aligned columns', () => {
  it('counts columns, not characters', () => {
    expect(
      alignedLines({
        rows: [
          ['釉', '1'],
          ['ab', '10'],
        ],
        align: ['left', 'right'],
      }),
    ).toEqual(['釉   1', 'ab  10']);
  });

  const cell = fc.stringMatching(/^[a-z0-9]{0,9}$/);
  const table = fc.integer({ min: 1, max: 9 }).chain((count) =>
    fc.array(fc.array(cell, { minLength: count, maxLength: count }), {
      minLength: 1,
      maxLength: 6,
    }),
  );

  it('never leave the page however narrow, and lose no cell', () => {
    fc.assert(
      fc.property(table, fc.integer({ min: 40, max: 100 }), (rows, columns) => {
        const texts = alignedLines({ rows, columns, indent: 2 });
        expect(texts).toHaveLength(rows.length);
        const lines = texts.flatMap((text) => text.split('\n'));
        expect(lines.every((line) => textWidth(line) <= columns)).toBe(true);
        const back = texts.map((text) => text.split(/\s+/).filter((word) => word !== ''));
        expect(back).toEqual(rows.map((row) => row.filter((word) => word !== '')));
      }),
    );
  });

  it('move together before they fold, and fold below their own row', () => {
    const rows = [
      ['cone', 'x'.repeat(20), 'y'.repeat(12)],
      ['5', 'a', 'b'],
    ];
    expect(alignedLines({ rows, columns: 40 })[0]).toBe(
      `cone  ${'x'.repeat(20)}  ${'y'.repeat(12)}`,
    );
    const close = [['cone', 'x'.repeat(20), 'y'.repeat(14)]];
    expect(alignedLines({ rows: close, columns: 40 })).toEqual([
      `cone ${'x'.repeat(20)} ${'y'.repeat(14)}`,
    ]);
    const folded = [...[['cone', 'x'.repeat(20), 'y'.repeat(30)]], ['5', 'a', 'b']];
    expect(alignedLines({ rows: folded, columns: 40 })).toEqual([
      `cone  ${'x'.repeat(20)}\n    ${'y'.repeat(30)}`,
      '5     a\n    b',
    ]);
  });

  it('bears rows of different length', () => {
    expect(alignedLines({ rows: [['a', 'b', 'c'], ['long']], indent: 1 })).toEqual([
      ' a     b  c',
      ' long',
    ]);
  });
});

describe('figures', () => {
  it('never round a probability to certainty', () => {
    expect([0, 0.0049, 0.005, 0.5, 0.9949, 0.995, 1].map(percentDigits)).toEqual([
      '<1',
      '<1',
      '1',
      '50',
      '99',
      '>99',
      '>99',
    ]);
    expect(probabilityCell(0.999, [0.97, 1])).toBe('>99 % (97->99)');
    expect(partPercent(3, 3)).toBe('100 %');
  });

  it('show no sign on a nought, and what is unknown as a dash', () => {
    expect([fixed(-0.004, 2), signed(-0.004, 2), signed(0.004, 2), fixed(null, 2)]).toEqual([
      '0.00',
      '0.00',
      '0.00',
      '-',
    ]);
  });

  it('write cones below 1 with their zero', () => {
    expect([coneTenths(0.04), coneTenths(-4.46), coneTenths(6.96)]).toEqual(['01', '05.5', '7']);
  });

  it('say which end of a range was left', () => {
    expect(placeRange([null, null], [4, 8], coneTenths)).toBe('below 4 to beyond 8');
    expect(placeRange([4.31, 5.22], [4, 8], coneTenths)).toBe('4.3 to 5.2');
  });
});

describe('JSON', () => {
  it.each([Number.NaN, Infinity, -Infinity])('refuses %s, which would become null', (value) => {
    expect(() => toJson({ points: [{ value }] })).toThrow(
      new RangeError(`numbers must be finite to be written, got ${value} at "value"`),
    );
  });

  it('gives back what it was given, keys in order, with a line end', () => {
    const value = { schema: 'x/1', b: 1, a: [null, 'é', 0.1] };
    const text = toJson(value);
    expect(JSON.parse(text)).toEqual(value);
    expect(text.indexOf('"b"')).toBeLessThan(text.indexOf('"a"'));
    expect(text.endsWith('}\n')).toBe(true);
  });

  it('writes what a terminal would obey as codes that parse back', () => {
    const name = '\u001b[31m\u009b2J\u202e\u2028';
    const text = toJson({ name });
    expect(text).not.toMatch(/[\u001b\u007f-\u009f\u2028\u202e]/);
    expect(JSON.parse(text)).toEqual({ name });
  });

  it.each([0, 1, 499, 500, 501, 1500])('in pieces is the same text, for a list of %d', (count) => {
    const list = Array.from({ length: count }, (_, i) => ({ i, of: [i / 3, 'é\u2028'] }));
    const around = { schema: 'x/1', model: { tiles: 2 }, left: undefined };
    const pieces = jsonPieces({ ...around, list: list.values(), notes: ['a'] });
    expect([...pieces].join('')).toBe(toJson({ ...around, list, notes: ['a'] }));
  });

  it('in pieces is the same text for nothing, and refuses what is not finite', () => {
    expect([...jsonPieces({})].join('')).toBe(toJson({}));
    expect(() => [...jsonPieces({ list: new Set([Number.NaN]) })]).toThrow(RangeError);
  });
});

describe('a page', () => {
  it('leaves out sections without lines and marks headings only', () => {
    const look = { columns: 80, strong: (text: string) => `<${text}>` };
    const sections = [
      { heading: 'A', lines: ['  a'] },
      { heading: 'B', lines: [] },
      { lines: ['c'] },
    ];
    expect(pageOf(sections, look)).toBe('<A>\n  a\n\nc\n');
  });

  it('neutralises names in prose and in lists', () => {
    expect(prose('see \u001b[2J', PLAIN_LOOK)).toBe('  see \\x1b[2J');
    expect(point('see \u001b[2J', PLAIN_LOOK)).toBe('  - see \\x1b[2J');
  });
});
