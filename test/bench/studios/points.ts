import type { Unity } from '../../../src/chemistry/unity.ts';
import { between, chanceOf } from './chance.ts';

/** Points at which each studio is asked. */
export const POINTS = 300;

/**
 * The compositions that a studio is asked about: uniform in SiO2 1.8-5, Al2O3 0.18-0.75, B2O3 0-0.4,
 * KNaO 0.15-0.45 (K2O and Na2O half each), MgO 0-0.1, ZnO 0-0.05; the rest is CaO.
 *
 * @param seed - which studio
 * @returns unity formulas
 */
export function askedPoints(seed: number): Unity[] {
  const chance = chanceOf(seed, 'points');
  return Array.from({ length: POINTS }, () => {
    const alkali = between(chance, 0.15, 0.45);
    const magnesia = between(chance, 0, 0.1);
    const zinc = between(chance, 0, 0.05);
    return {
      SiO2: between(chance, 1.8, 5),
      Al2O3: between(chance, 0.18, 0.75),
      B2O3: between(chance, 0, 0.4),
      K2O: alkali / 2,
      Na2O: alkali / 2,
      MgO: magnesia,
      ZnO: zinc,
      CaO: 1 - alkali - magnesia - zinc,
    };
  });
}
