import { addPairedProducts } from './cross-products.ts';

/** Lower triangle of a symmetric matrix, row by row: element (i, j <= i) at i (i + 1) / 2 + j. */
export type LowerTriangle = Float64Array;

/**
 * Place of element (row, column) in a lower triangle stored row by row.
 *
 * @param row - from 0
 * @param column - from 0, at most row
 * @returns index into the triangle
 * @example
 * lowerIndex(2, 1); // 4
 */
export function lowerIndex(row: number, column: number): number {
  return (row * (row + 1)) / 2 + column;
}

/**
 * Cholesky factor L of a symmetric positive definite matrix, A = L L'.
 *
 * @param matrix - lower triangle of A, row by row
 * @param size - rows of A
 * @returns lower triangle of L
 * @throws {RangeError} if A is not positive definite in double precision
 * @example
 * Array.from(choleskyFactor(Float64Array.of(4, 2, 5), 2)); // [2, 1, 2]
 *
 * Source: G. H. Golub and C. F. Van Loan, Matrix Computations, 4th ed. 2013, algorithm 4.2.1.
 */
export function choleskyFactor(matrix: LowerTriangle, size: number): LowerTriangle {
  const factor = new Float64Array(matrix.length);
  for (let i = 0; i < size; i++) {
    const row = lowerIndex(i, 0);
    const own = factor.subarray(row, row + i);
    own.set(matrix.subarray(row, row + i));
    solveLowerInPlace(factor, own);
    let pivot = matrix[row + i]!;
    for (const value of own) pivot -= value * value;
    if (!(pivot > 0 && pivot < Infinity)) {
      throw new RangeError(`matrix must be positive definite, pivot ${i} is ${pivot}`);
    }
    factor[row + i] = Math.sqrt(pivot);
  }
  return factor;
}

/**
 * Solves L y = b.
 *
 * @param factor - lower triangle of L
 * @param rightSide - b
 * @returns y
 * @example
 * Array.from(solveLower(Float64Array.of(2, 1, 2), [2, 5])); // [1, 2]
 */
export function solveLower(factor: LowerTriangle, rightSide: ArrayLike<number>): Float64Array {
  const solution = new Float64Array(rightSide);
  solveLowerInPlace(factor, solution);
  return solution;
}

/**
 * Solves L y = b where b stands, in any kind of array.
 *
 * @param factor - lower triangle of L
 * @param values - b, which y takes the place of
 * @example
 * const values = [2, 5];
 * solveLowerInPlace([2, 1, 2], values); // undefined
 * values; // [1, 2]
 */
export function solveLowerInPlace(
  factor: ArrayLike<number>,
  values: number[] | Float64Array,
): void {
  const size = values.length;
  const whole = size - (size % ROWS_AT_ONCE);
  for (let i = 0; i < whole; i += ROWS_AT_ONCE) {
    const a = lowerIndex(i, 0);
    const b = lowerIndex(i + 1, 0);
    const c = lowerIndex(i + 2, 0);
    const d = lowerIndex(i + 3, 0);
    let ofA = values[i]!;
    let ofB = values[i + 1]!;
    let ofC = values[i + 2]!;
    let ofD = values[i + 3]!;
    for (let k = 0; k < i; k++) {
      const known = values[k]!;
      ofA -= factor[a + k]! * known;
      ofB -= factor[b + k]! * known;
      ofC -= factor[c + k]! * known;
      ofD -= factor[d + k]! * known;
    }
    values[i] = ofA;
    values[i + 1] = ofB;
    values[i + 2] = ofC;
    values[i + 3] = ofD;
    solveRows(factor, values, i, i, i + ROWS_AT_ONCE);
  }
  solveRows(factor, values, 0, whole, size);
}

/** Rows that are summed side by side: the processor adds to four sums in the time of one. */
const ROWS_AT_ONCE = 4;

/** Solves rows one after the other; what lies left of `known` has been taken off already. */
function solveRows(
  factor: ArrayLike<number>,
  values: number[] | Float64Array,
  known: number,
  from: number,
  to: number,
): void {
  for (let i = from; i < to; i++) {
    const row = lowerIndex(i, 0);
    let sum = values[i]!;
    for (let k = known; k < i; k++) sum -= factor[row + k]! * values[k]!;
    values[i] = sum / factor[row + i]!;
  }
}

/**
 * Solves L' x = y.
 *
 * @param factor - lower triangle of L
 * @param rightSide - y
 * @returns x
 * @example
 * Array.from(solveUpper(Float64Array.of(2, 1, 2), [4, 4])); // [1, 2]
 */
export function solveUpper(factor: LowerTriangle, rightSide: ArrayLike<number>): Float64Array {
  const size = rightSide.length;
  const solution = new Float64Array(size);
  for (let i = size - 1; i >= 0; i--) {
    let sum = rightSide[i]!;
    for (let k = i + 1; k < size; k++) sum -= factor[lowerIndex(k, i)]! * solution[k]!;
    solution[i] = sum / factor[lowerIndex(i, i)]!;
  }
  return solution;
}

/**
 * Solves A x = b, given the Cholesky factor of A.
 *
 * @param factor - lower triangle of L, A = L L'
 * @param rightSide - b
 * @returns x
 * @example
 * Array.from(choleskySolve(Float64Array.of(2, 1, 2), [8, 12])); // [1, 2]
 */
