import type { Fault } from '../errors.ts';
import { listed, quoted } from './found-text.ts';
import { nearestNames, slips } from './nearest-name.ts';

/** The files that an archive may hold, in the order in which their faults are reported. */
export const ARCHIVE_FILES = [
  'tiles.csv',
  'firings.csv',
  'witness.csv',
  'recipes.csv',
  'materials.csv',
  'bodies.csv',
] as const;

export interface NamedBytes {
  /** As the user knows it. */
  readonly file: string;
  readonly bytes: Uint8Array;
}

export interface FilesFound {
  /** By the name it has in this list. */
  readonly found: ReadonlyMap<string, NamedBytes>;
  readonly faults: readonly Fault[];
  readonly notes: readonly string[];
}

/** Two slips: `firing.csv`, `recipies.csv`. */
const NEAR_MISS_SLIPS = 2;

/**
 * Which file of an archive is which.
 *
 * One file alone is read as tiles.csv whatever its name. Other files that are no CSV, such as logs and
 * a README, are left alone.
 *
 * @param files - bytes by bare file name
 * @returns the known files, faults (no tiles.csv, a misspelt name) and notes (other CSV files)
 */
export function archiveFiles(files: ReadonlyMap<string, Uint8Array>): FilesFound {
  const found = new Map<string, NamedBytes>();
  const faults: Fault[] = [];
  const notes: string[] = [];
  const csvFiles = [...files].filter(([file]) => files.size === 1 || /\.csv$/i.test(file));
  const [only] = csvFiles;
  if (csvFiles.length === 1 && only !== undefined) {
    return { found: new Map([['tiles.csv', { file: only[0], bytes: only[1] }]]), faults, notes };
  }
  const whole = (file: string, message: string) => {
    faults.push({ file, line: 0, column: '', message });
  };
  const others: string[] = [];
  for (const [file, bytes] of csvFiles) {
    const name = ARCHIVE_FILES.find((known) => known === file.toLowerCase());
    const twin = name === undefined ? undefined : found.get(name);
    if (name === undefined) others.push(file);
    else if (twin === undefined) found.set(name, { file, bytes });
    else whole(file, `expected one ${name}, found ${quoted(twin.file)} as well`);
  }
  for (const file of others) {
    const absent = ARCHIVE_FILES.filter((name) => !found.has(name));
    const missed = nearestNames(file, absent).filter(
      (name) => slips(file, name) <= NEAR_MISS_SLIPS,
    );
    if (missed.length === 0) notes.push(`${quoted(file)} is no file of an archive: not read`);
    else whole(file, `expected a known file name; nearest known: ${listed(missed)}`);
  }
  if (!found.has('tiles.csv')) whole('tiles.csv', 'expected this file in the archive, found none');
  return { found, faults, notes };
}
