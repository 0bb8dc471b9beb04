import { CompositionError } from '../errors.ts';
import { ATOMIC_WEIGHT, type Element } from './atomic-weights.ts';
import { OXIDES, oxideMakeUp } from './oxides.ts';
import type { Moles } from './unity.ts';

/** Atoms of each element in one formula unit. */
export type AtomCounts = Readonly<Partial<Record<Element, number>>>;

/** Elements that leave with the kiln's gases; oxygen leaves as far as no oxide holds it. */
const LOST_ELEMENTS = ['H', 'C', 'N', 'F', 'S', 'Cl'] as const satisfies readonly Element[];

/** No mineral needs more; keeps a pasted page or a run of brackets from being read as one. */
const LONGEST_FORMULA = 200;
const LARGEST_COUNT = 1000;

/** Dots, stars and bullets that join the parts of a formula: 2MgO·SiO2. */
const JOINS = '·*•∙⋅';
const SUBSCRIPT_ZERO = '₀'.charCodeAt(0);
const BRACKETS: Readonly<Record<string, string>> = { '(': ')', '[': ']', '{': '}' };

/**
 * Atoms of each element in one formula unit of a mineral or chemical.
 *
 * Brackets `( )`, `[ ]`, `{ }` may be nested. Counts are whole or decimal. Parts are joined by `.`,
 * `·` or `*`, each with a count before it if need be. A dot between two digits is read so:
 *
 * - a decimal point inside brackets, in the count before a part, after an element that stays
 *   in the glaze (`Mg1.8Fe0.2SiO4`), after a 0 or a 1, and where no element or bracket follows;
 * - otherwise the start of the next part: `Ca2B6O11.5H2O` holds five waters.
 *
 * @param formula - text such as `Al2Si2O5(OH)4`, at most 200 characters; capitals count
 * @returns atoms per formula unit, all above 0
 * @throws {CompositionError} if it cannot be read; says at which character
 * @example
 * parseFormula('Ca2B6O11.5H2O').O; // 16
 * parseFormula('Mg1.8Fe0.2SiO4').Mg; // 1.8
 */
export function parseFormula(formula: string): AtomCounts {
  const written = formula.trim();
  if (written === '') throw new CompositionError('expected a formula, found a blank');
  if (written.length > LONGEST_FORMULA) {
    const found = `found ${written.length} characters`;
    throw new CompositionError(
      `expected a formula of at most ${LONGEST_FORMULA} characters, ${found}`,
    );
  }
  const cursor: Cursor = { written, text: withJoinsTold(written), at: 0 };
  const atoms = new Map<Element, number>();
  do addTo(atoms, readPart(cursor));
  while (take(cursor, new RegExp(`\\s*[${JOINS}]`, 'y')) !== '');
  if (cursor.at < cursor.text.length) throw unread(cursor, 'an element, a bracket or a dot');
  return Object.fromEntries(atoms);
}

/**
 * Moles of each oxide that one formula unit leaves in the fired glaze.
 *
 * Every element goes to its oxide of `OXIDES` (iron to Fe2O3, manganese to MnO, copper to CuO).
 * Hydrogen, carbon, nitrogen, sulphur, fluorine, chlorine and surplus oxygen are taken as
 * lost; a little of the sulphur and fluorine may stay in a real glaze.
 *
 * @param formula - formula of a mineral, as for `parseFormula`
 * @returns mol of each oxide per mol of the formula
 * @throws {CompositionError} if the formula cannot be read or nothing stays after firing
 * @example
 * mineralMoles('Al2Si2O5(OH)4'); // { SiO2: 2, Al2O3: 1 }
 * mineralMoles('KAlSi3O8').K2O; // 0.5
 */
