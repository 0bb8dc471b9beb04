import { dirname } from 'node:path';
import { UsageError } from '../errors.ts';
import { UnwritableError } from './cli-errors.ts';
import { STDIN, type Io } from './io.ts';

/**
 * Makes sure, before the work is done, that a file may become a model: it is new, or an older model.
 *
 * @param path - where the model is to go
 * @param io - where to look
 * @throws {UsageError} if something else stands there, or the name is that of a CSV file
 * @throws {UnwritableError} if there is no folder for it
 */
export async function modelIsWritable(path: string, io: Io): Promise<void> {
  if (path === STDIN) throw refused(path, 'a model goes to a file, not to standard output');
  // A CSV name, also a new one, would make the model a part of the archive.
  if (/\.csv$/i.test(path)) throw refused(path, 'a model is no CSV file');
  const kind = await io.kindOf(path);
  if (kind === 'absent') return folderIsThere(path, io);
  if (kind !== 'file')
    throw refused(path, kind === 'folder' ? 'that is a folder' : 'that is no file');
  if (!isModel(await io.readText(path)))
    throw refused(path, 'the file there is no coneshift model');
}

async function folderIsThere(path: string, io: Io): Promise<void> {
  const folder = dirname(path);
  if (folder === '.' || (await io.kindOf(folder)) === 'folder') return;
  throw new UnwritableError(
    `expected a folder to write "${path}" in, found none at "${folder}"`,
    'Make the folder first, or give another name.',
  );
}

function refused(path: string, why: string): UsageError {
  return new UsageError(
    `expected a new file or an older model to write to, got "${path}": ${why}`,
    'Give another name, such as --out model.json; nothing was changed.',
  );
}

function isModel(text: string): boolean {
  try {
    const value: unknown = JSON.parse(text);
    const schema: unknown =
      typeof value === 'object' && value !== null && 'schema' in value ? value.schema : undefined;
    return typeof schema === 'string' && schema.startsWith('coneshift.model/');
  } catch {
    return false;
  }
}
