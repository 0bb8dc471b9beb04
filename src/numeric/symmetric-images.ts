import { inTiles, productLoop, type ProductLoop } from './product-loop.ts';

/** So many rows at a time stay in the processor's nearest memory. */
const ROWS_AT_ONCE = 32;

/** Is given each row's image, from `at` on. */
type Take = (image: Float64Array, at: number, row: number) => void;

/** What rows are multiplied by: [terms][columns]; `isUpper` if it is 0 below its diagonal. */
interface Square {
  readonly size: number;
  readonly values: Float64Array;
  readonly isUpper: boolean;
}

/**
 * x' A x for many x and one symmetric A: the variances of weighted sums.
 *
 * @param rows - [rows][size]: the x
 * @param size - columns
 * @param lower - lower triangle of A
 * @returns per row
 * @example
 * Array.from(quadraticForms(Float64Array.of(1, 2, 0, 1), 2, Float64Array.of(4, 1, 9))); // [44, 9]
 */
export function quadraticForms(
  rows: Float64Array,
  size: number,
  lower: Float64Array,
): Float64Array {
  const forms = new Float64Array(size === 0 ? 0 : rows.length / size);
  // Twice the sum over the lower triangle with half its diagonal.
  const values = new Float64Array(size * size);
  for (let j = 0, cell = 0; j < size; j++) {
    for (let k = 0; k < j; k++) values[k * size + j] = lower[cell++]!;
    values[j * size + j] = 0.5 * lower[cell++]!;
  }
  const half = { size, values, isUpper: true };
  eachImage(rows, half, (images, at, i) => {
    let sum = 0;
    for (let j = 0, base = i * size; j < size; j++) sum += images[at + j]! * rows[base + j]!;
    forms[i] = 2 * sum;
  });
  return forms;
}

/**
 * A x for many x and one symmetric A.
 *
 * @param rows - [rows][size]: the x
 * @param size - columns
 * @param lower - lower triangle of A
 * @returns [rows][size]
 * @example
 * Array.from(symmetricImages(Float64Array.of(1, 2, 0, 1), 2, Float64Array.of(4, 1, 9))); // [6, 19, 1, 9]
 */
export function symmetricImages(
  rows: Float64Array,
  size: number,
  lower: Float64Array,
): Float64Array {
  const all = new Float64Array(rows.length);
  const values = new Float64Array(size * size);
  for (let j = 0, cell = 0; j < size; j++) {
    for (let k = 0; k <= j; k++, cell++) {
      values[k * size + j] = lower[cell]!;
      values[j * size + k] = lower[cell]!;
    }
  }
  eachImage(rows, { size, values, isUpper: false }, (images, from, i) => {
    for (let j = 0, base = i * size; j < size; j++) all[base + j] = images[from + j]!;
  });
  return all;
}

/** Each sum takes its terms in the order of the columns, here and in the plain loop. */
function eachImage(rows: Float64Array, matrix: Square, take: Take): void {
  if (matrix.size === 0 || rows.length === 0) return;
  const loop = productLoop();
  if (loop === undefined) eachPlainImage(rows, matrix, take);
  else eachLoopImage(loop, rows, matrix, take);
}

function eachLoopImage(loop: ProductLoop, rows: Float64Array, given: Square, take: Take): void {
  const { size, isUpper } = given;
  const padded = inTiles(size);
  const matrix = { at: 0, stride: padded };
  const turned = { at: padded * padded, stride: ROWS_AT_ONCE };
  const images = { at: turned.at + padded * ROWS_AT_ONCE, stride: padded };
  const numbers = loop.numbers(images.at + ROWS_AT_ONCE * padded);
  numbers.fill(0, 0, images.at);
  for (let k = 0; k < size; k++) {
    numbers.set(given.values.subarray(k * size, (k + 1) * size), k * padded);
  }
  const count = rows.length / size;
  for (let first = 0; first < count; first += ROWS_AT_ONCE) {
    const here = Math.min(ROWS_AT_ONCE, count - first);
    for (let i = 0, at = first * size; i < here; i++) {
      for (let j = 0, to = turned.at + i; j < size; j++, to += ROWS_AT_ONCE) {
        numbers[to] = rows[at++]!;
      }
    }
    numbers.fill(0, images.at, images.at + here * padded);
    const shape = { terms: size, rows: here, columns: size };
    loop.run(turned, matrix, images, isUpper ? { ...shape, sparse: 'terms' } : shape);
    for (let i = 0; i < here; i++) take(numbers, images.at + i * padded, first + i);
  }
}

/**
 * The same without WebAssembly, for engines that have none.
 *
 * @param rows - [rows][size]
 * @param matrix - what they are multiplied by
 * @param take - is given the image of each row
 */
export function eachPlainImage(rows: Float64Array, { size, values }: Square, take: Take): void {
  const image = new Float64Array(size);
  for (let i = 0, base = 0; base < rows.length; i++, base += size) {
    for (let j = 0; j < size; j++) {
      let sum = 0;
      for (let k = 0; k < size; k++) sum += rows[base + k]! * values[k * size + j]!;
      image[j] = sum;
    }
    take(image, 0, i);
  }
}
