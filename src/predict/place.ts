import { quantile } from '../numeric/summary.ts';
import type { PlaceInterval90 } from './answers.ts';

/** Where something lies along a line, in one draw of the posterior. */
export type Place =
  | number
  /** It lies below the range looked at, or beyond it. */
  | 'below'
  | 'beyond'
  /** It does not happen on this line. */
  | 'none';

/** What a posterior says of a place. */
export interface PlacePosterior {
  readonly interval90: PlaceInterval90;
  /** Share of the posterior without a place in the range. */
  readonly noCrossing: number;
}

/** Share of the draws that must know a place for an interval to mean something. */
const LEAST_KNOWN = 0.1;

/**
 * 90 % interval of a place, and how often there is none in the range.
 *
 * Draws in which the place has left the range count at that end, which is then null. Where fewer than
 * a tenth of the draws know a place, in the range or beyond, both ends are null.
 *
 * @param places - one a draw
 * @returns interval and share without a crossing
 * @example
 * placePosterior([5, 5, 6, 6, 'beyond', 'none']).noCrossing; // ~0.3333
 */
export function placePosterior(places: readonly Place[]): PlacePosterior {
  const values = places
    .filter((place) => place !== 'none')
    .map((place) => (place === 'below' ? -Infinity : place === 'beyond' ? Infinity : place));
  const crossing = values.filter(Number.isFinite).length;
  const isKnown = values.length >= LEAST_KNOWN * places.length && values.length > 0;
  const end = (p: number) => {
    const value = isKnown ? quantile(values, p) : Number.NaN;
    return Number.isFinite(value) ? value : null;
  };
  return { interval90: [end(0.05), end(0.95)], noCrossing: 1 - crossing / places.length };
}

/** Which way a function goes through 0 as its argument grows. */
export type Direction = 'rising' | 'falling';

/** A zero of a function given on a grid. */
export interface GridZero {
  readonly place: number;
  readonly direction: Direction;
  /** The zero lies between this node and the next. */
  readonly cell: number;
}

/**
 * Zeros of a function given on a grid, by linear interpolation.
 *
 * @param values - the function at each node
 * @param nodes - where the nodes are, ascending
 * @returns the sign changes, ascending
 * @example
 * gridZeros([-1, 1, 3], [0, 1, 2]); // [{ place: 0.5, direction: 'rising', cell: 0 }]
 */
export function gridZeros(values: ArrayLike<number>, nodes: ArrayLike<number>): GridZero[] {
  const zeros: GridZero[] = [];
  for (let i = 1; i < nodes.length; i++) {
    const before = values[i - 1]!;
    const after = values[i]!;
    if (before >= 0 === after >= 0) continue;
    zeros.push({
      place: nodes[i - 1]! + ((nodes[i]! - nodes[i - 1]!) * before) / (before - after),
      direction: after >= 0 ? 'rising' : 'falling',
      cell: i - 1,
    });
  }
  return zeros;
}

/**
 * The nearest of several places.
 *
 * @param places - places, at least one
 * @param to - where to look from
 * @returns the nearest; the first of equally near ones
 * @example
 * nearestPlace([1, 4, 6], 4.9); // 4
 */
export function nearestPlace(places: readonly number[], to: number): number {
  return places.reduce((best, place) =>
    Math.abs(place - to) < Math.abs(best - to) ? place : best,
  );
}

/**
 * Evenly spaced nodes over a range, both ends included.
 *
 * @param range - lowest and highest node
 * @param cells - number of cells, one less than the nodes
 * @returns the nodes
 * @example
 * evenNodes([0, 1], 4); // [0, 0.25, 0.5, 0.75, 1]
 */
export function evenNodes([low, high]: readonly [number, number], cells: number): number[] {
  return Array.from({ length: cells + 1 }, (_, i) => low + ((high - low) * i) / cells);
}

/**
 * The node of an even grid that is nearest to a place.
 *
 * @param nodes - evenly spaced, ascending, at least two
 * @param place - in units of the nodes
 * @returns its number; the first or the last where the place lies outside
 * @example
 * nearestNode([0, 0.5, 1], 0.7); // 1
 */
export function nearestNode(nodes: readonly number[], place: number): number {
  const cell = (place - nodes[0]!) / (nodes[1]! - nodes[0]!);
  return Math.min(nodes.length - 1, Math.max(0, Math.round(cell)));
}
