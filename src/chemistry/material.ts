import { CompositionError } from '../errors.ts';
import { formulaMassGPerMol, lossOnIgnitionPercent, mineralMoles } from './formula.ts';
import { OXIDES, type Oxide } from './oxides.ts';
import { molesOf, type Moles, type WeightPercent } from './unity.ts';

/**
 * What an analysis is a share of: `raw` with the loss on ignition, `fired` without it.
 *
 * @example
 * BASES; // ['raw', 'fired']
 */
export const BASES = ['raw', 'fired'] as const;
export type Basis = (typeof BASES)[number];

/**
 * How far a sum may lie from 100 wt%: data sheets leave out traces and round (common practice,
 * no source).
 *
 * @example
 * SUM_TOLERANCE_PERCENT; // 3
 */
export const SUM_TOLERANCE_PERCENT = 3;
/** Below this loss on ignition the two bases differ by less than an analysis is good for. */
const CLEAR_LOI_PERCENT = 1.5;
/** How far a loss on ignition may lie from the one that the formula itself gives. */
const FORMULA_LOI_TOLERANCE_PERCENT = 1;

/** A material as a studio knows it: by analysis or, if a pure mineral, by formula. */
export interface MaterialGiven {
  /** Oxides in wt% of the basis; absent, empty or all 0 where the formula is given. */
  readonly analysis?: WeightPercent | undefined;
  /** `raw` if left out, unless the sums speak for `fired`: then it must be said. */
  readonly basis?: Basis | undefined;
  /** Loss on ignition, wt% of the raw material; 0 where it is not known. */
  readonly loiPercent: number;
  readonly formula?: string | undefined;
}

/** What is wrong with one part of a material. */
export interface MaterialFault {
  /** The part at fault; '' where it is the whole. */
  readonly part: Oxide | 'loi' | 'basis' | 'formula' | '';
  readonly message: string;
}

/**
 * Moles of each oxide that 100 g of a raw material bring into the glaze.
 *
 * An analysis is taken as it stands and not stretched to 100: what is missing counts as inert.
 *
 * @param given - analysis in wt% with its basis and loss on ignition, or a formula
 * @returns mol per 100 g raw, and the loss on ignition in wt% of the raw material (below 0
 *   where a formula takes up oxygen in firing)
 * @throws {CompositionError} naming every fault that `materialFaults` finds
 * @example
 * molesPer100gRaw({ formula: 'CaCO3', loiPercent: 0 }).moles.CaO; // ~0.99914
 * molesPer100gRaw({ analysis: { CaO: 100 }, basis: 'fired', loiPercent: 43.971 }).moles.CaO;
 * // ~0.99914
 */
export function molesPer100gRaw(given: MaterialGiven): { moles: Moles; loiPercent: number } {
  const faults = materialFaults(given);
  if (faults.length > 0) {
    const told = faults.map(({ part, message }) => (part === '' ? message : `${part}: ${message}`));
    throw new CompositionError(
      told.join('; '),
      'Give oxides in wt% with loi and basis (raw: both make 100; fired: oxides alone), or a formula.',
    );
  }
  const { analysis = {}, basis = 'raw', loiPercent, formula } = given;
  if (isWritten(formula)) {
    const per100g = 100 / formulaMassGPerMol(formula);
    const moles = scaled(mineralMoles(formula), per100g);
    return { moles, loiPercent: lossOnIgnitionPercent(formula) };
  }
  const rawShare = basis === 'fired' ? 1 - loiPercent / 100 : 1;
  return { moles: scaled(molesOf(analysis), rawShare), loiPercent };
}

/**
 * Everything that is wrong with a material, so that it can be reported cell by cell.
 *
 * @param given - analysis in wt% with its basis and loss on ignition, or a formula
 * @returns one entry for each fault, none if the material can be used
 * @example
 * materialFaults({ analysis: { SiO2: 55, Al2O3: 45 }, loiPercent: 14 })[0].part; // 'basis'
 * materialFaults({ analysis: { SiO2: 47, Al2O3: 39 }, loiPercent: 14 }).length; // 0
 */
