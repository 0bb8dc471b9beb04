import { alkaliShare, type Unity } from '../chemistry/unity.ts';

/**
 * The measures in which compositions are summed up.
 *
 * @example
 * MEASURES.length; // 5
 */
export const MEASURES = ['SiO2', 'Al2O3', 'B2O3', 'alkaliShare', 'SiO2:Al2O3'] as const;
export type Measure = (typeof MEASURES)[number];

/**
 * One measure of a composition.
 *
 * @param unity - unity formula
 * @param measure - which
 * @returns mol per mol flux, or the ratio; infinite without alumina
 * @example
 * measureOf({ SiO2: 3.5, Al2O3: 0.5, CaO: 1 }, 'SiO2:Al2O3'); // 7
 */
export function measureOf(unity: Unity, measure: Measure): number {
  if (measure === 'alkaliShare') return alkaliShare(unity);
  if (measure === 'SiO2:Al2O3') return (unity.SiO2 ?? 0) / (unity.Al2O3 ?? 0);
  return unity[measure] ?? 0;
}
