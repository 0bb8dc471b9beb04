import { op, wasmBytes, type Code } from './wasm-module.ts';

/** Rows and columns of a tile of sums that stays in the processor's registers. */
export const TILE = 4;
const BYTES = 8;

/** What the loop is given: addresses, counts; then what it works with. */
const [WEIGHTED, PLAIN, SUMS, COUNT, SIZE, PADDED] = [0, 1, 2, 3, 4, 5] as const;
const [ROW, COLUMN, FROM_WEIGHTED, FROM_PLAIN, END, STRIDE, CELL, SUMS_STRIDE] = [
  6, 7, 8, 9, 10, 11, 12, 13,
] as const;
const WHOLE_LOCALS = 8;
const FIRST_SUM = 14;
const SUM_PAIRS = (TILE * TILE) / 2;
const [LEFT, RIGHT, FACTOR] = [
  FIRST_SUM + SUM_PAIRS,
  FIRST_SUM + SUM_PAIRS + 1,
  FIRST_SUM + SUM_PAIRS + 2,
];
const PAIR_LOCALS = SUM_PAIRS + 3;

const { get, set, add, multiply, constant } = op;
const inBytes = (numbers: Code): Code => multiply(numbers, constant(BYTES));
const step = (local: number, by: Code): Code => set(local, add(get(local), by));
const tileRows = Array.from({ length: TILE }, (_, r) => r);

/** One row's share in the sums of a tile. */
const oneRow: Code = [
  ...set(LEFT, op.loadPair(get(FROM_PLAIN), 0)),
  ...set(RIGHT, op.loadPair(get(FROM_PLAIN), 2 * BYTES)),
  ...tileRows.flatMap((r) => [
    ...set(FACTOR, op.loadTwice(get(FROM_WEIGHTED), BYTES * r)),
    ...[LEFT, RIGHT].flatMap((pair, side) => {
      const sum = FIRST_SUM + 2 * r + side;
      return set(sum, op.addPairs(get(sum), op.multiplyPairs(get(FACTOR), get(pair))));
    }),
  ]),
  ...step(FROM_WEIGHTED, get(STRIDE)),
  ...step(FROM_PLAIN, get(STRIDE)),
];

/** Does something with each pair of the tile's sums, at its address. */
const eachSum = (act: (sum: number, offset: number) => Code): Code => [
  ...set(CELL, add(get(SUMS), inBytes(add(multiply(get(ROW), get(PADDED)), get(COLUMN))))),
  ...tileRows.flatMap((r) => [
    ...act(FIRST_SUM + 2 * r, 0),
    ...act(FIRST_SUM + 2 * r + 1, 2 * BYTES),
    ...step(CELL, get(SUMS_STRIDE)),
  ]),
];

const oneTile: Code = [
  ...set(FROM_WEIGHTED, add(get(WEIGHTED), inBytes(get(ROW)))),
  ...set(FROM_PLAIN, add(get(PLAIN), inBytes(get(COLUMN)))),
  ...set(END, add(get(FROM_WEIGHTED), multiply(get(COUNT), get(STRIDE)))),
  ...eachSum((sum, offset) => set(sum, op.loadPair(get(CELL), offset))),
  ...op.repeat(oneRow, op.isBelow(get(FROM_WEIGHTED), get(END))),
  ...eachSum((sum, offset) => op.storePair(get(CELL), offset, get(sum))),
  ...step(COLUMN, constant(TILE)),
];

const tilesOfRow: Code = [
  ...set(COLUMN, constant(0)),
  ...op.repeat(oneTile, op.isAtMost(get(COLUMN), get(ROW))),
  ...step(ROW, constant(TILE)),
];

/**
 * The loop that adds rows' cross products to sums, tile by tile below the diagonal:
 *
 *     products(weighted, plain, sums, count, size, padded)
 *     sums[j][k] += weighted[i][j] plain[i][k], for each row i in turn
 *
 * The first three are addresses of [count][size], [count][size] and [padded][padded]; count and size are
 * at least 1, padded is the size rounded up to whole tiles. Past the last column of a row it reads what comes
 * next, and its sums there mean nothing.
 *
 * @param pages - memory to begin with, in 64 KiB
 * @returns a module in binary form
 */
export function crossProductsModule(pages: number): Uint8Array {
  const body: Code = [
    ...set(STRIDE, inBytes(get(SIZE))),
    ...set(SUMS_STRIDE, inBytes(get(PADDED))),
    ...set(ROW, constant(0)),
    ...op.repeat(tilesOfRow, op.isBelow(get(ROW), get(SIZE))),
  ];
  const products = {
    name: 'products',
    parameters: 6,
    wholeLocals: WHOLE_LOCALS,
    pairLocals: PAIR_LOCALS,
    body,
  };
  return wasmBytes([products], pages);
}
