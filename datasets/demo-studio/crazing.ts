import { OXIDES, type Oxide } from '../../src/chemistry/oxides.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import type { Chance } from './chance.ts';

/** The studio's two clays; invented. */
export const BODIES = [
  { body: 'Fenlow buff', cone: '6', absorptionPercent: 2.1, expansionPerK: 0.0000067 },
  { body: 'Fenlow white', cone: '6', absorptionPercent: 0.9, expansionPerK: 0.0000061 },
] as const;

export type StudioBody = (typeof BODIES)[number];

/**
 * Expansion that one mol% of an oxide brings, 1e-8 per K. Round invented factors: alkali raises
 * expansion most, silica little, boric oxide and alumina lower it (common practice, no source).
 */
const EXPANSION: Readonly<Partial<Record<Oxide, number>>> = {
  SiO2: 4,
  Al2O3: -3,
  B2O3: -4,
  Li2O: 27,
  Na2O: 40,
  K2O: 43,
  MgO: 6,
  CaO: 13,
  SrO: 16,
  ZnO: 5,
};
const OTHER_OXIDES = 6;
/** A glaze may shrink this much less than it does before the body's grip no longer holds it. */
const SLACK_PER_K = 0.0000003;
const WIDTH_PER_K = 0.00000015;

function expansionPerK(unity: Unity): number {
  const total = OXIDES.reduce((sum, oxide) => sum + (unity[oxide] ?? 0), 0);
  const factors = OXIDES.map((oxide) => (unity[oxide] ?? 0) * (EXPANSION[oxide] ?? OTHER_OXIDES));
  return (factors.reduce((sum, x) => sum + x, 0) / total) * 1e-6;
}

/**
 * Whether a melted tile crazed, and how finely: the more the glaze outshrinks the body, the finer.
 *
 * @param unity - composition as weighed
 * @param body - the clay under it
 * @param chance - decides near the limit
 * @returns word of the `crazing` column
 */
export function drawCrazing(
  unity: Unity,
  body: StudioBody,
  chance: Chance,
): 'none' | 'wide' | 'fine' {
  const tension = (expansionPerK(unity) - body.expansionPerK - SLACK_PER_K) / WIDTH_PER_K;
  const ticket = chance.uniform();
  if (ticket < 1 / (1 + Math.exp(3.5 - tension))) return 'fine';
  return ticket < 1 / (1 + Math.exp(-tension)) ? 'wide' : 'none';
}
