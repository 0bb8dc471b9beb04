import { describe, expect, it } from 'vitest';
import { decodeText } from '../../src/archive/decode-text.ts';
import { LIMITS } from '../../src/archive/limits.ts';
import { bytesOf } from '../support/builders.ts';

const utf16 = (text: string, littleEndian: boolean, mark = true) => {
  const units = [...(mark ? [0xfeff] : []), ...Array.from(text, (c) => c.charCodeAt(0))];
  const view = new DataView(new ArrayBuffer(units.length * 2));
  units.forEach((unit, i) => {
    view.setUint16(i * 2, unit, littleEndian);
  });
  return new Uint8Array(view.buffer);
};

describe('decodeText', () => {
  it('reads UTF-8 with and without a byte order mark', () => {
    const plain = { text: 'tile,note\nä,€\n', encoding: 'UTF-8' };
    expect(decodeText(bytesOf('tile,note\nä,€\n'))).toEqual(plain);
    expect(decodeText(bytesOf('\uFEFFtile,note\nä,€\n'))).toEqual(plain);
  });

  it.each([true, false])('reads UTF-16 (little-endian: %s), with a mark and without', (little) => {
    const expected = { text: 'tile\tnote\nä\t€\n', encoding: 'UTF-16' };
    expect(decodeText(utf16('tile\tnote\r\nä\t€\r\n', little))).toEqual(expected);
    expect(decodeText(utf16('tile\tnote\r\nä\t€\r\n', little, false))).toEqual(expected);
  });

  it('refuses UTF-16 that breaks off in a character', () => {
    const problem = 'expected text, got UTF-16 that breaks off or is damaged';
    expect(decodeText(utf16('tile', true).subarray(0, 7))).toEqual({ problem });
  });

  it('keeps the euro sign and the curly quotes of Windows-1252', () => {
    const bytes = new Uint8Array([0x80, 0x20, 0x93, 0xe4, 0x94, 0x0d, 0x0a]);
    expect(decodeText(bytes)).toEqual({ text: '€ “ä”\n', encoding: 'Windows-1252' });
  });

  it('turns CRLF and a lone CR into LF', () => {
    expect(decodeText(bytesOf('a\r\nb\rc\n'))).toMatchObject({ text: 'a\nb\nc\n' });
  });

  it('says so when a workbook is given for a CSV', () => {
    expect(decodeText(new Uint8Array([0x50, 0x4b, 3, 4, 0]))).toEqual({
      problem: 'expected a CSV file, got a workbook or another zipped file: save the sheet as CSV',
    });
    expect(decodeText(new Uint8Array([0xd0, 0xcf, 0x11, 0xe0, 0]))).toEqual({
      problem: 'expected a CSV file, got an old workbook: save the sheet as CSV',
    });
  });

  it('refuses a file beyond 64 MB before it looks into it', () => {
    const problem = 'expected at most 64 MB, got 65 MB';
    expect(decodeText(new Uint8Array(LIMITS.fileBytes + 1))).toEqual({ problem });
  });
});
