import { basename, join } from 'node:path';
import { UnreadableError } from './cli-errors.ts';
import { STDIN, type Io } from './io.ts';

/**
 * The files of an archive that a command was given.
 *
 * Of a folder only the files that an archive may hold are read. Other CSV files are named to the
 * library, so that it can note them, but not opened.
 *
 * @param path - folder, one CSV file, or `-` for one CSV on standard input
 * @param io - where to read
 * @returns bytes by bare file name
 * @throws {UnreadableError} if the path leads to nothing that can be read
 */
export async function archiveFilesAt(path: string, io: Io): Promise<Map<string, Uint8Array>> {
  if (path === STDIN) return new Map([['standard input', await io.readBytes(path)]]);
  const kind = await io.kindOf(path);
  if (kind === 'absent' || kind === 'other') {
    const found = kind === 'absent' ? 'nothing' : 'something else';
    throw new UnreadableError(
      `expected an archive (a folder or a CSV file) at "${path}", found ${found}`,
    );
  }
  if (kind === 'file') return new Map([[basename(path), await io.readBytes(path)]]);
  const csvFiles = (await io.listFolder(path)).filter((name) => /\.csv$/i.test(name));
  const { ARCHIVE_FILES } = await import('../index.ts');
  const isRead = (name: string) =>
    csvFiles.length === 1 || ARCHIVE_FILES.some((known) => known === name.toLowerCase());
  const files = new Map<string, Uint8Array>();
  for (const name of csvFiles) {
    files.set(name, isRead(name) ? await io.readBytes(join(path, name)) : new Uint8Array());
  }
  return files;
}
