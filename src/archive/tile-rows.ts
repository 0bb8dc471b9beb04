import type { Fault } from '../errors.ts';
import type { Tile } from './archive.ts';
import { repeatedNames } from './repeated-names.ts';
import type { Sheet, SheetRow } from './sheet.ts';
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
  const repeated = repeatedNames(
    rows.map((row) => ({
      name: row.values.tile,
      line: row.line,
      // Rows may differ in a column whose heading could not be read.
      said: () => (context.isWhole ? saidBy(row) : undefined),
    })),
    file,
    'tile',
  );
  const tiles: Tile[] = [];
  const faults: Fault[] = [...headFaults];
  for (const row of rows) {
    const { tile, faults: ofRow } = tileOfRow(row, context);
    const ofName = repeated.get(row.line);
    faults.push(...ofRow, ...(ofName === undefined ? [] : [ofName]));
    // Of two rows of one name nobody can know which is right: neither is fitted.
    if (tile !== undefined && ofName === undefined) tiles.push(tile);
  }
  const recipesUsed = new Set(rows.flatMap(({ values }) => values.recipe ?? []));
  return { tiles, faults, recipesUsed };
}

/** What a row says, cell by cell; of a cell that could not be read, what is wrong with it. */
function saidBy({ values, faults, other }: SheetRow<TileValues>): string {
  const wrong = faults.map(({ column, message }) => [column, message]);
  return JSON.stringify([values, other, wrong]);
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
