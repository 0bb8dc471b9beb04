import * as mlRegression from 'ml-regression';
import { median } from './summary.ts';

/** A straight line. */
export interface Line {
  /** Units of y per unit of x. */
  readonly slope: number;
  /** Units of y. */
  readonly intercept: number;
}

/**
 * Robust straight line: the median of the slopes of all pairs of points, and the median of what the
 * points then lack.
 *
 * Up to 29 % of the points may be wild without the line following them.
 *
 * @param x - at least two different values
 * @param y - as many values
 * @returns slope and intercept
 * @throws {RangeError} if the lists differ in length or x holds fewer than two different values
 * @example
 * theilSen([0, 1, 2, 3], [1, 3, 5, 70]).slope; // 12.5
 *
 * Source: P. K. Sen, J. Am. Stat. Assoc. 63 (1968) 1379-1389; computed by `ml-regression`.
 */
export function theilSen(x: readonly number[], y: readonly number[]): Line {
  if (x.length !== y.length) {
    throw new RangeError(`x and y must be equally long, got ${x.length} and ${y.length}`);
  }
  if (new Set(x).size < 2) throw new RangeError('x must hold at least two different values');
  const lowerMiddle = (values: readonly number[]) =>
    new mlRegression.TheilSenRegression([...x], [...values]).slope;
  // Of an even number of slopes the package takes the lower of the middle two, and so of the
  // mirrored line the upper.
  const slope = (lowerMiddle(y) - lowerMiddle(y.map((value) => -value))) / 2;
  return { slope, intercept: median(y.map((value, i) => value - slope * x[i]!)) };
}