export function materialFaults(given: MaterialGiven): MaterialFault[] {
  const { analysis = {}, loiPercent, formula } = given;
  const amounts = amountFaults(analysis, loiPercent);
  if (amounts.length > 0) return amounts;
  const hasAnalysis = oxideSum(analysis) > 0;
  if (isWritten(formula)) {
    return hasAnalysis
      ? [{ part: 'formula', message: 'expected a formula or an analysis, found both' }]
      : formulaFaults(formula, loiPercent);
  }
  if (!hasAnalysis && loiPercent === 0) {
    return [{ part: '', message: 'expected oxides in wt% or a formula, found neither' }];
  }
  return sumFaults(oxideSum(analysis), loiPercent, given.basis);
}

function amountFaults(analysis: WeightPercent, loiPercent: number): MaterialFault[] {
  const amounts = OXIDES.map((oxide) => ({ part: oxide, percent: analysis[oxide] ?? 0 }));
  return [...amounts, { part: 'loi' as const, percent: loiPercent }]
    .filter(({ percent }) => !(percent >= 0 && percent <= 100))
    .map(({ part, percent }) => ({ part, message: `expected 0 to 100 wt%, found ${percent}` }));
}

function formulaFaults(formula: string, loiPercent: number): MaterialFault[] {
  try {
    mineralMoles(formula);
  } catch (error) {
    if (error instanceof CompositionError) return [{ part: 'formula', message: error.message }];
    throw error;
  }
  const lost = lossOnIgnitionPercent(formula);
  if (loiPercent === 0 || Math.abs(loiPercent - lost) <= FORMULA_LOI_TOLERANCE_PERCENT) return [];
  const message = `expected ${shown(lost)} as the formula gives, or a blank, found ${shown(loiPercent)}`;
  return [{ part: 'loi', message }];
}

function sumFaults(oxides: number, loi: number, basis: Basis | undefined): MaterialFault[] {
  const offRaw = Math.abs(oxides + loi - 100);
  const offFired = Math.abs(oxides - 100);
  const limits = `${100 - SUM_TOLERANCE_PERCENT} to ${100 + SUM_TOLERANCE_PERCENT}`;
  const looksFired = offFired <= SUM_TOLERANCE_PERCENT && offFired < offRaw;
  if (basis === undefined && loi > CLEAR_LOI_PERCENT && looksFired) {
    const found = `the oxides sum to ${shown(oxides)} beside a loi of ${shown(loi)}`;
    const message = `expected raw or fired, found a blank: ${found}, as if of the fired material`;
    return [{ part: 'basis', message }];
  }
  if (basis === 'fired') {
    if (offFired <= SUM_TOLERANCE_PERCENT && loi < 100) return [];
    const found = `found ${shown(oxides)} (loi ${shown(loi)})`;
    return [{ part: '', message: `expected fired oxides that sum to ${limits}, ${found}` }];
  }
  if (offRaw <= SUM_TOLERANCE_PERCENT) return [];
  const found = `found ${shown(oxides + loi)} (oxides ${shown(oxides)}, loi ${shown(loi)})`;
  return [{ part: '', message: `expected oxides and loi that sum to ${limits}, ${found}` }];
}

function isWritten(formula: string | undefined): formula is string {
  return formula !== undefined && formula.trim() !== '';
}

function oxideSum(analysis: WeightPercent): number {
  return OXIDES.reduce((sum, oxide) => sum + (analysis[oxide] ?? 0), 0);
}

function scaled(moles: Moles, factor: number): Moles {
  const held = OXIDES.filter((oxide) => moles[oxide] !== undefined);
  return Object.fromEntries(held.map((oxide) => [oxide, (moles[oxide] ?? 0) * factor]));
}

function shown(percent: number): string {
  return String(Math.round(percent * 100) / 100);
}
