import type { Archive, Heat, Tile, TileCounts, Verdict } from '../../src/archive/archive.ts';
import { coneIndex } from '../../src/firing/cone.ts';

/** Invented tile; what a test does not name is of no interest to it. */
export function aTile(given: Partial<Tile> = {}): Tile {
  const tile = given.tile ?? 'T1';
  const verdict = given.verdict ?? 'gloss';
  return {
    tile,
    line: 2,
    unity: { SiO2: 3.2, Al2O3: 0.42, B2O3: 0.15, K2O: 0.1, Na2O: 0.15, CaO: 0.75 },
    load: given.firing ?? `tile ${tile}`,
    heat: aHeat('6'),
    surfaceWritten: verdict === 'unjudged' ? '' : verdict,
    verdict,
    ...given,
  };
}

/** Heat at a cone, read on the tile itself unless said otherwise. */
export function aHeat(cone: string, source: Heat['source'] = 'tile'): Heat {
  return { cone, coneIndex: coneIndex(cone), source };
}

/** Invented archive of the tiles given; counts are theirs. */
export function anArchive(tiles: readonly Tile[] = [], given: Partial<Archive> = {}): Archive {
  return {
    fingerprint: `sha256:${'0'.repeat(64)}`,
    files: [{ file: 'tiles.csv', rows: tiles.length }],
    tiles,
    firings: [],
    witness: [],
    recipes: [],
    materials: [],
    bodies: [],
    counts: countsOf(tiles),
    notes: [],
    ...given,
  };
}

/** Counts of sound tiles: none refused. */
export function countsOf(tiles: readonly Tile[]): TileCounts {
  const count = (verdict: Verdict) => tiles.filter((tile) => tile.verdict === verdict).length;
  const unjudged = count('unjudged');
  const setAside = count('overfired');
  const read = tiles.length;
  return { read, fitted: read - unjudged - setAside, unjudged, setAside, refused: 0 };
}

/** Bytes of a text in UTF-8. */
export function bytesOf(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

/** Files of an archive from their texts: `filesOf({ 'tiles.csv': 'tile,...' })`. */
export function filesOf(texts: Readonly<Record<string, string>>): Map<string, Uint8Array> {
  return new Map(Object.entries(texts).map(([file, text]) => [file, bytesOf(text)]));
}

/** One CSV text from its rows of cells; cells are written as they are. */
export function csvOf(rows: readonly (readonly (string | number)[])[], separator = ','): string {
  return rows.map((row) => `${row.join(separator)}\n`).join('');
}
