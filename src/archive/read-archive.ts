import { ArchiveError, type Fault } from '../errors.ts';
import type { Archive, ArchiveReading, Tile, TileCounts } from './archive.ts';
import { ARCHIVE_FILES, archiveFiles, type FilesFound } from './archive-files.ts';
import { archiveParts, openSheet } from './archive-parts.ts';
import { fingerprint } from './fingerprint.ts';
import { byName, inNameOrder } from './name-order.ts';
import type { RecipesRead } from './recipe-rows.ts';
import type { Register } from './register.ts';
import { tileKind } from './tile-columns.ts';
import { tileNotes } from './tile-notes.ts';
import { tileRows } from './tile-rows.ts';

/**
 * Reads a studio's archive as far as it can be read, and lists everything that is wrong with it.
 *
 * Of every row of tiles.csv it says what became of it: fitted, unjudged, set aside or refused. A tile
 * that relies on a faulty row of another file is refused with it.
 *
 * @param files - bytes by bare file name: `tiles.csv` and what is beside it, or one CSV alone under
 *   any name
 * @returns the sound part, and every fault in the order of files and lines; nothing is thrown for a
 *   fault of the user's
 * @example
 * const csv = 'tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,6,gloss\nB,3,0.4,1,six,gloss\n';
 * const { archive, faults } = readArchive(new Map([['a.csv', new TextEncoder().encode(csv)]]));
 * archive.counts; // { read: 2, fitted: 1, unjudged: 0, setAside: 0, refused: 1 }
 * faults[0].message; // 'expected a cone from 022 to 42 such as 6, 06 or 6.5, got "six"'
 */
export function readArchive(files: ReadonlyMap<string, Uint8Array>): ArchiveReading {
  const found = archiveFiles(files);
  const parts = archiveParts(found);
  const sheet = openSheet(found, tileKind);
  const { recipes, firings, witness, materials, bodies } = parts;
  const read = sheet && tileRows(sheet, { recipes, firings, witness });
  const tiles = read?.tiles ?? [];
  const unusable = unusableRecipes(parts.recipesRead, read?.recipesUsed ?? new Set());
  const faults = [...found.faults, ...(read?.faults ?? []), ...parts.faults, ...unusable.faults];
  const sheets = [...(sheet ? [sheet] : []), ...parts.sheets];
  const archive: Archive = {
    fingerprint: fingerprint(new Map([...found.found.values()].map((f) => [f.file, f.bytes]))),
    files: sheets.map(({ file, rows }) => ({ file, rows: rows.length })),
    tiles,
    firings: valuesOf(firings),
    witness: valuesOf(witness),
    recipes: inNameOrder(valuesOf(recipes), ({ recipe }) => recipe),
    materials: valuesOf(materials),
    bodies: valuesOf(bodies),
    counts: tileCounts(sheet?.rows.length ?? 0, tiles),
    notes: [
      ...found.notes,
      ...sheets.flatMap(({ notes }) => notes),
      ...[...parts.recipesRead.notes].sort(byName),
      ...unusable.notes,
      ...tileNotes(tiles, bodies),
    ],
  };
  return { archive, faults: inOrder(faults, found) };
}

/** How strict the reading of an archive is. */
export interface ParseOptions {
  /** Goes on without the faulty rows and counts them as refused. */
  readonly leaveOutFaulty?: boolean;
}

/**
 * A studio's archive, all of it sound.
 *
 * @param files - bytes by bare file name, as for `readArchive`
 * @param options - `leaveOutFaulty` goes on without the faulty rows
 * @returns the archive
 * @throws {ArchiveError} with every fault; with `leaveOutFaulty` only if no tile is left of a faulty
 *   archive
 * @example
 * const csv = 'tile,SiO2,Al2O3,CaO,cone,surface\nA,6,0.8,2,6,gloss\n';
 * parseArchive(new Map([['a.csv', new TextEncoder().encode(csv)]])).tiles[0].unity.SiO2; // 3
 */
export function parseArchive(
  files: ReadonlyMap<string, Uint8Array>,
  options: ParseOptions = {},
): Archive {
  const { archive, faults } = readArchive(files);
  if (faults.length === 0) return archive;
  if (options.leaveOutFaulty === true && archive.tiles.length > 0) return archive;
  const hint =
    options.leaveOutFaulty === true
      ? 'No sound tile is left: mend the files first.'
      : 'Mend the files, or go on without the faulty rows.';
  throw new ArchiveError(faults, hint);
}

function valuesOf<Value>(source: Register<Value> | undefined): Value[] {
  return [...(source?.sound.values() ?? [])];
}

function tileCounts(read: number, tiles: readonly Tile[]): TileCounts {
  const count = (verdict: Tile['verdict']) =>
    tiles.filter((tile) => tile.verdict === verdict).length;
  const unjudged = count('unjudged');
  const setAside = count('overfired');
  const fitted = tiles.length - unjudged - setAside;
  return { read, fitted, unjudged, setAside, refused: read - tiles.length };
}

/** A recipe without a flux is a fault where a tile is made of it; a slip or a wash may well have none. */
function unusableRecipes({ withoutUnity }: RecipesRead, used: ReadonlySet<string>) {
  const entries = inNameOrder(withoutUnity, ([recipe]) => recipe);
  return {
    faults: entries.filter(([recipe]) => used.has(recipe)).map(([, fault]) => fault),
    notes: entries
      .filter(([recipe]) => !used.has(recipe))
      .map(
        ([, { file, line, message }]) =>
          `${file}:${line} recipe ${message}; left out, no tile uses it`,
      ),
  };
}

function inOrder(faults: readonly Fault[], { found }: FilesFound): Fault[] {
  const names = ARCHIVE_FILES.map((name) => found.get(name)?.file ?? name);
  // A file of another name has rank -1 and comes first: what it was meant to hold is missing below.
  const rank = ({ file }: Fault) => names.indexOf(file);
  return [...faults].sort((a, b) => rank(a) - rank(b) || a.line - b.line);
}
