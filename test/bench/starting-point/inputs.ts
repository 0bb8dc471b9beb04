// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import type { Unity } from '../../../src/chemistry/unity.ts';

/** The model's inputs, each centred and scaled by fixed physical constants. */
export interface Inputs {
  readonly SiO2: number;
  readonly Al2O3: number;
  readonly B2O3: number;
  /** Alkali share: K2O, Na2O and Li2O. */
  readonly KNaO: number;
  readonly MgO: number;
  readonly ZnO: number;
  /** Cones about cone 6. */
  readonly heat: number;
  /** ln(SiO2 / Al2O3) about ln 7. */
  readonly ratio: number;
}

/**
 * Centre and scale of each input: mol per mol flux, cones, or the logarithm of a ratio.
 *
 * Fixed, not taken from the tiles, so that a prior means the same in every studio. The centre is a
 * common studio glaze of cone 6, the scale a large but usual change (common practice, no source).
 */
const SCALE: Readonly<Record<keyof Inputs, { readonly centre: number; readonly scale: number }>> = {
  SiO2: { centre: 3.2, scale: 1.0 },
  Al2O3: { centre: 0.42, scale: 0.17 },
  B2O3: { centre: 0.18, scale: 0.15 },
  KNaO: { centre: 0.3, scale: 0.1 },
  MgO: { centre: 0.06, scale: 0.08 },
  ZnO: { centre: 0.03, scale: 0.06 },
  heat: { centre: 6, scale: 1 },
  ratio: { centre: Math.log(7), scale: 0.4 },
};

/** Keeps the logarithm of the ratio finite in a glaze without alumina, mol per mol flux. */
const LEAST_AMOUNT_IN_RATIO = 0.02;

/**
 * The model's inputs for a composition at a cone.
 *
 * @param unity - unity formula
 * @param coneIndex - heat work, cone as a number
 * @returns centred and scaled inputs, dimensionless
 * @example
 * scaledInputs({ SiO2: 4.2, Al2O3: 0.42, CaO: 0.7, K2O: 0.3 }, 7).SiO2; // ~1.0000
 * scaledInputs({ SiO2: 4.2, Al2O3: 0.42, CaO: 0.7, K2O: 0.3 }, 7).heat; // 1
 */
export function scaledInputs(unity: Unity, coneIndex: number): Inputs {
  const silica = unity.SiO2 ?? 0;
  const alumina = unity.Al2O3 ?? 0;
  const atLeast = (amount: number) => Math.max(amount, LEAST_AMOUNT_IN_RATIO);
  return {
    SiO2: scaled('SiO2', silica),
    Al2O3: scaled('Al2O3', alumina),
    B2O3: scaled('B2O3', unity.B2O3 ?? 0),
    KNaO: scaled('KNaO', (unity.K2O ?? 0) + (unity.Na2O ?? 0) + (unity.Li2O ?? 0)),
    MgO: scaled('MgO', unity.MgO ?? 0),
    ZnO: scaled('ZnO', unity.ZnO ?? 0),
    heat: scaled('heat', coneIndex),
    ratio: scaled('ratio', Math.log(atLeast(silica) / atLeast(alumina))),
  };
}

function scaled(input: keyof Inputs, value: number): number {
  const { centre, scale } = SCALE[input];
  return (value - centre) / scale;
}

/**
 * One row of a design matrix.
 *
 * @param inputs - scaled inputs
 * @param columns - `1`, an input, its square (`SiO2^2`) or a product (`SiO2*heat`)
 * @returns the value of each column
 * @throws {RangeError} if a column names no input
 * @example
 * columnValues(scaledInputs({ SiO2: 5.2, Al2O3: 0.42, CaO: 1 }, 8), ['1', 'SiO2^2', 'SiO2*heat']);
 * // [1, 4, 4]
 */
export function columnValues(inputs: Inputs, columns: readonly string[]): number[] {
  return columns.map((column) => columnValue(inputs, column));
}

function columnValue(inputs: Inputs, column: string): number {
  if (column === '1') return 1;
  const square = column.endsWith('^2');
  const factors = square ? [column.slice(0, -2), column.slice(0, -2)] : column.split('*');
  return factors.reduce((product, factor) => {
    if (!Object.hasOwn(SCALE, factor)) throw new RangeError(`column ${column} names no input`);
    return product * inputs[factor as keyof Inputs];
  }, 1);
}
