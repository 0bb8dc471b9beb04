import {
  bothReadings,
  GLAZE_LIMITS,
  weightDoubt,
  wildAmounts,
  type WeightDoubt,
} from '../chemistry/plausible-glaze.ts';
import { OXIDES, type Oxide } from '../chemistry/oxides.ts';
import type { Moles, Unity } from '../chemistry/unity.ts';
import { counted, quoted } from './found-text.ts';
import { inNameOrder } from './name-order.ts';
import { shortened } from './odd-words.ts';

/** A composition as it was given: amounts taken for moles. */
export interface GivenAmounts {
  readonly name: string;
  readonly amounts: Moles;
}

/** What the rows of a file are: `tile`, and how those meant are told from others. */
export interface RowWords {
  readonly noun: string;
  readonly which?: string;
}

/** Columns without which a composition is read, though few glazes lack all of them. */
const RARELY_LACKED: readonly (readonly [readonly Oxide[], string])[] = [
  [['B2O3'], 'no B2O3 column'],
  [['K2O', 'Na2O'], 'no K2O or Na2O column'],
];
const READ_AS_NONE = 'read as 0 for';
const MAY_BE_WEIGHTS = 'weight per cent';

/**
 * Columns that are not there and that most glazes need.
 *
 * @param has - whether the file has a column
 * @param count - rows given by oxides
 * @param words - what the rows are
 * @returns one note, or none
 */
export function missingColumnNotes(
  has: (column: string) => boolean,
  count: number,
  { noun, which = '' }: RowWords,
): string[] {
  const lacked = RARELY_LACKED.filter(([oxides]) => !oxides.some(has)).map(([, words]) => words);
  if (count === 0 || lacked.length === 0) return [];
  const rows = `${count === 1 ? 'the' : 'all'} ${counted(count, noun)}${which}`;
  return [`${lacked.join(', ')}: ${READ_AS_NONE} ${rows}`];
}

/**
 * Whether most of the amounts given as moles look like weight per cent, with one of them read both ways.
 *
 * @param given - amounts of each row, in any order; read once
 * @param words - what the rows are
 * @returns one note, or none
 */
export function weightNotes(given: Iterable<GivenAmounts>, { noun }: RowWords): string[] {
  const doubts: (GivenAmounts & { readonly doubt: WeightDoubt })[] = [];
  let rowCount = 0;
  for (const one of given) {
    rowCount++;
    const doubt = weightDoubt(one.amounts);
    if (doubt !== undefined) doubts.push({ ...one, doubt });
  }
  const example = inNameOrder(doubts, ({ name }) => name)[0];
  if (example === undefined || 2 * doubts.length <= rowCount) return [];
  const read = bothReadings(example.amounts)!;
  const sums = doubts.filter(({ doubt }) => doubt === 'sum').length;
  const rows = rowCount === 1 ? '' : `${doubts.length} of ${counted(rowCount, noun)}: `;
  const why =
    2 * sums > doubts.length
      ? `oxides sum to about 100, as ${MAY_BE_WEIGHTS} and mole per cent do`
      : `oxides make no usual glaze as moles, but do as ${MAY_BE_WEIGHTS}`;
  return [
    `${rows}${why}. ${quoted(example.name)} is read as moles: ${formulaWords(read.asMoles)}; if these are ` +
      `${MAY_BE_WEIGHTS} it would be ${formulaWords(read.asWeight)}: divide each by its molar mass`,
  ];
}

function formulaWords(unity: Unity): string {
  const shown = OXIDES.filter(
    (oxide) => ['SiO2', 'Al2O3', 'B2O3'].includes(oxide) && (unity[oxide] ?? 0) > 0,
  );
  return shown.map((oxide) => `${oxide} ${(unity[oxide] ?? 0).toFixed(2)}`).join(', ');
}

/**
 * Compositions that no glaze has: a slip of the decimal mark, or another unit.
 *
 * @param given - unity formulas by name, in any order
 * @returns one note that names them, or none
 */
export function wildNotes(
  given: readonly { readonly name: string; readonly unity: Unity }[],
): string[] {
  const doubted = given
    .map(({ name, unity }) => ({ name, amounts: wildAmounts(unity) }))
    .filter(({ amounts }) => amounts.length > 0);
  const wild = inNameOrder(doubted, ({ name }) => name);
  if (wild.length === 0) return [];
  const named = shortened(
    wild.map(({ name, amounts }) => `${quoted(name)} (${amounts.join(', ')})`),
  );
  return [
    `no glaze has such a formula: ${named}; glazes lie within ${GLAZE_LIMITS} moles per mole of flux ` +
      '(common practice)',
  ];
}

/**
 * Whether a note of the reading bears on every composition, and so on the fit.
 *
 * @param note - as `missingColumnNotes` and `weightNotes` make them
 * @returns true if it does
 */
export function isCompositionNote(note: string): boolean {
  return note.includes(`column: ${READ_AS_NONE} `) || note.includes(` ${MAY_BE_WEIGHTS}`);
}
