import * as statistics from 'simple-statistics';

/**
 * Arithmetic mean, with compensated summation.
 *
 * @param values - at least one
 * @returns the mean
 * @throws {RangeError} if there is no value
 * @example
 * mean([1, 2, 6]); // 3
 */
export function mean(values: readonly number[]): number {
  return statistics.mean(some(values));
}

/**
 * Median: the middle value, or the mean of the middle two.
 *
 * @param values - at least one, in any order
 * @returns the median
 * @throws {RangeError} if there is no value
 * @example
 * median([3, 1, 10, 2]); // 2.5
 */
export function median(values: readonly number[]): number {
  return statistics.median(some(values));
}

/**
 * Value below which a share p of the values lies.
 *
 * Interpolates linearly between the values of rank 1 + (n - 1) p (definition 7 of Hyndman & Fan, The
 * American Statistician 50 (1996) 361-365).
 *
 * @param values - at least one, in any order
 * @param p - 0 to 1
 * @returns the quantile
 * @throws {RangeError} if there is no value
 * @example
 * quantile([1, 2, 3, 4, 5], 0.875); // 4.5
 */
export function quantile(values: readonly number[], p: number): number {
  return statistics.quantile(some(values), p);
}

/**
 * Sample standard deviation (divisor n - 1).
 *
 * @param values - at least two
 * @returns the standard deviation
 * @throws {RangeError} if there are fewer than two values
 * @example
 * sampleSd([1, 2, 3]); // 1
 */
export function sampleSd(values: readonly number[]): number {
  if (values.length < 2) throw new RangeError(`expected at least 2 values, got ${values.length}`);
  return statistics.sampleStandardDeviation([...values]);
}

function some(values: readonly number[]): number[] {
  if (values.length === 0) throw new RangeError('expected at least 1 value, got none');
  return [...values];
}