export function choleskySolve(factor: LowerTriangle, rightSide: ArrayLike<number>): Float64Array {
  return solveUpper(factor, solveLower(factor, rightSide));
}

/**
 * ln |A|, given the Cholesky factor of A.
 *
 * @param factor - lower triangle of L, A = L L'
 * @param size - rows of A
 * @returns natural logarithm of the determinant
 * @example
 * choleskyLogDeterminant(Float64Array.of(2, 1, 2), 2); // ~2.772589
 */
export function choleskyLogDeterminant(factor: LowerTriangle, size: number): number {
  let sum = 0;
  for (let i = 0; i < size; i++) sum += Math.log(factor[lowerIndex(i, i)]!);
  return 2 * sum;
}

/**
 * Inverse of A, given its Cholesky factor: the covariance that goes with a precision.
 *
 * @param factor - lower triangle of L, A = L L'
 * @param size - rows of A
 * @returns lower triangle of the inverse of A
 * @example
 * Array.from(choleskyInverse(Float64Array.of(2, 0, 4), 2)); // [0.25, 0, 0.0625]
 */
export function choleskyInverse(factor: LowerTriangle, size: number): LowerTriangle {
  const ofFactor = lowerInverse(factor, size);
  const inverse = new Float64Array(factor.length);
  // A^-1 is the sum of the outer products of the rows of L^-1.
  const rows = new Float64Array(size * size);
  for (let k = 0; k < size; k++) {
    rows.set(ofFactor.subarray(lowerIndex(k, 0), lowerIndex(k + 1, 0)), k * size);
  }
  addPairedProducts(rows, rows, size, inverse);
  return inverse;
}

/** Inverse of a lower triangle, row by row. */
function lowerInverse(factor: LowerTriangle, size: number): LowerTriangle {
  const inverse = new Float64Array(factor.length);
  for (let i = 0; i < size; i++) {
    const row = lowerIndex(i, 0);
    for (let k = 0; k < i; k++) {
      const scale = factor[row + k]!;
      const other = lowerIndex(k, 0);
      for (let j = 0; j <= k; j++) inverse[row + j]! -= scale * inverse[other + j]!;
    }
    const pivot = factor[row + i]!;
    for (let j = 0; j < i; j++) inverse[row + j]! /= pivot;
    inverse[row + i] = 1 / pivot;
  }
  return inverse;
}

/**
 * x' A x for a symmetric A: the variance of a weighted sum, where A is the covariance.
 *
 * @param lower - lower triangle of A
 * @param x - weights of the sum
 * @returns the value; never below 0 for a covariance, up to rounding
 * @example
 * quadraticForm(Float64Array.of(4, 1, 9), [1, 2]); // 44
 */
export function quadraticForm(lower: ArrayLike<number>, x: ArrayLike<number>): number {
  const whole = x.length - (x.length % ROWS_AT_ONCE);
  let sum = 0;
  for (let i = 0; i < whole; i += ROWS_AT_ONCE) {
    const a = lowerIndex(i, 0);
    const b = lowerIndex(i + 1, 0);
    const c = lowerIndex(i + 2, 0);
    const d = lowerIndex(i + 3, 0);
    let ofA = 0;
    let ofB = 0;
    let ofC = 0;
    let ofD = 0;
    for (let j = 0; j < i; j++) {
      const value = x[j]!;
      ofA += lower[a + j]! * value;
      ofB += lower[b + j]! * value;
      ofC += lower[c + j]! * value;
      ofD += lower[d + j]! * value;
    }
    sum = withRow(lower, x, i, i, ofA, sum);
    sum = withRow(lower, x, i + 1, i, ofB, sum);
    sum = withRow(lower, x, i + 2, i, ofC, sum);
    sum = withRow(lower, x, i + 3, i, ofD, sum);
  }
  for (let i = whole; i < x.length; i++) sum = withRow(lower, x, i, 0, 0, sum);
  return sum;
}

/** The sum with one row of the form more, of which the first `known` columns are in `inner` already. */
function withRow(
  lower: ArrayLike<number>,
  x: ArrayLike<number>,
  i: number,
  known: number,
  inner: number,
  sum: number,
): number {
  const row = lowerIndex(i, 0);
  let below = inner;
  for (let j = known; j < i; j++) below += lower[row + j]! * x[j]!;
  return sum + x[i]! * (2 * below + lower[row + i]! * x[i]!);
}

/**
 * A x for a symmetric A.
 *
 * @param lower - lower triangle of A
 * @param x - vector
 * @returns the product
 * @example
 * Array.from(symmetricTimes(Float64Array.of(4, 1, 9), [1, 2])); // [6, 19]
 */
export function symmetricTimes(lower: ArrayLike<number>, x: ArrayLike<number>): Float64Array {
  const product = new Float64Array(x.length);
  for (let i = 0; i < x.length; i++) {
    const row = lowerIndex(i, 0);
    for (let j = 0; j < i; j++) {
      product[i]! += lower[row + j]! * x[j]!;
      product[j]! += lower[row + j]! * x[i]!;
    }
    product[i]! += lower[row + i]! * x[i]!;
  }
  return product;
}

/**
 * Sum of products of two equally long lists.
 *
 * @param a - first list
 * @param b - second list
 * @returns the sum
 * @example
 * dot([1, 2], [3, 4]); // 11
 */
export function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
