import { FLUXES, MOLAR_MASS, OXIDES, type Oxide } from './oxides.ts';
import { toUnity, unityFormula, type Moles, type Unity, type WeightPercent } from './unity.ts';

/** From `least` to `most`, mol per mol flux. */
interface Range {
  readonly oxide: Oxide;
  readonly least: number;
  readonly most: number;
}

/**
 * Outside these no glaze is meant, not even a test at the edge: the most refractory published one here
 * has 11 silica. Common practice, no source.
 */
const POSSIBLE: readonly Range[] = [
  { oxide: 'SiO2', least: 0.5, most: 15 },
  { oxide: 'Al2O3', least: 0, most: 3 },
  { oxide: 'B2O3', least: 0, most: 3 },
];
/** Where nearly all glazes lie that are fired to melt. Common practice, no source. */
const USUAL: readonly Range[] = [
  { oxide: 'SiO2', least: 1, most: 8 },
  { oxide: 'Al2O3', least: 0.05, most: 1 },
  { oxide: 'B2O3', least: 0, most: 1.5 },
];
/** Beyond these a unity formula read as moles is doubted where weights would make a usual one. */
const DOUBTED: readonly Range[] = [
  { oxide: 'SiO2', least: 0.7, most: 10 },
  { oxide: 'Al2O3', least: 0, most: 1.5 },
];
/** What analyses in per cent sum to, give or take rounding. */
const PER_CENT = { least: 98, most: 102 };

/**
 * The limits beyond which no glaze is meant, in words.
 *
 * @example
 * GLAZE_LIMITS; // 'SiO2 0.5 to 15, Al2O3 up to 3, B2O3 up to 3'
 */
export const GLAZE_LIMITS: string = POSSIBLE.map(({ oxide, least, most }) =>
  least > 0 ? `${oxide} ${least} to ${most}` : `${oxide} up to ${most}`,
).join(', ');

/**
 * What of a unity formula lies where no glaze does: a slip of the decimal mark, or another unit.
 *
 * @param unity - mol per mol flux
 * @returns such as `['SiO2 340']`; empty for a glaze
 * @example
 * wildAmounts({ SiO2: 340, Al2O3: 0.4, CaO: 1 }); // ['SiO2 340']
 * wildAmounts({ Al2O3: 0.4, CaO: 1 }); // ['no SiO2']
 * wildAmounts({ SiO2: 3.4, Al2O3: 0.4, CaO: 1 }); // []
 */
export function wildAmounts(unity: Unity): string[] {
  return POSSIBLE.filter((range) => !isWithin(unity[range.oxide] ?? 0, range)).map(({ oxide }) => {
    const amount = unity[oxide] ?? 0;
    return amount > 0 ? `${oxide} ${Number(amount.toPrecision(3))}` : `no ${oxide}`;
  });
}

/** Why amounts given as moles may be weights: what they sum to, or what they make. */
export type WeightDoubt = 'sum' | 'formula';

/**
 * Whether amounts that were given as moles may be weight per cent.
 *
 * Weights that sum to about 100 make a formula that looks like a glaze's also when they are taken for
 * moles, with too much alumina: only the sum gives them away. Mole per cent has the same sum.
 *
 * @param amounts - by oxide, at the scale at which they were given
 * @returns why they may be weights, undefined where they are hardly any
 * @example
 * weightDoubt({ SiO2: 66, Al2O3: 14, K2O: 7, CaO: 13 }); // 'sum'
 * weightDoubt({ SiO2: 3.4, Al2O3: 0.42, K2O: 0.3, CaO: 0.7 }); // undefined
 */
export function weightDoubt(amounts: Moles): WeightDoubt | undefined {
  const asMoles = perFlux((oxide) => amounts[oxide] ?? 0);
  const asWeight = perFlux((oxide) => (amounts[oxide] ?? 0) / MOLAR_MASS[oxide]);
  // Without a flux nothing is within: amounts are not numbers then, or infinite.
  if (!USUAL.every((range) => isWithin(asWeight(range.oxide), range))) return undefined;
  const sum = OXIDES.reduce((total, oxide) => total + (amounts[oxide] ?? 0), 0);
  if (sum >= PER_CENT.least && sum <= PER_CENT.most) return 'sum';
  return DOUBTED.every((range) => isWithin(asMoles(range.oxide), range)) ? undefined : 'formula';
}

/** An oxide's moles per mole of flux, worked out for those alone that are asked about. */
function perFlux(molesOf: (oxide: Oxide) => number): (oxide: Oxide) => number {
  const flux = FLUXES.reduce((sum, oxide) => sum + molesOf(oxide), 0);
  return (oxide) => molesOf(oxide) / flux;
}

/**
 * The unity formula of amounts, taken for moles and taken for weights.
 *
 * @param amounts - by oxide, at any scale
 * @returns both, undefined where there is no flux
 * @example
 * bothReadings({ SiO2: 66, Al2O3: 14, K2O: 7, CaO: 13 })?.asMoles.SiO2; // 3.3
 * bothReadings({ SiO2: 66, Al2O3: 14, K2O: 7, CaO: 13 })?.asWeight.SiO2; // ~3.588
 */
export function bothReadings(amounts: Moles): { asMoles: Unity; asWeight: Unity } | undefined {
  if (!FLUXES.some((oxide) => (amounts[oxide] ?? 0) > 0)) return undefined;
  const weights: WeightPercent = Object.fromEntries(Object.entries(amounts));
  return { asMoles: toUnity(amounts), asWeight: unityFormula(weights) };
}

function isWithin(amount: number, { least, most }: Omit<Range, 'oxide'>): boolean {
  return amount >= least && amount <= most;
}
