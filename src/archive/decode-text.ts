import { LIMITS } from './limits.ts';

export type Encoding = 'UTF-8' | 'UTF-16' | 'Windows-1252';

/** A file as text with plain line feeds, or why it is none. */
export type Decoded =
  { readonly text: string; readonly encoding: Encoding } | { readonly problem: string };

/**
 * The text of a file, whatever a spreadsheet wrote it in.
 *
 * UTF-8 and UTF-16 with or without a byte order mark; what is neither is read as Windows-1252. Line
 * ends become line feeds, since the reader of rows counts a quoted carriage return as a line.
 *
 * @param bytes - the file
 * @returns text and encoding, or the problem in words
 */
export function decodeText(bytes: Uint8Array): Decoded {
  if (bytes.length > LIMITS.fileBytes) {
    const mib = 1024 * 1024;
    return {
      problem: `expected at most ${LIMITS.fileBytes / mib} MB, got ${Math.ceil(bytes.length / mib)} MB`,
    };
  }
  const workbook = workbookKind(bytes);
  if (workbook !== undefined) {
    return { problem: `expected a CSV file, got ${workbook}: save the sheet as CSV` };
  }
  const wide = wideEncoding(bytes);
  if (wide !== undefined) return decodeWide(bytes, wide);
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return { text: lineFeeds(text), encoding: 'UTF-8' };
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return { text: lineFeeds(decodeWindows1252(bytes)), encoding: 'Windows-1252' };
  }
}

function decodeWide(bytes: Uint8Array, label: 'utf-16le' | 'utf-16be'): Decoded {
  try {
    const text = new TextDecoder(label, { fatal: true }).decode(bytes);
    return { text: lineFeeds(text), encoding: 'UTF-16' };
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return { problem: 'expected text, got UTF-16 that breaks off or is damaged' };
  }
}

/** By the byte order mark, else by a first character that is plain ASCII in two bytes. */
function wideEncoding(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | undefined {
  const [first = 1, second = 1] = bytes;
  if (first === 0xff && second === 0xfe) return 'utf-16le';
  if (first === 0xfe && second === 0xff) return 'utf-16be';
  if (bytes.length < 2 || (first === 0) === (second === 0)) return undefined;
  return second === 0 ? 'utf-16le' : 'utf-16be';
}

function workbookKind(bytes: Uint8Array): string | undefined {
  const startsWith = (signature: readonly number[]) =>
    signature.every((byte, index) => bytes[index] === byte);
  if (startsWith([0x50, 0x4b, 0x03, 0x04])) return 'a workbook or another zipped file';
  if (startsWith([0xd0, 0xcf, 0x11, 0xe0])) return 'an old workbook';
  return undefined;
}

/** Streamed on purpose: decoded in one go, Node 20 reads the bytes 80 to 9F as ISO 8859-1. */
function decodeWindows1252(bytes: Uint8Array): string {
  const decoder = new TextDecoder('windows-1252');
  return decoder.decode(bytes, { stream: true }) + decoder.decode();
}

function lineFeeds(text: string): string {
  return text.includes('\r') ? text.replace(/\r\n?/g, '\n') : text;
}
