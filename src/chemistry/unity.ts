import { CompositionError } from '../errors.ts';
import { FLUXES, MOLAR_MASS, OXIDES, type Oxide } from './oxides.ts';

declare const unit: unique symbol;

/** Amounts by oxide; the phantom unit stops wt% being passed where mol is meant. */
export type Amounts<Unit extends string> = Readonly<Partial<Record<Oxide, number>>> & {
  readonly [unit]?: Unit;
};
export type WeightPercent = Amounts<'wt%'>;
export type Moles = Amounts<'mol'>;
/** Moles per mole of flux. */
export type Unity = Amounts<'mol per mol flux'>;

/**
 * Moles of each oxide in 100 g of an analysis.
 *
 * @param analysis - oxides in wt%, loss on ignition left out
 * @returns moles of each oxide given
 * @example
 * molesOf({ SiO2: 60.083 }).SiO2; // 1
 */
export function molesOf(analysis: WeightPercent): Moles {
  return mapAmounts(analysis, (amount, oxide) => amount / MOLAR_MASS[oxide]);
}

/**
 * Moles scaled so that the fluxes sum to 1.
 *
 * @param moles - moles of each oxide at any scale
 * @returns mol per mol flux; the fluxes sum to 1
 * @throws {CompositionError} if there is no flux
 * @example
 * toUnity({ K2O: 0.6, CaO: 1.4, Al2O3: 1, SiO2: 8 }).SiO2; // 4
 */
export function toUnity(moles: Moles): Unity {
  const flux = FLUXES.reduce((sum, oxide) => sum + (moles[oxide] ?? 0), 0);
  if (!(flux > 0)) {
    const given = OXIDES.filter((oxide) => (moles[oxide] ?? 0) > 0).join(', ') || 'none';
    throw new CompositionError(
      `expected a flux, found none (oxides given: ${given})`,
      `Add one of ${FLUXES.join(', ')}.`,
    );
  }
  return mapAmounts(moles, (amount) => amount / flux);
}

/**
 * Unity formula: moles of each oxide per mole of total flux.
 *
 * Independent of the total, so an analysis need not sum to 100.
 *
 * @param analysis - fired oxide analysis in wt%, loss on ignition left out
 * @returns mol per mol flux; the fluxes sum to 1
 * @throws {CompositionError} if the analysis holds no flux
 * @example
 * unityFormula({ K2O: 16.92, Al2O3: 18.32, SiO2: 64.76 }).SiO2; // ~6.00
 *
 * Source: H. Seger, as reported in Dingler's Polytechnisches Journal 261 (1886) 38-42.
 */
export function unityFormula(analysis: WeightPercent): Unity {
  return toUnity(molesOf(analysis));
}

/**
 * The alkali share: K2O, Na2O and Li2O as a share of the flux.
 *
 * @param unity - unity formula
 * @returns mol per mol flux, 0 to 1
 * @example
 * alkaliShare({ K2O: 0.1, Na2O: 0.2, CaO: 0.7, SiO2: 3 }); // ~0.3
 */
export function alkaliShare(unity: Unity): number {
  return (unity.K2O ?? 0) + (unity.Na2O ?? 0) + (unity.Li2O ?? 0);
}

function mapAmounts<To extends string>(
  amounts: Readonly<Partial<Record<Oxide, number>>>,
  change: (amount: number, oxide: Oxide) => number,
): Amounts<To> {
  const changed: Partial<Record<Oxide, number>> = {};
  for (const oxide of OXIDES) {
    const amount = amounts[oxide];
    if (amount !== undefined) changed[oxide] = change(amount, oxide);
  }
  return changed;
}
