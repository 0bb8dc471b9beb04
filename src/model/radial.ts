import { solveLowerInPlace } from '../numeric/linalg.ts';
import type { Inputs } from './inputs.ts';

/**
 * Radial columns: a smooth departure from the other columns, a Gaussian process seen through a few
 * centres. What the centres do not explain of a place is left over there.
 */
export interface Radial {
  /** [centres][inputs], in lengths of the kernel. */
  readonly centres: readonly (readonly number[])[];
  /** Cholesky factor of the kernel between the centres: lower triangle, row by row. */
  readonly factorLower: readonly number[];
}

/** The same in any kind of array: typed ones are read faster. */
export interface RadialNumbers {
  readonly centres: readonly ArrayLike<number>[];
  readonly factorLower: ArrayLike<number>;
}

/** No radial columns: the departure is left over everywhere. */
export const NO_CENTRES: Radial = { centres: [], factorLower: [] };

/**
 * Over how much of an input the departure keeps its sign, in units of the scaled input: a large but
 * usual change of a glaze, and some cones (chosen on invented studios).
 */
const LENGTH: Readonly<Partial<Record<keyof Inputs, number>>> = {
  SiO2: 1.1,
  Al2O3: 1.1,
  B2O3: 1.3,
  KNaO: 1.7,
  MgO: 2,
  ZnO: 2,
  heat: 2,
};

const LENGTHS = Object.entries(LENGTH) as [keyof Inputs, number][];
/** Numbers that a place has. */
export const RADIAL_INPUTS = LENGTHS.length;
/** A centre that would explain less of its own place than this is not worth a column. */
const LEAST_EXPLAINED = 0.05;
/** Ties between tiles of equal worth are not settled by rounding. */
const TIE = 1e-9;

/**
 * Where a place lies for the kernel.
 *
 * @param inputs - scaled inputs
 * @returns inputs in lengths of the kernel
 */
export function radialPlace(inputs: Inputs): number[] {
  return LENGTHS.map(([input, length]) => inputs[input] / length);
}

/**
 * Similarity of two places: 1 at no distance, then falling as a Gaussian.
 *
 * @param a - place
 * @param b - place
 * @returns from 0 to 1
 */
export function kernel(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let square = 0;
  for (let i = 0; i < a.length; i++) square += (a[i]! - b[i]!) ** 2;
  return Math.exp(-0.5 * square);
}

/**
 * Chooses centres among the places of the tiles: each the place that the earlier ones explain least.
 *
 * @param places - places of the tiles, in an order that does not depend on the rows
 * @param most - most centres
 * @returns centres and their factor
 *
 * Source: pivoted Cholesky factorisation; S. Fine and K. Scheinberg, Journal of Machine Learning
 * Research 2 (2001) 243-264; as low-rank Gaussian process: C. E. Rasmussen and C. K. I. Williams,
 * Gaussian Processes for Machine Learning, MIT Press 2006, section 8.3.
 */
export function chosenCentres(places: readonly (readonly number[])[], most: number): Radial {
  return centresAndValues(places, most).radial;
}

/**
 * The same with the radial columns of the places, which come by the way.
 *
 * @param places - places of the tiles, in an order that does not depend on the rows
 * @param most - most centres
 * @returns centres and their factor; [places][centres]
 */
export function centresAndValues(
  places: readonly (readonly number[])[],
  most: number,
): { readonly radial: Radial; readonly values: Float64Array } {
  const stride = Math.min(most, places.length);
  const left = new Float64Array(places.length).fill(1);
  const columns = new Float64Array(places.length * stride);
  const pivots: number[] = [];
  while (pivots.length < stride) {
    let next = 0;
    for (let i = 1; i < left.length; i++) if (left[i]! > left[next]! + TIE) next = i;
    if (left[next]! < LEAST_EXPLAINED) break;
    addCentre(places, next, { columns, stride, known: pivots.length, left });
    pivots.push(next);
  }
  const count = pivots.length;
  const values = new Float64Array(places.length * count);
  for (let i = 0; i < places.length; i++) {
    values.set(columns.subarray(i * stride, i * stride + count), i * count);
  }
  return {
    radial: {
      centres: pivots.map((pivot) => places[pivot]!),
      factorLower: pivots.flatMap((pivot, i) =>
        Array.from(columns.subarray(pivot * stride, pivot * stride + i + 1)),
      ),
    },
    values,
  };
}

/** The column of one centre more, and what it explains of each place. */
function addCentre(
  places: readonly (readonly number[])[],
  pivot: number,
  state: {
    /** [places][stride], of which so many are known. */
    readonly columns: Float64Array;
    readonly stride: number;
    readonly known: number;
    readonly left: Float64Array;
  },
): void {
  const { columns, stride, known, left } = state;
  const own = columns.slice(pivot * stride, pivot * stride + known);
  const root = Math.sqrt(left[pivot]!);
  const centre = places[pivot]!;
  for (let i = 0, at = 0; i < places.length; i++, at += stride) {
    let value = kernel(places[i]!, centre);
    for (let k = 0; k < known; k++) value -= columns[at + k]! * own[k]!;
    value /= root;
    columns[at + known] = value;
    left[i]! -= value * value;
  }
}

/**
 * Radial columns of a place: their products are the kernel as the centres see it.
 *
 * @param radial - centres
 * @param place - from `radialPlace`
 * @returns one value a centre, and the share of the departure's variance that is left over
 */
export function radialValues(
  radial: RadialNumbers,
  place: ArrayLike<number>,
): { readonly values: number[]; readonly leftOver: number } {
  const values: number[] = [];
  const leftOver = fillRadialValues(radial, place, values);
  return { values, leftOver };
}

/**
 * The same in an array that is used again and again.
 *
 * @param radial - centres
 * @param place - from `radialPlace`
 * @param values - takes one value a centre
 * @returns the share of the departure's variance that is left over
 */
export function fillRadialValues(
  { centres, factorLower }: RadialNumbers,
  place: ArrayLike<number>,
  values: number[],
): number {
  for (let i = 0; i < centres.length; i++) values[i] = kernel(place, centres[i]!);
  solveLowerInPlace(factorLower, values);
  let leftOver = 1;
  for (const value of values) leftOver -= value * value;
  return Math.max(0, leftOver);
}
