import { ConeError } from '../errors.ts';

/** Coldest and hottest cone of the common series (022 and 42). */
const COLDEST_INDEX = -21;
const HOTTEST_INDEX = 42;

/**
 * Place of a pyrometric cone on an even scale of cone numbers.
 *
 * Cones below 1 are written with a leading zero and run backwards (common practice): 01 is one
 * step below 1, 02 two. A decimal lies between its neighbours: 6.5 is half way from 6 to 7, 05.5
 * half way from 06 to 05. The one step between 01 and 1 is written 0.5 and the like.
 *
 * @param text - the cone as written: '6', '06', '6.5', also 'cone 6'
 * @returns steps of one cone; 1 -> 1, 01 -> 0, 02 -> -1, 06 -> -5
 * @throws {ConeError} if the text is no cone between 022 and 42
 * @example
 * coneIndex('6'); // 6
 * coneIndex('06'); // -5
 * coneIndex('05.5'); // -4.5
 */
export function coneIndex(text: string): number {
  const found = /^\s*(?:cone\s*)?(0?)([1-9]\d?(?:\.\d{1,4})?|0\.\d{1,4})\s*$/i.exec(text);
  const value = Number(found?.[2] ?? Number.NaN);
  const runsBackwards = found?.[1] === '0';
  // '0', '00' and '00.5' name no cone; '0.5' does (between 01 and 1).
  const namesACone = runsBackwards ? value >= 1 : value > 0;
  const index = runsBackwards ? 1 - value : value;
  if (!namesACone || index < COLDEST_INDEX || index > HOTTEST_INDEX) throw coneError(text);
  return index;
}

function coneError(text: string): ConeError {
  return new ConeError(
    `expected a cone from 022 to 42 such as 6, 06 or 6.5, got "${text}"`,
    'Write cones below 1 with their zero: 06 is much cooler than 6.',
  );
}

/**
 * A cone as the trade writes it.
 *
 * @param index - place on the scale of `coneIndex`, rounded here to hundredths
 * @returns text such as '6', '06', '6.5', '05.5'
 * @throws {RangeError} if the index lies outside 022 to 42
 * @example
 * coneText(6); // '6'
 * coneText(-5); // '06'
 * coneText(-4.5); // '05.5'
 */
export function coneText(index: number): string {
  if (!(index >= COLDEST_INDEX && index <= HOTTEST_INDEX)) {
    throw new RangeError(
      `cone index must be from ${COLDEST_INDEX} to ${HOTTEST_INDEX}, got ${index}`,
    );
  }
  const hundredths = Math.round(index * 100) / 100;
  if (hundredths > 0) return String(hundredths);
  return `0${String(Math.round((1 - hundredths) * 100) / 100)}`;
}
