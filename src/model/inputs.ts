import type { Oxide } from '../chemistry/oxides.ts';
import { alkaliShare, type Unity } from '../chemistry/unity.ts';

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
    KNaO: scaled('KNaO', alkaliShare(unity)),
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
 * Heat in squares and products levels off at so many cones from the centre: a bend that is seen between
 * cones 5 and 7 must not turn the answer round at cone 12 (chosen on invented studios).
 */
const HEAT_LEVELS_OFF = 3;

/**
 * One row of a design matrix.
 *
 * @param inputs - scaled inputs
 * @param columns - `1`, an input, its square (`SiO2^2`) or a product (`SiO2*heat`)
 * @returns the value of each column
 * @throws {RangeError} if a column names no input
 * @example
 * columnValues(scaledInputs({ SiO2: 5.2, Al2O3: 0.42, CaO: 1 }, 8), ['1', 'SiO2^2', 'heat']);
 * // [1, 4, 2]
 */
export function columnValues(inputs: Inputs, columns: readonly string[]): number[] {
  const row: number[] = [];
  fillColumnValues(inputs, columns, row);
  return row;
}

/**
 * The same in an array that is used again and again.
 *
 * @param inputs - scaled inputs
 * @param columns - as for `columnValues`
 * @param row - takes the values at its front
 * @throws {RangeError} if a column names no input
 */
export function fillColumnValues(inputs: Inputs, columns: readonly string[], row: number[]): void {
  for (let i = 0; i < columns.length; i++) row[i] = columnValue(inputs, columns[i]!);
}

/**
 * How fast each column of a row grows with heat.
 *
 * @param inputs - scaled inputs
 * @param columns - as for `columnValues`
 * @returns per column, per cone
 * @example
 * heatSlopes(scaledInputs({ SiO2: 4.2, Al2O3: 0.42, CaO: 1 }, 6), ['1', 'heat', 'SiO2*heat']);
 * // [0, 1, 1]
 */
export function heatSlopes(inputs: Inputs, columns: readonly string[]): number[] {
  const bend = (1 + (inputs.heat / HEAT_LEVELS_OFF) ** 2) ** -1.5;
  return columns.map((column) => {
    const factors = factorsOf(column);
    if (factors.length === 1) return factors[0] === 'heat' ? 1 : 0;
    return factors.reduce(
      (sum, factor, i) =>
        factor === 'heat' ? sum + bend * factorInProduct(inputs, factors[1 - i]!) : sum,
      0,
    );
  });
}

function columnValue(inputs: Inputs, column: string): number {
  const [first, second] = factorsOf(column);
  if (first === undefined) return 1;
  if (second === undefined) return inputs[first];
  return factorInProduct(inputs, first) * factorInProduct(inputs, second);
}

function factorInProduct(inputs: Inputs, factor: keyof Inputs): number {
  const value = inputs[factor];
  return factor === 'heat' ? value / Math.sqrt(1 + (value / HEAT_LEVELS_OFF) ** 2) : value;
}

/** Columns are few and asked for at every point: each is taken apart once. */
const FACTORS = new Map<string, readonly (keyof Inputs)[]>();

/** `SiO2*heat` -> SiO2, heat; `SiO2^2` -> SiO2, SiO2; `1` -> none. */
function factorsOf(column: string): readonly (keyof Inputs)[] {
  const known = FACTORS.get(column);
  if (known) return known;
  const factors = takenApart(column);
  FACTORS.set(column, factors);
  return factors;
}

function takenApart(column: string): readonly (keyof Inputs)[] {
  if (column === '1') return [];
  const isSquare = column.endsWith('^2');
  const names = isSquare ? [column.slice(0, -2), column.slice(0, -2)] : column.split('*');
  return names.map((name) => {
    if (!Object.hasOwn(SCALE, name)) throw new RangeError(`column ${column} names no input`);
    return name as keyof Inputs;
  });
}

/** Lime is what is left of the fluxes. */
const IN_COLUMNS: readonly Oxide[] = [
  'SiO2',
  'Al2O3',
  'B2O3',
  'Li2O',
  'Na2O',
  'K2O',
  'MgO',
  'CaO',
  'ZnO',
];

/**
 * Whether some column of the model stands for an oxide.
 *
 * @param oxide - its formula
 * @returns false where only its share among the fluxes counts, if it is one
 * @example
 * hasColumn('K2O'); // true
 * hasColumn('Fe2O3'); // false
 */
export function hasColumn(oxide: Oxide): boolean {
  return IN_COLUMNS.includes(oxide);
}
