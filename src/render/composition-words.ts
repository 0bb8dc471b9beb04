import { alkaliShare, type Unity } from '../chemistry/unity.ts';
import { fixed } from './figures.ts';

/**
 * Silica to alumina, the measure of how far a melted glaze leans to gloss.
 *
 * @param unity - unity formula
 * @returns moles to moles; null without alumina
 * @example
 * silicaToAlumina({ SiO2: 3.5, Al2O3: 0.5, CaO: 1 }); // 7
 * silicaToAlumina({ SiO2: 3.5, CaO: 1 }); // null
 */
export function silicaToAlumina({ SiO2 = 0, Al2O3 = 0 }: Unity): number | null {
  return Al2O3 > 0 ? SiO2 / Al2O3 : null;
}

/**
 * A composition as potters speak of it.
 *
 * @param unity - unity formula
 * @returns silica, alumina, boric oxide and alkali share in mol per mol flux, and the ratio
 * @example
 * compositionWords({ SiO2: 3.5, Al2O3: 0.5, B2O3: 0.15, K2O: 0.25, CaO: 0.75 });
 * // 'silica 3.50, alumina 0.50, boric oxide 0.15, alkali share 0.25, SiO2:Al2O3 7.0'
 */
export function compositionWords(unity: Unity): string {
  const { SiO2 = 0, Al2O3 = 0, B2O3 = 0 } = unity;
  return [
    `silica ${fixed(SiO2, 2)}`,
    `alumina ${fixed(Al2O3, 2)}`,
    `boric oxide ${fixed(B2O3, 2)}`,
    `alkali share ${fixed(alkaliShare(unity), 2)}`,
    `SiO2:Al2O3 ${fixed(silicaToAlumina(unity), 1)}`,
  ].join(', ');
}
