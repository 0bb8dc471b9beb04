import { FLUXES, isOxide, OXIDES, type Oxide } from '../chemistry/oxides.ts';
import { toUnity, type Moles, type Unity } from '../chemistry/unity.ts';
import { CompositionError } from '../errors.ts';
import { glazeProblem } from './composition-cells.ts';
import { weightNotes, wildNotes } from './composition-notes.ts';
import { expectedNumber, parseDecimal } from './decimal-mark.ts';
import { listed, quoted } from './found-text.ts';
import { isNearMiss } from './headings.ts';
import { nearestNames } from './nearest-name.ts';

/** More moles than this are a slip. */
const MOST_MOLES = 1e6;

/** A composition written as text, and what is to be said about it. */
export interface GlazeRead {
  readonly unity: Unity;
  readonly notes: readonly string[];
}

/**
 * Reads a composition written as text.
 *
 * @param text - `OXIDE=MOLES` separated by spaces, commas or semicolons, at any scale; SiO2, Al2O3 and at
 *   least one flux are needed
 * @param name - what notes call it
 * @returns the unity formula, and a note where the amounts may be weights or no glaze has them
 * @throws {CompositionError} with everything that is wrong with the text
 * @example
 * readGlaze('SiO2=7 Al2O3=0.8 K2O=0.6 CaO=1.4').unity.SiO2; // 3.5
 */
export function readGlaze(text: string, name = 'glaze'): GlazeRead {
  const parts = partsOf(text);
  const faults = [
    ...parts.flatMap(({ fault }) => fault ?? []),
    ...repeated(parts),
    ...missing(parts),
  ];
  if (faults.length > 0) throw noComposition(text, faults);
  const moles: Moles = Object.fromEntries(
    parts.flatMap(({ oxide, amount = 0 }) => (oxide === undefined ? [] : [[oxide, amount]])),
  );
  const unity = toUnity(moles);
  const problem = glazeProblem(unity);
  if (problem !== undefined) {
    throw noComposition(text, [`${problem.column}: ${problem.message}`]);
  }
  const words = { noun: 'glaze' };
  return {
    unity,
    notes: [...weightNotes([{ name, amounts: moles }], words), ...wildNotes([{ name, unity }])],
  };
}

function noComposition(text: string, faults: readonly string[]): CompositionError {
  return new CompositionError(
    `${quoted(text)} is no composition\n${faults.map((fault) => `  ${fault}`).join('\n')}`,
    'Write moles of oxides, such as "SiO2=3.4 Al2O3=0.42 K2O=0.25 CaO=0.75".',
  );
}

/** One `OXIDE=MOLES`, as far as it could be read. */
interface Part {
  readonly written: string;
  readonly oxide?: Oxide;
  readonly amount?: number;
  /** Oxides that the name may stand for. */
  readonly meant: readonly string[];
  readonly fault?: string;
}

/** A comma between digits is a decimal comma, which is a fault; any other separates. */
function partsOf(text: string): Part[] {
  const words = text.replace(/\s*([=:])\s*/g, '$1').split(/[\s;]+|,(?!\d)/);
  return words.filter((word) => word !== '').map(partOf);
}

function partOf(written: string): Part {
  const [, name = '', amountText = ''] = /^([^=:]+)[=:](.*)$/.exec(written) ?? [];
  if (name === '') {
    return { written, meant: [], fault: `expected OXIDE=MOLES, got ${quoted(written)}` };
  }
  if (!isOxide(name)) return misnamed(written, name);
  const part = { written, oxide: name, meant: [name] };
  const amount = parseDecimal(amountText, '.');
  if (amount === undefined) {
    const meant = amountText.replace(',', '.');
    const example = parseDecimal(meant, '.') === undefined ? '0.42' : meant;
    const expected = `expected moles of ${name}: ${expectedNumber(amountText, '.')} such as ${example}`;
    return { ...part, fault: `${expected}, got ${quoted(amountText)}` };
  }
  if (amount < 0 || amount > MOST_MOLES) {
    const limits = `from 0 to ${MOST_MOLES}`;
    return { ...part, fault: `expected moles of ${name} ${limits}, got ${quoted(amountText)}` };
  }
  if (name === 'SiO2' && amount === 0) return { ...part, fault: 'expected SiO2 above 0, got 0' };
  return { ...part, amount };
}

function misnamed(written: string, name: string): Part {
  const inCapitals = OXIDES.find((oxide) => oxide.toLowerCase() === name.toLowerCase());
  if (inCapitals !== undefined) {
    const fault = `expected ${inCapitals} in these capitals, got ${quoted(name)}`;
    return { written, meant: [inCapitals], fault };
  }
  const nearest = nearestNames(name, OXIDES);
  const meant = nearest.filter((oxide) => isNearMiss(name, oxide));
  const fault = `expected an oxide, got ${quoted(name)}; nearest known: ${listed(nearest.map(quoted))}`;
  return { written, meant, fault };
}

function repeated(parts: readonly Part[]): string[] {
  return parts.flatMap(({ oxide, written }, i) => {
    if (oxide === undefined || !parts.slice(0, i).some((one) => one.oxide === oxide)) return [];
    return [`expected ${oxide} once, got it again (${quoted(written)})`];
  });
}

/** What a composition needs and this one lacks; what a misspelt name may stand for is not missing. */
function missing(parts: readonly Part[]): string[] {
  const isUnclear = parts.some(({ meant, fault }) => fault !== undefined && meant.length === 0);
  if (isUnclear) return [];
  const isMeant = (oxide: string) => parts.some(({ meant }) => meant.includes(oxide));
  const lacked = ['SiO2', 'Al2O3'].filter((oxide) => !isMeant(oxide));
  const fluxes = parts.filter(({ oxide }) => (FLUXES as readonly string[]).includes(oxide ?? ''));
  const faults = lacked.map((oxide) => `expected ${oxide}=..., found none`);
  if (!FLUXES.some(isMeant)) faults.push(`expected a flux, found none of ${FLUXES.join(', ')}`);
  else if (fluxes.length > 0 && fluxes.every(({ amount }) => amount === 0)) {
    faults.push('expected a flux above 0, got 0');
  }
  return faults;
}
