import { op, wasmBytes, type Code } from './wasm-module.ts';

/** Rows and columns of a tile of sums that stays in the processor's registers. */
export const TILE = 4;
const BYTES = 8;

/** What the loop is given, then what it works with. */
const [LEFT, RIGHT, SUMS, TERMS, LEFT_STRIDE, RIGHT_STRIDE, SUMS_STRIDE] = [
  0, 1, 2, 3, 4, 5, 6,
] as const;
const [ROWS, COLUMNS, COLUMNS_SLOPE, TERMS_SLOPE] = [7, 8, 9, 10] as const;
const PARAMETERS = 11;
const [ROW, COLUMN, FROM_LEFT, FROM_RIGHT, END, CELL] = [11, 12, 13, 14, 15, 16] as const;
const WHOLE_LOCALS = 6;
const FIRST_SUM = PARAMETERS + WHOLE_LOCALS;
const SUM_PAIRS = (TILE * TILE) / 2;
const FIRST = FIRST_SUM + SUM_PAIRS;
const SECOND = FIRST + 1;
const FACTOR = FIRST + 2;
const PAIR_LOCALS = SUM_PAIRS + 3;

const { get, set, add, multiply, constant } = op;
const inBytes = (numbers: Code): Code => multiply(numbers, constant(BYTES));
const step = (local: number, by: Code): Code => set(local, add(get(local), by));
const tileRows = Array.from({ length: TILE }, (_, r) => r);

/** One term of each sum of a tile. */
const oneTerm: Code = [
  set(FIRST, op.loadPair(get(FROM_RIGHT), 0)),
  set(SECOND, op.loadPair(get(FROM_RIGHT), 2 * BYTES)),
  tileRows.map((r) => [
    set(FACTOR, op.loadTwice(get(FROM_LEFT), BYTES * r)),
    [FIRST, SECOND].map((pair, side) => {
      const sum = FIRST_SUM + 2 * r + side;
      return set(sum, op.addPairs(get(sum), op.multiplyPairs(get(FACTOR), get(pair))));
    }),
  ]),
  step(FROM_LEFT, get(LEFT_STRIDE)),
  step(FROM_RIGHT, get(RIGHT_STRIDE)),
];

/** Does something with each pair of the tile's sums, at its address. */
const eachSum = (act: (sum: number, offset: number) => Code): Code => [
  set(CELL, add(get(SUMS), add(multiply(get(ROW), get(SUMS_STRIDE)), inBytes(get(COLUMN))))),
  tileRows.map((r) => [
    act(FIRST_SUM + 2 * r, 0),
    act(FIRST_SUM + 2 * r + 1, 2 * BYTES),
    step(CELL, get(SUMS_STRIDE)),
  ]),
];

const termsOfTile: Code = add(get(TERMS), multiply(get(TERMS_SLOPE), get(COLUMN)));
const oneTile: Code = [
  set(FROM_LEFT, add(get(LEFT), inBytes(get(ROW)))),
  set(FROM_RIGHT, add(get(RIGHT), inBytes(get(COLUMN)))),
  set(END, add(get(FROM_LEFT), multiply(termsOfTile, get(LEFT_STRIDE)))),
  eachSum((sum, offset) => set(sum, op.loadPair(get(CELL), offset))),
  op.repeat(oneTerm, op.isBelow(get(FROM_LEFT), get(END))),
  eachSum((sum, offset) => op.storePair(get(CELL), offset, get(sum))),
  step(COLUMN, constant(TILE)),
];

const columnsEnd: Code = add(get(COLUMNS), multiply(get(COLUMNS_SLOPE), get(ROW)));
const tilesOfRow: Code = [
  set(COLUMN, constant(0)),
  op.repeat(oneTile, op.isBelow(get(COLUMN), columnsEnd)),
  step(ROW, constant(TILE)),
];

/**
 * The loop that adds products of columns to sums, in tiles:
 *
 *     products(left, right, sums, terms, left stride, right stride, sums stride,
 *              rows, columns, columns' slope, terms' slope)
 *     sums[j][k] += left[i][j] right[i][k], for each i below terms + terms' slope K in turn
 *
 * for all tiles (J, K) that begin at J below rows and K below columns + columns' slope J. Addresses and strides are
 * in bytes; terms, rows and columns at least 1. Tiles that stand out over the edge read and write what is there.
 *
 * @param pages - memory to begin with, in 64 KiB
 * @returns a module in binary form
 */
export function productsModule(pages: number): Uint8Array {
  const body: Code = [
    set(ROW, constant(0)),
    op.repeat(tilesOfRow, op.isBelow(get(ROW), get(ROWS))),
  ];
  const products = {
    name: 'products',
    parameters: PARAMETERS,
    wholeLocals: WHOLE_LOCALS,
    pairLocals: PAIR_LOCALS,
    body,
  };
  return wasmBytes([products], pages);
}