export function mineralMoles(formula: string): Moles {
  const moles = oxidesOf(parseFormula(formula));
  if (Object.keys(moles).length > 0) return moles;
  throw new CompositionError(
    `expected an oxide to stay after firing, found none in "${formula.trim()}"`,
    'Capitals count (CoO is cobalt oxide); give what burns away with loi 100 and no oxides.',
  );
}

/**
 * Mass of one mole of a formula, raw, with all that firing drives off.
 *
 * @param formula - formula of a mineral, as for `parseFormula`
 * @returns g/mol
 * @throws {CompositionError} if the formula cannot be read
 * @example
 * formulaMassGPerMol('CaCO3'); // ~100.086
 */
export function formulaMassGPerMol(formula: string): number {
  return massOf(parseFormula(formula));
}

/**
 * Loss on ignition of a pure mineral: its mass less that of its oxides.
 *
 * Below 0 where firing adds oxygen, as from FeO to Fe2O3.
 *
 * @param formula - formula of a mineral, as for `parseFormula`
 * @returns wt% of the raw mineral
 * @throws {CompositionError} if the formula cannot be read
 * @example
 * lossOnIgnitionPercent('CaCO3'); // ~43.971
 * lossOnIgnitionPercent('ZrSiO4'); // 0
 */
export function lossOnIgnitionPercent(formula: string): number {
  const atoms = parseFormula(formula);
  const moles = oxidesOf(atoms);
  // Summed from what leaves, not as a difference of masses: an oxide then loses exactly 0.
  const held = OXIDES.reduce((sum, o) => sum + (moles[o] ?? 0) * oxideMakeUp(o).oxygens, 0);
  const lost = LOST_ELEMENTS.reduce((sum, e) => sum + (atoms[e] ?? 0) * ATOMIC_WEIGHT[e], 0);
  return (100 * (lost + ((atoms.O ?? 0) - held) * ATOMIC_WEIGHT.O)) / massOf(atoms);
}

function oxidesOf(atoms: AtomCounts): Moles {
  const pairs = OXIDES.map((oxide) => {
    const { element, atoms: perOxide } = oxideMakeUp(oxide);
    return [oxide, (atoms[element] ?? 0) / perOxide] as const;
  });
  return Object.fromEntries(pairs.filter(([, moles]) => moles > 0));
}

function massOf(atoms: AtomCounts): number {
  const elements = Object.keys(atoms) as Element[];
  return elements.reduce((sum, e) => sum + (atoms[e] ?? 0) * ATOMIC_WEIGHT[e], 0);
}

interface Cursor {
  readonly written: string;
  /** As written, character by character, but with every digit plain and every join a `·`. */
  readonly text: string;
  at: number;
}

/** One part of a formula: a count, if any, and a run of elements and brackets. */
function readPart(cursor: Cursor): ReadonlyMap<Element, number> {
  take(cursor, /\s*/y);
  const times = readCount(cursor);
  take(cursor, /\s*/y);
  const atoms = readGroups(cursor);
  if (atoms.size === 0) throw unread(cursor, 'an element or an opening bracket');
  return addTo(new Map(), atoms, times);
}

