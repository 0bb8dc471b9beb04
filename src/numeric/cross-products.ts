import { TILE } from './cross-products-loop.ts';
import { inTiles, productLoop, type ProductLoop } from './product-loop.ts';

/** So many rows at a time stay in the processor's nearest memory. */
const ROWS_AT_ONCE = 32;

/**
 * Adds the rows' weighted cross products: the inner loop of the fit, which takes most of its time.
 *
 * Each sum starts at 0 and takes row after row before it is added. It runs in WebAssembly, four times as fast
 * as the plain loop, and gives the same numbers to the last bit.
 *
 * @param rows - [rows][size]
 * @param size - columns
 * @param weights - of each row
 * @param products - lower triangle, changed
 */
export function addCrossProducts(
  rows: Float64Array,
  size: number,
  weights: Float64Array,
  products: Float64Array,
): void {
  addChunks({ rows, size, count: weights.length }, products, (chunk, first, weighted) => {
    for (let at = 0, i = first; at < chunk.length; i++) {
      const weight = weights[i]!;
      for (let j = 0; j < size; j++, at++) weighted[at] = weight * chunk[at]!;
    }
  });
}

/**
 * Adds the products of each row of one matrix with the same row of another, as far as they stand below the
 * diagonal: of use where their sum is symmetric.
 *
 * @param left - [rows][size]
 * @param right - [rows][size]
 * @param size - columns
 * @param products - lower triangle, changed
 */
export function addPairedProducts(
  left: Float64Array,
  right: Float64Array,
  size: number,
  products: Float64Array,
): void {
  const count = size === 0 ? 0 : right.length / size;
  addChunks({ rows: right, size, count }, products, (chunk, first, weighted) => {
    weighted.set(left.subarray(first * size, first * size + chunk.length));
  });
}

interface Rows {
  readonly rows: Float64Array;
  readonly size: number;
  readonly count: number;
}

/** Writes the left side of the products of some rows. */
type FillLeft = (chunk: Float64Array, first: number, left: Float64Array) => void;

function addChunks(given: Rows, products: Float64Array, fillLeft: FillLeft): void {
  if (given.size === 0 || given.count === 0) return;
  const loop = productLoop();
  if (loop === undefined) addPlainly(given, products, fillLeft);
  else addByLoop(loop, given, products, fillLeft);
}

function addByLoop(
  loop: ProductLoop,
  { rows, size, count }: Rows,
  products: Float64Array,
  fillLeft: FillLeft,
): void {
  const padded = inTiles(size);
  const left = { at: 0, stride: size };
  // A tile reads past the last column.
  const right = { at: ROWS_AT_ONCE * size + TILE, stride: size };
  const sums = { at: 2 * right.at, stride: padded };
  const numbers = loop.numbers(sums.at + padded * padded);
  numbers.fill(0, sums.at, sums.at + padded * padded);
  for (let first = 0; first < count; first += ROWS_AT_ONCE) {
    const here = Math.min(ROWS_AT_ONCE, count - first);
    const chunk = rows.subarray(first * size, (first + here) * size);
    numbers.set(chunk, right.at);
    fillLeft(chunk, first, numbers);
    loop.run(left, right, sums, { terms: here, rows: size, columns: size, sparse: 'sums' });
  }
  for (let j = 0, cell = 0; j < size; j++) {
    for (let k = 0; k <= j; k++) products[cell++]! += numbers[sums.at + j * padded + k]!;
  }
}

/**
 * The same without WebAssembly, for engines that have none.
 *
 * @param given - rows
 * @param products - lower triangle, changed
 * @param fillLeft - writes the left side of the products of some rows
 */
export function addPlainly(
  { rows, size, count }: Rows,
  products: Float64Array,
  fillLeft: FillLeft,
): void {
  const sums = new Float64Array(products.length);
  const left = new Float64Array(size);
  for (let i = 0; i < count; i++) {
    const row = rows.subarray(i * size, (i + 1) * size);
    fillLeft(row, i, left);
    for (let j = 0, cell = 0; j < size; j++) {
      const factor = left[j]!;
      for (let k = 0; k <= j; k++) sums[cell++]! += factor * row[k]!;
    }
  }
  for (let cell = 0; cell < sums.length; cell++) products[cell]! += sums[cell]!;
}
