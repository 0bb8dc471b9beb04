import type { TileTree } from './tile-tree.ts';

/** Where a search stands. */
export interface TreePlace {
  /** Composition and heat in steps, [sides of the tree]. */
  readonly steps: readonly number[];
  /** Sum of squares of the steps that are the same from all tiles. */
  readonly apart: number;
}

/** A tile that a search found. */
export interface FoundTile {
  /** Its place in the list that the tree was made of. */
  readonly tile: number;
  /** Steps, heat among them. */
  readonly distance: number;
  readonly heat: number;
}

/**
 * Bounds are rounded otherwise than distances: what is passed by must be farther by more than the rounding
 * of either.
 */
const SLACK = 1 + 1e-9;

/**
 * The tiles nearest to a place.
 *
 * @param tree - the tiles
 * @param place - where
 * @param count - how many at most
 * @returns nearest first; equally near ones in the order of the list
 */
export function nearestTiles(tree: TileTree, place: TreePlace, count: number): FoundTile[] {
  const found: FoundTile[] = [];
  const search = {
    limit: Infinity,
    look: (from: number, to: number) => {
      for (let i = from; i < to; i++) {
        const distance = distanceOf(tree, place, i, search.limit);
        if (found.length === count && distance > found[count - 1]!.distance) continue;
        insert(found, { tile: tree.order[i]!, distance, heat: heatOf(tree, i) });
        if (found.length > count) found.pop();
        if (found.length === count) search.limit = found[count - 1]!.distance ** 2 * SLACK;
      }
    },
  };
  passThrough(tree, place, search, true);
  return found;
}

function insert(found: FoundTile[], next: FoundTile): void {
  let at = found.push(next) - 1;
  while (at > 0 && isBefore(next, found[at - 1]!)) {
    found[at] = found[at - 1]!;
    found[--at] = next;
  }
}

function isBefore(one: FoundTile, other: FoundTile): boolean {
  if (one.distance !== other.distance) return one.distance < other.distance;
  return one.tile < other.tile;
}

/**
 * How many tiles lie within a radius, heat among the steps.
 *
 * @param tree - the tiles
 * @param place - where
 * @param radius - steps
 * @returns their number
 */
export function tilesInRadius(tree: TileTree, place: TreePlace, radius: number): number {
  let count = 0;
  const limit = radius * radius * SLACK;
  const look = (from: number, to: number) => {
    for (let i = from; i < to; i++) if (distanceOf(tree, place, i, limit) <= radius) count++;
  };
  passThrough(tree, place, { limit, look }, true);
  return count;
}

/**
 * Heats of the tiles whose composition lies within a radius.
 *
 * @param tree - the tiles
 * @param place - where; its heat does not count
 * @param radius - steps
 * @returns the coolest and the hottest, in steps; undefined where there is no such tile
 */
export function heatsInRadius(
  tree: TileTree,
  place: TreePlace,
  radius: number,
): readonly [number, number] | undefined {
  let coolest = Infinity;
  let hottest = -Infinity;
  const look = (from: number, to: number) => {
    for (let i = from; i < to; i++) {
      if (squareOf(tree, place, i, Infinity) > radius * radius) continue;
      coolest = Math.min(coolest, heatOf(tree, i));
      hottest = Math.max(hottest, heatOf(tree, i));
    }
  };
  passThrough(tree, place, { limit: radius * radius * SLACK, look }, false);
  return coolest <= hottest ? [coolest, hottest] : undefined;
}

interface Search {
  /** Squares above this need not be looked at. */
  readonly limit: number;
  /** Looks at the tiles of a box. */
  readonly look: (from: number, to: number) => void;
}

/** Looks at the tiles of every box that is near enough, the nearer half of a box first. */
function passThrough(tree: TileTree, place: TreePlace, search: Search, heatCounts: boolean): void {
  const { low, high, sides } = tree;
  const { from, to, upper, side, lowerMost, upperLeast } = tree.boxes;
  // How far the box is along each side; what does not count is as far as can be already.
  const offs: number[] = [];
  let square = place.apart;
  for (let i = 0; i < sides; i++) {
    const at = place.steps[i]!;
    const counts = heatCounts || i < sides - 1;
    const off = Math.max(low[i]! - at, at - high[i]!, 0);
    offs.push(counts ? off : Infinity);
    if (counts) square += off * off;
  }
  const enter = (box: number, along: number, off: number, before: number): void => {
    const known = offs[along]!;
    if (!(off > known)) {
      pass(box, before);
      return;
    }
    offs[along] = off;
    pass(box, before - known * known + off * off);
    offs[along] = known;
  };
  const pass = (box: number, least: number): void => {
    if (least > search.limit) return;
    const half = upper[box]!;
    if (half === 0) {
      search.look(from[box]!, to[box]!);
      return;
    }
    const along = side[box]!;
    const offLower = place.steps[along]! - lowerMost[box]!;
    const offUpper = upperLeast[box]! - place.steps[along]!;
    const isLowerFirst = offLower <= offUpper;
    if (isLowerFirst) enter(box + 1, along, offLower, least);
    enter(half, along, offUpper, least);
    if (!isLowerFirst) enter(box + 1, along, offLower, least);
  };
  if (tree.order.length > 0) pass(0, square);
}

/** After so many oxides a tile is far enough in most cases. */
const FIRST_OXIDES = 3;

/**
 * Square of the composition's distance from a tile, summed in the order of the oxides; Infinity where it is
 * above the limit after some of them.
 */
function squareOf({ rows, sides }: TileTree, place: TreePlace, i: number, limit: number): number {
  const oxides = sides - 1;
  const some = Math.min(FIRST_OXIDES, oxides);
  const from = i * sides;
  let square = place.apart;
  for (let side = 0; side < some; side++) {
    const off = rows[from + side]! - place.steps[side]!;
    square += off * off;
  }
  if (square > limit) return Infinity;
  for (let side = some; side < oxides; side++) {
    const off = rows[from + side]! - place.steps[side]!;
    square += off * off;
  }
  return square;
}

function heatOf({ rows, sides }: TileTree, i: number): number {
  return rows[(i + 1) * sides - 1]!;
}

/** Distance from a tile; Infinity where its square is above the limit for sure. */
function distanceOf(tree: TileTree, place: TreePlace, i: number, limit: number): number {
  const heat = heatOf(tree, i) - place.steps[tree.sides - 1]!;
  return Math.sqrt(squareOf(tree, place, i, limit - heat * heat) + heat * heat);
}
