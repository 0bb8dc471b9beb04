import type { Fault } from '../errors.ts';
import type { Tile } from './archive.ts';
import { repeatedName } from './register.ts';
import type { Sheet } from './sheet.ts';
import type { TileValues } from './tile-columns.ts';
import { tileOfRow, type TileContext } from './tile-row.ts';

export interface TilesRead {
  /** The sound tiles, in the order of the file. */
  readonly tiles: readonly Tile[];
  readonly faults: readonly Fault[];
  /** Recipes that tiles name, sound or not. */
  readonly recipesUsed: ReadonlySet<string>;
}

/**
 * The tiles of tiles.csv.
 *
 * @param sheet - the file, read
 * @param parts - what the other files define
 * @returns the sound tiles and every fault; no tile where the headings are faulty
 */
export function tileRows(
  sheet: Sheet<TileValues>,
  parts: Pick<TileContext, 'recipes' | 'firings' | 'witness'>,
): TilesRead {
  const { file, has, rows, headFaults } = sheet;
  const loadAlone = loadsAlone(sheet, parts.firings?.sound.keys() ?? []);
  const context = { file, has, isWhole: headFaults.length === 0, loadAlone, ...parts };
  const firstLine = new Map<string, number>();
  const tiles: Tile[] = [];
  const faults: Fault[] = [...headFaults];
  for (const row of rows) {
    const { tile, faults: ofRow } = tileOfRow(row, context);
    const { tile: name } = row.values;
    const first = name === undefined ? undefined : firstLine.get(name);
    faults.push(...ofRow);
    if (name !== undefined && first !== undefined) {
      faults.push(repeatedName(file, row.line, 'tile', name, first));
    } else {
      if (name !== undefined) firstLine.set(name, row.line);
      if (tile !== undefined) tiles.push(tile);
    }
  }
  const recipesUsed = new Set(rows.flatMap(({ values }) => values.recipe ?? []));
  return { tiles, faults, recipesUsed };
}

/** Names the load of a tile without a firing, so that no firing has the same name. */
function loadsAlone(sheet: Sheet<TileValues>, firings: Iterable<string>) {
  const labels = sheet.rows.flatMap(({ values }) => values.firing ?? []);
  const taken = new Set([...firings, ...labels]);
  return (tile: string): string => {
    let load = `tile ${tile}`;
    while (taken.has(load)) load += ' alone';
    taken.add(load);
    return load;
  };
}
