import { OXIDES, type Oxide } from '../chemistry/oxides.ts';
import { toUnity, type Moles, type Unity } from '../chemistry/unity.ts';
import { CompositionError } from '../errors.ts';
import { numberCell } from './cells.ts';
import type { DecimalMark } from './decimal-mark.ts';

/** Any scale: what is weighed in grams or given per cent fits; more is a slip. */
const MOST_MOLES = 1e6;
/**
 * Silica or alumina per mole of flux beyond which no glaze is meant: the most refractory published
 * test here has 11 silica. Chosen here, wide on purpose.
 */
const MOST_PER_MOLE_OF_FLUX = 1000;
/** Without these a composition is not known; a blank in another oxide means none of it. */
const NEVER_BLANK: readonly Oxide[] = ['SiO2', 'Al2O3', 'B2O3'];

const molesCell = (mark: DecimalMark, oxide: Oxide) =>
  numberCell(mark, { what: `moles of ${oxide}`, least: 0, most: MOST_MOLES });

/** The cells of the oxide columns, in moles. */
export const oxideColumns = (mark: DecimalMark) =>
  Object.fromEntries(OXIDES.map((oxide) => [oxide, molesCell(mark, oxide)])) as Record<
    Oxide,
    ReturnType<typeof molesCell>
  >;

export type OxideValues = { readonly [oxide in Oxide]?: number | undefined };

/** A composition, or what is wrong with the cells that give it. */
export type UnityRead =
  | { readonly unity: Unity }
  | { readonly faults: readonly { readonly column: string; readonly message: string }[] };

/**
 * What is missing of the oxide columns of a file that has any.
 *
 * @param has - whether the file has a column
 * @returns a fault for each of SiO2 and Al2O3 that is not there
 */
export function missingOxides(has: (column: string) => boolean) {
  return ['SiO2', 'Al2O3']
    .filter((column) => !has(column))
    .map((column) => ({
      column,
      message: 'expected this column beside the other oxides, found none',
    }));
}

/**
 * The unity formula of the oxide cells of one row.
 *
 * @param values - moles at any scale, as far as the cells could be read
 * @param isUnread - whether the cell of a column is faulty already
 * @param has - whether the file has a column
 * @returns the unity formula, or the faults; none more where a cell is faulty already
 */
export function unityOfCells(
  values: OxideValues,
  isUnread: (column: string) => boolean,
  has: (column: string) => boolean,
): UnityRead {
  const blanks = NEVER_BLANK.filter(
    (oxide) => has(oxide) && values[oxide] === undefined && !isUnread(oxide),
  ).map((column) => ({
    column,
    message: `expected moles of ${column}${column === 'B2O3' ? ', 0 if there is none' : ''}, got a blank cell`,
  }));
  if (blanks.length > 0 || OXIDES.some(isUnread)) return { faults: blanks };
  try {
    const unity = toUnity(molesOfCells(values));
    const problem = glazeProblem(unity);
    return problem === undefined ? { unity } : { faults: [problem] };
  } catch (error) {
    if (!(error instanceof CompositionError)) throw error;
    return { faults: [{ column: '', message: error.message }] };
  }
}

/**
 * The oxides that a row holds, at its own scale: a column of noughts is the same as no column.
 *
 * @param values - the cells of its oxide columns
 * @returns moles above 0
 */
export function molesOfCells(values: OxideValues): Moles {
  const held: Partial<Record<Oxide, number>> = {};
  for (const oxide of OXIDES) {
    const amount = values[oxide] ?? 0;
    if (amount > 0) held[oxide] = amount;
  }
  return held;
}

/**
 * Why a unity formula cannot be a glaze's, if so.
 *
 * @param unity - mol per mol flux
 * @returns the oxide at fault and a message
 */
export function glazeProblem(unity: Unity): { column: string; message: string } | undefined {
  if (!((unity.SiO2 ?? 0) > 0)) {
    return { column: 'SiO2', message: 'expected silica in a glaze, found none' };
  }
  const column = OXIDES.find((oxide) => !((unity[oxide] ?? 0) <= MOST_PER_MOLE_OF_FLUX));
  if (column === undefined) return undefined;
  const found = Number(unity[column]).toPrecision(3);
  const message = `expected at most ${MOST_PER_MOLE_OF_FLUX} per mole of flux, found ${found}`;
  return { column, message };
}