function readGroups(cursor: Cursor): ReadonlyMap<Element, number> {
  const atoms = new Map<Element, number>();
  for (;;) {
    const opening = take(cursor, /[([{]/y);
    const group = opening === '' ? readElement(cursor) : readBracket(cursor, opening);
    if (!group) return atoms;
    addTo(atoms, group, readCount(cursor));
  }
}

function readBracket(cursor: Cursor, opening: string): ReadonlyMap<Element, number> {
  const openedAt = cursor.at;
  const group = readGroups(cursor);
  if (group.size === 0) throw unread(cursor, 'an element or an opening bracket');
  const closing = BRACKETS[opening] ?? '';
  if (cursor.text[cursor.at] !== closing) {
    throw unread(cursor, `"${closing}" for the "${opening}" at character ${openedAt}`);
  }
  cursor.at += 1;
  return group;
}

function readElement(cursor: Cursor): ReadonlyMap<Element, number> | undefined {
  const symbol = take(cursor, /[A-Z][a-z]?/y);
  if (symbol === '') return undefined;
  if (isElement(symbol)) return new Map([[symbol, 1]]);
  cursor.at -= symbol.length;
  const known = `Known are ${Object.keys(ATOMIC_WEIGHT).join(', ')}; capitals count.`;
  throw unread(cursor, 'a known element', symbol, known);
}

function readCount(cursor: Cursor): number {
  const digits = take(cursor, /\d+(?:\.\d+)?/y);
  if (digits === '') return 1;
  const count = Number(digits);
  // A zero in front is a letter O gone wrong: Si02.
  if (count > 0 && count <= LARGEST_COUNT && !/^0\d/.test(digits)) return count;
  cursor.at -= digits.length;
  throw unread(cursor, `a count above 0 and at most ${LARGEST_COUNT}`, digits);
}

function take(cursor: Cursor, stickyPattern: RegExp): string {
  stickyPattern.lastIndex = cursor.at;
  const found = stickyPattern.exec(cursor.text)?.[0] ?? '';
  cursor.at += found.length;
  return found;
}

function unread(
  { written, at }: Pick<Cursor, 'written' | 'at'>,
  expected: string,
  found = characterAt(written, at),
  hint = 'Write a formula such as Al2Si2O5(OH)4 or Na2O·2B2O3·10H2O; capitals count.',
): CompositionError {
  const what = found === undefined ? 'the end' : `"${found}"`;
  const place = `at character ${at + 1} of "${written}"`;
  return new CompositionError(`expected ${expected}, found ${what} ${place}`, hint);
}

/** A whole character, never half of a pair of surrogates. */
function characterAt(text: string, at: number): string | undefined {
  const code = text.codePointAt(at);
  return code === undefined ? undefined : String.fromCodePoint(code);
}

function addTo(
  sum: Map<Element, number>,
  atoms: ReadonlyMap<Element, number>,
  times = 1,
): ReadonlyMap<Element, number> {
  for (const [element, count] of atoms) sum.set(element, (sum.get(element) ?? 0) + count * times);
  return sum;
}

/** The text with `·` for every `.` that joins two parts; a `.` is then a decimal point only. */
function withJoinsTold(written: string): string {
  const text = written.replace(/[₀-₉]/g, (digit) => String(digit.charCodeAt(0) - SUBSCRIPT_ZERO));
  let told = '';
  for (let at = 0; at < text.length; at += 1) {
    const isJoin = text[at] === '.' && !isDecimalPoint(told, text.slice(at + 1), written);
    told += isJoin ? '·' : text.charAt(at);
  }
  return told;
}

function isDecimalPoint(before: string, after: string, written: string): boolean {
  const [, head = '', whole = ''] = /^(.*?)(\d+)$/.exec(before) ?? [];
  if (whole === '' || !/^\d/.test(after) || head.endsWith('.')) return false;
  const isCountOfPart = head === '' || /\s$/.test(head) || JOINS.includes(head.slice(-1));
  if (isCountOfPart || bracketDepth(head) > 0 || Number(whole) < 2) return true;
  const symbol = /[A-Z][a-z]?$/.exec(head)?.[0] ?? '';
  if (isElement(symbol) && OXIDES.some((o) => oxideMakeUp(o).element === symbol)) return true;
  if (/^[1-9]\d*\.\d/.test(after)) {
    throw unread({ written, at: before.length }, 'a · or * where the next part begins');
  }
  return !/^(?:[1-9]\d*|0\.\d+)[A-Z([{]/.test(after);
}

function bracketDepth(text: string): number {
  return (text.match(/[([{]/g)?.length ?? 0) - (text.match(/[)\]}]/g)?.length ?? 0);
}

function isElement(symbol: string): symbol is Element {
  return Object.hasOwn(ATOMIC_WEIGHT, symbol);
}
