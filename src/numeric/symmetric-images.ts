import { lowerIndex } from './linalg.ts';
import { inTiles, productLoop, type ProductLoop } from './product-loop.ts';

/** So many rows at a time stay in the processor's nearest memory. */
const ROWS_AT_ONCE = 32;

/** What is done with some rows and their images, both [rows][size] with strides. */
type Take = (image: Float64Array, at: number, row: number) => void;

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
  eachImage(rows, size, lower, (images, at, i) => {
    let sum = 0;
    for (let j = 0, base = i * size; j < size; j++) sum += images[at + j]! * rows[base + j]!;
    forms[i] = sum;
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
  eachImage(rows, size, lower, (images, at, i) => {
    for (let j = 0, base = i * size; j < size; j++) all[base + j] = images[at + j]!;
  });
  return all;
}

/** Each sum takes its terms in the order of the columns, here and in the plain loop. */
function eachImage(rows: Float64Array, size: number, lower: Float64Array, take: Take): void {
  if (size === 0) return;
  const loop = productLoop();
  if (loop === undefined) eachPlainImage(rows, size, lower, take);
  else eachLoopImage(loop, rows, size, lower, take);
}

function eachLoopImage(
  loop: ProductLoop,
  rows: Float64Array,
  size: number,
  lower: Float64Array,
  take: Take,
): void {
  const padded = inTiles(size);
  const matrix = { at: 0, stride: padded };
  const turned = { at: size * padded, stride: ROWS_AT_ONCE };
  const images = { at: turned.at + size * ROWS_AT_ONCE, stride: padded };
  const numbers = loop.numbers(images.at + ROWS_AT_ONCE * padded);
  fillSquare(numbers, size, padded, lower);
  const count = rows.length / size;
  for (let first = 0; first < count; first += ROWS_AT_ONCE) {
    const here = Math.min(ROWS_AT_ONCE, count - first);
    for (let i = 0, at = first * size; i < here; i++) {
      for (let j = 0, to = turned.at + i; j < size; j++, to += ROWS_AT_ONCE) {
        numbers[to] = rows[at++]!;
      }
    }
    numbers.fill(0, images.at, images.at + here * padded);
    loop.run(turned, matrix, images, size, { rows: here, columns: size });
    for (let i = 0; i < here; i++) take(numbers, images.at + i * padded, first + i);
  }
}

function fillSquare(
  numbers: Float64Array,
  size: number,
  padded: number,
  lower: Float64Array,
): void {
  for (let i = 0, cell = 0; i < size; i++) {
    for (let j = 0; j <= i; j++, cell++) {
      numbers[i * padded + j] = lower[cell]!;
      numbers[j * padded + i] = lower[cell]!;
    }
  }
}

/**
 * The same without WebAssembly, for engines that have none.
 *
 * @param rows - [rows][size]
 * @param size - columns
 * @param lower - lower triangle of A
 * @param take - is given the image of each row
 */
export function eachPlainImage(
  rows: Float64Array,
  size: number,
  lower: Float64Array,
  take: Take,
): void {
  const image = new Float64Array(size);
  for (let i = 0, base = 0; base < rows.length; i++, base += size) {
    for (let j = 0; j < size; j++) {
      let sum = 0;
      for (let k = 0; k < size; k++) {
        const cell = k <= j ? lowerIndex(j, k) : lowerIndex(k, j);
        sum += rows[base + k]! * lower[cell]!;
      }
      image[j] = sum;
    }
    take(image, 0, i);
  }
}
