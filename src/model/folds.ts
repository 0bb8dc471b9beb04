import { OXIDES } from '../chemistry/oxides.ts';
import type { JudgedTile } from './stages.ts';

/** Tiles that are left out together. */
export interface Fold {
  readonly leftOut: string;
  readonly tiles: readonly JudgedTile[];
}

/** Bounds the time of validation: beyond it whole groups share a fold. */
const MOST_FOLDS = { load: 20, glaze: 10 };
/** With so many tiles fewer folds tell as much. */
const MANY_TILES = 1000;
const FOLDS_OF_MANY = { load: 8, glaze: 5 };

function mostFolds(tiles: readonly JudgedTile[]): typeof MOST_FOLDS {
  return tiles.length > MANY_TILES ? FOLDS_OF_MANY : MOST_FOLDS;
}

/**
 * One fold for each whole cone that was fired; a load between two counts to the nearer.
 *
 * @param tiles - judged tiles
 * @returns folds from the coldest cone to the hottest; their names are cone indexes
 */
export function foldsByCone(tiles: readonly JudgedTile[]): Fold[] {
  const groups = groupedBy(tiles, (tile) => String(Math.round(tile.heat.coneIndex)));
  return [...groups]
    .map(([leftOut, members]) => ({ leftOut, tiles: members }))
    .sort((a, b) => Number(a.leftOut) - Number(b.leftOut));
}

/**
 * Folds of whole loads.
 *
 * @param tiles - judged tiles
 * @returns one fold a load, or 20 of whole loads where there are more
 */
export function foldsByLoad(tiles: readonly JudgedTile[]): Fold[] {
  return packed(
    groupedBy(tiles, (tile) => tile.load),
    mostFolds(tiles).load,
    'loads',
  );
}

/**
 * Folds of whole glazes: a recipe, a formula or a blend never stands on both sides.
 *
 * @param tiles - judged tiles
 * @returns one fold a family of glazes, or 10 of whole families where there are more
 */
export function foldsByGlaze(tiles: readonly JudgedTile[]): Fold[] {
  const family = glazeFamilies(tiles);
  return packed(
    groupedBy(tiles, (tile) => family.get(tile)!),
    mostFolds(tiles).glaze,
    'glazes',
  );
}

/** Joins tiles that share a recipe, a blend or a formula, directly or over others. */
function glazeFamilies(tiles: readonly JudgedTile[]): Map<JudgedTile, string> {
  const parent = new Map<string, string>();
  const root = (key: string): string => {
    let at = key;
    for (let up = parent.get(at) ?? at; up !== at; up = parent.get(at) ?? at) at = up;
    parent.set(key, at);
    return at;
  };
  const keysOf = (tile: JudgedTile) => [
    formulaKey(tile),
    ...(tile.recipe === undefined ? [] : [`recipe ${tile.recipe}`]),
    ...(tile.blend === undefined ? [] : [`blend ${tile.blend}`]),
  ];
  for (const tile of tiles) {
    const [first = '', ...others] = keysOf(tile).map(root).sort();
    for (const other of others) parent.set(other, first);
  }
  return new Map(tiles.map((tile) => [tile, root(formulaKey(tile))]));
}

/** The formula to a thousandth of a mole: what a balance can tell apart. */
function formulaKey({ unity }: JudgedTile): string {
  return `formula ${OXIDES.map((oxide) => (unity[oxide] ?? 0).toFixed(3)).join(' ')}`;
}

/** Groups packed into at most so many folds, the largest first, each into the emptiest fold. */
function packed(groups: Map<string, JudgedTile[]>, most: number, kind: string): Fold[] {
  const sorted = [...groups].sort(
    ([a, tilesA], [b, tilesB]) => tilesB.length - tilesA.length || (a < b ? -1 : 1),
  );
  if (sorted.length <= most) return sorted.map(([leftOut, tiles]) => ({ leftOut, tiles }));
  const bins = Array.from({ length: most }, () => ({ groups: 0, tiles: [] as JudgedTile[] }));
  for (const [, tiles] of sorted) {
    const emptiest = bins.reduce((a, b) => (b.tiles.length < a.tiles.length ? b : a));
    emptiest.groups += 1;
    emptiest.tiles.push(...tiles);
  }
  return bins.map((bin, i) => ({ leftOut: `${kind} ${i + 1} (${bin.groups})`, tiles: bin.tiles }));
}

function groupedBy<T>(items: readonly T[], key: (item: T) => string): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const name = key(item);
    const group = groups.get(name);
    if (group) group.push(item);
    else groups.set(name, [item]);
  }
  return groups;
}
