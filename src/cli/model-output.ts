import { UnwritableError } from './cli-errors.ts';
import { STDIN, type Io } from './io.ts';

/**
 * Makes sure that a file may become a model: it is new, or an older model.
 *
 * @param path - where the model is to go
 * @param io - where to look
 * @throws {UnwritableError} if something else stands there, or the name is that of a CSV file
 */
export async function modelIsWritable(path: string, io: Io): Promise<void> {
  if (path === STDIN) throw refused(path, 'a model goes to a file, not to standard output');
  // A CSV name, also a new one, would make the model a part of the archive.
  if (/\.csv$/i.test(path)) throw refused(path, 'a model is no CSV file');
  const kind = await io.kindOf(path);
  if (kind === 'absent') return;
  if (kind !== 'file')
    throw refused(path, kind === 'folder' ? 'that is a folder' : 'that is no file');
  if (!isModel(await io.readText(path)))
    throw refused(path, 'the file there is no coneshift model');
}

function refused(path: string, why: string): UnwritableError {
  return new UnwritableError(
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
