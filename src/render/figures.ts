import { coneText } from '../firing/cone.ts';
import type { Interval90, PlaceInterval90 } from '../predict/answers.ts';

/**
 * A probability or a share in whole percent, never rounded to certainty.
 *
 * @param share - 0 to 1
 * @returns digits without the sign; `<1` and `>99` at the ends
 * @example
 * percentDigits(0.467); // '47'
 * percentDigits(0.998); // '>99'
 * percentDigits(0); // '<1'
 */
export function percentDigits(share: number): string {
  if (share < 0.005) return '<1';
  return share >= 0.995 ? '>99' : String(Math.round(100 * share));
}

/**
 * A probability with its 90 % interval.
 *
 * @param probability - 0 to 1
 * @param interval - 5 and 95 % quantile
 * @returns value and interval, the value three columns wide
 * @example
 * probabilityCell(0.467, [0.2, 0.75]); // ' 47 % (20-75)'
 */
export function probabilityCell(probability: number, [low, high]: Interval90): string {
  const value = percentDigits(probability).padStart(3);
  return `${value} % (${percentDigits(low)}-${percentDigits(high)})`;
}

/**
 * A part of a count in whole percent; here none and all are what they are.
 *
 * @param part - how many
 * @param whole - of how many
 * @returns such as `94 %`; `-` of none
 * @example
 * partPercent(113, 120); // '94 %'
 * partPercent(0, 0); // '-'
 */
export function partPercent(part: number, whole: number): string {
  return whole === 0 ? '-' : `${Math.round((100 * part) / whole)} %`;
}

/**
 * A number with fixed digits; nothing where there is none. A rounded nought has no sign.
 *
 * @param value - a number, null where unknown
 * @param digits - digits after the point
 * @returns the number, `-` for null
 * @example
 * fixed(0.4217, 2); // '0.42'
 * fixed(-0.001, 2); // '0.00'
 * fixed(null, 2); // '-'
 */
export function fixed(value: number | null, digits: number): string {
  if (value === null) return '-';
  const text = value.toFixed(digits);
  return Number(text) === 0 ? (0).toFixed(digits) : text;
}

/**
 * A change: a number with its sign.
 *
 * @param value - a number, null where unknown
 * @param digits - digits after the point
 * @returns such as `+0.25`; `0.00` without a sign, `-` for null
 * @example
 * signed(0.25, 2); // '+0.25'
 * signed(-0.08, 2); // '-0.08'
 * signed(0, 2); // '0.00'
 */
export function signed(value: number | null, digits: number): string {
  const text = fixed(value, digits);
  return Number(text) > 0 ? `+${text}` : text;
}

/**
 * A cone to a tenth, as the trade writes it.
 *
 * @param index - place on the scale of `coneIndex`
 * @returns such as `5.3` or `06`
 * @example
 * coneTenths(5.318); // '5.3'
 * coneTenths(-5.04); // '06'
 */
export function coneTenths(index: number): string {
  return coneText(Math.round(index * 10) / 10);
}

/**
 * The interval of a place. An end that left the range looked at is said to lie beyond it.
 *
 * @param interval - 5 and 95 % quantile, null where that end left the range
 * @param lookedAt - the range
 * @param show - how a place is written
 * @returns such as `0.62 to 0.74` or `0.62 to beyond 1.00`
 * @example
 * placeRange([0.62, null], [0.1, 1], (place) => place.toFixed(2)); // '0.62 to beyond 1.00'
 * placeRange([null, 0.7], [0.1, 1], (place) => place.toFixed(2)); // 'below 0.10 to 0.70'
 */
export function placeRange(
  [low, high]: PlaceInterval90,
  lookedAt: readonly [number, number],
  show: (place: number) => string,
): string {
  const from = low === null ? `below ${show(lookedAt[0])}` : show(low);
  return `${from} to ${high === null ? `beyond ${show(lookedAt[1])}` : show(high)}`;
}
