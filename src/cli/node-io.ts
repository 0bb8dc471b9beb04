import { readFileSync } from 'node:fs';
import { readdir, readFile, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { styleText } from 'node:util';
import { UnreadableError, UnwritableError } from './cli-errors.ts';
import { STDIN, type Io, type PathKind } from './io.ts';

const USUAL_COLUMNS = 80;

/**
 * The real world: files, standard streams, the terminal.
 *
 * @returns what commands may touch
 */
export function nodeIo(): Io {
  return {
    version: ownVersion(),
    columns: process.stdout.columns || columnsSet() || USUAL_COLUMNS,
    // styleText knows of NO_COLOR, of pipes and of terminals without codes.
    colour: styleText('bold', 'x', { stream: process.stdout }) !== 'x',
    readText: async (path) => new TextDecoder().decode(await readBytes(path)),
    readBytes,
    kindOf,
    listFolder,
    writeFileWhole,
    out: (text) => void process.stdout.write(text),
    err: (text) => void process.stderr.write(text),
  };
}

/** Without a terminal its width may be told by COLUMNS, as for other programs. */
function columnsSet(): number {
  const told = process.env['COLUMNS'] ?? '';
  return /^\d{1,4}$/.test(told) ? Number(told) : 0;
}

function ownVersion(): string {
  const text = readFileSync(new URL('../../package.json', import.meta.url), 'utf8');
  const { version } = JSON.parse(text) as { version: string };
  return version;
}

async function readBytes(path: string): Promise<Uint8Array> {
  try {
    if (path !== STDIN) return await readFile(path);
    const chunks: Buffer[] = [];
    for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
    return Buffer.concat(chunks);
  } catch (error) {
    throw new UnreadableError(`expected a file to read, got "${path}": ${reason(error)}`);
  }
}

async function kindOf(path: string): Promise<PathKind> {
  try {
    const found = await stat(path);
    if (found.isFile()) return 'file';
    return found.isDirectory() ? 'folder' : 'other';
  } catch (error) {
    if (codeOf(error) === 'ENOENT') return 'absent';
    throw new UnreadableError(`expected a file or folder, got "${path}": ${reason(error)}`);
  }
}

async function listFolder(path: string): Promise<string[]> {
  try {
    const names = await readdir(path);
    const kinds = await Promise.all(
      names.map(async (name) => (await stat(join(path, name)).catch(() => null))?.isFile()),
    );
    return names.filter((_, i) => kinds[i] === true).sort();
  } catch (error) {
    throw new UnreadableError(`expected a folder to read, got "${path}": ${reason(error)}`);
  }
}

async function writeFileWhole(path: string, text: string): Promise<void> {
  const { default: writeFileAtomic } = await import('write-file-atomic');
  try {
    await writeFileAtomic(path, text);
  } catch (error) {
    throw new UnwritableError(
      `expected to write "${path}": ${reason(error)}`,
      'Nothing was changed: a file that stood there is as it was.',
    );
  }
}

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file or folder',
  EACCES: 'that is not allowed',
  EPERM: 'that is not allowed',
  EISDIR: 'that is a folder',
  ENOTDIR: 'a part of the path is no folder',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk is full',
  EROFS: 'the disk is read-only',
};

function reason(error: unknown): string {
  const known = REASONS[codeOf(error)];
  if (known !== undefined) return known;
  return error instanceof Error ? error.message : String(error);
}

function codeOf(error: unknown): string {
  return error instanceof Error && 'code' in error ? String(error.code) : '';
}
