/**
 * Tiles as points of a space in which one unit is a step, in boxes within boxes: a search passes by the boxes that
 * are too far, and finds what a look at every tile would find, to the last bit.
 *
 * Source: J. L. Bentley, Communications of the ACM 18 (1975) 509-517; cut in the middle of the longest side.
 */
export interface TileTree {
  /** Places of the tiles in the list they came from; tiles of one box stand together. */
  readonly order: Int32Array;
  /** Compositions and heat in that order, in steps, [tiles][sides], heat last. */
  readonly rows: Float64Array;
  /** Oxides and heat. */
  readonly sides: number;
  /** Least and most of each side. */
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly boxes: Boxes;
}

/** The boxes, numbered: 0 holds all tiles, and the lower half of a box has the next number. */
export interface Boxes {
  /** Tiles from `from` to before `to`. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** Number of the upper half; 0 where the box is not cut. */
  readonly upper: Int32Array;
  /** Along which side it is cut. */
  readonly side: Int32Array;
  /** Most of the lower half along that side, and least of the upper half. */
  readonly lowerMost: Float64Array;
  readonly upperLeast: Float64Array;
}

/** Tiles that are looked at one by one. */
const SMALL_BOX = 6;

/**
 * Puts tiles into boxes.
 *
 * @param rows - compositions and heat in steps, [tiles][sides], heat last
 * @param sides - oxides and heat
 * @returns the tree
 */
export function tileTree(rows: Float64Array, sides: number): TileTree {
  const order = Int32Array.from({ length: rows.length / sides }, (_, i) => i);
  const boxes: Box[] = [];
  addBoxes(boxes, { order, rows, sides }, 0, order.length);
  const { low, high } = cornersOf({ order, rows, sides }, 0, order.length);
  const inOrder = new Float64Array(rows.length);
  order.forEach((tile, i) => {
    inOrder.set(rows.subarray(tile * sides, (tile + 1) * sides), i * sides);
  });
  return { order, rows: inOrder, sides, low, high, boxes: inColumns(boxes) };
}

type Box = { -readonly [key in keyof Boxes]: number };

function inColumns(boxes: readonly Box[]): Boxes {
  return {
    from: Int32Array.from(boxes, ({ from }) => from),
    to: Int32Array.from(boxes, ({ to }) => to),
    upper: Int32Array.from(boxes, ({ upper }) => upper),
    side: Int32Array.from(boxes, ({ side }) => side),
    lowerMost: Float64Array.from(boxes, ({ lowerMost }) => lowerMost),
    upperLeast: Float64Array.from(boxes, ({ upperLeast }) => upperLeast),
  };
}

interface Rows {
  /** Changed while boxes are made. */
  readonly order: Int32Array;
  readonly rows: Float64Array;
  readonly sides: number;
}

/** Adds a box and all that are in it. */
function addBoxes(boxes: Box[], tiles: Rows, from: number, to: number): void {
  const box: Box = { from, to, upper: 0, side: 0, lowerMost: 0, upperLeast: 0 };
  boxes.push(box);
  if (to - from <= SMALL_BOX) return;
  const { low, high } = cornersOf(tiles, from, to);
  const side = longest(low, high);
  const { middle, ...ends } = parted(tiles, from, to, side, (low[side]! + high[side]!) / 2);
  // Tiles that are all alike cannot be parted.
  if (middle === from || middle === to) return;
  addBoxes(boxes, tiles, from, middle);
  Object.assign(box, { side, upper: boxes.length, ...ends });
  addBoxes(boxes, tiles, middle, to);
}

function cornersOf({ order, rows, sides }: Rows, from: number, to: number) {
  const low = new Float64Array(sides).fill(Infinity);
  const high = new Float64Array(sides).fill(-Infinity);
  for (let i = from; i < to; i++) {
    for (let side = 0; side < sides; side++) {
      const at = rows[order[i]! * sides + side]!;
      if (at < low[side]!) low[side] = at;
      if (at > high[side]!) high[side] = at;
    }
  }
  return { low, high };
}

function longest(low: Float64Array, high: Float64Array): number {
  let found = 0;
  for (let side = 1; side < low.length; side++) {
    if (high[side]! - low[side]! > high[found]! - low[found]!) found = side;
  }
  return found;
}

/** Brings the tiles up to a place to the front, and says where the others begin. */
function parted(
  { order, rows, sides }: Rows,
  from: number,
  to: number,
  side: number,
  place: number,
) {
  let middle = from;
  let lowerMost = -Infinity;
  let upperLeast = Infinity;
  for (let i = from; i < to; i++) {
    const tile = order[i]!;
    const at = rows[tile * sides + side]!;
    if (at > place) {
      upperLeast = Math.min(upperLeast, at);
      continue;
    }
    lowerMost = Math.max(lowerMost, at);
    order[i] = order[middle]!;
    order[middle++] = tile;
  }
  return { middle, lowerMost, upperLeast };
}
