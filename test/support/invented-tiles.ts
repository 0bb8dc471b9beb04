import type { Tile, Verdict } from '../../src/archive/archive.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator, type Generator } from '../../src/numeric/random.ts';
import { aHeat, aTile } from './builders.ts';

/** True log-odds of melted, and of gloss given melted. */
export interface InventedTruth {
  readonly melt: (unity: Unity, cone: number) => number;
  readonly gloss: (unity: Unity, cone: number) => number;
}

/** A plain invented truth: alumina and silica harden, boron and heat melt, the ratio makes gloss. */
export const PLAIN_TRUTH: InventedTruth = {
  melt: ({ SiO2 = 0, Al2O3 = 0, B2O3 = 0 }, cone) =>
    2 - 3 * (SiO2 - 3.2) - 14 * (Al2O3 - 0.42) + 8 * (B2O3 - 0.18) + 2 * (cone - 6),
  gloss: ({ SiO2 = 0, Al2O3 = 1 }, cone) => 2 * (SiO2 / Al2O3 - 6.5) + 0.3 * (cone - 6),
};

export interface InventedPlan {
  readonly tiles: number;
  readonly seed: number;
  readonly truth?: InventedTruth;
  readonly cones?: readonly string[];
  /** How much hotter each load fired than its paper says, cones; also the number of loads. */
  readonly loadErrors?: readonly number[];
}

/** A composition drawn over what studios make at cone 6. */
export function drawnUnity({ uniform }: Generator): Unity {
  const alkali = 0.2 + 0.2 * uniform();
  const MgO = 0.1 * uniform();
  return {
    SiO2: 2 + 2.6 * uniform(),
    Al2O3: 0.25 + 0.4 * uniform(),
    B2O3: 0.35 * uniform(),
    Na2O: alkali / 2,
    K2O: alkali / 2,
    MgO,
    CaO: 1 - alkali - MgO,
  };
}

/** Invented judged tiles, drawn from a known truth. */
export function inventedTiles(plan: InventedPlan): Tile[] {
  const { tiles, seed, truth = PLAIN_TRUTH, cones = ['5', '6', '6', '7'] } = plan;
  const loadErrors = plan.loadErrors ?? [0, 0, 0, 0];
  const source = seededGenerator(seed);
  return Array.from({ length: tiles }, (_, i) => {
    const load = i % loadErrors.length;
    const heat = aHeat(cones[load % cones.length], 'firing');
    const unity = drawnUnity(source);
    const cone = heat.coneIndex + loadErrors[load];
    const isMelted = source.uniform() < sigmoid(truth.melt(unity, cone));
    const isGloss = source.uniform() < sigmoid(truth.gloss(unity, cone));
    const verdict: Verdict = isMelted ? (isGloss ? 'gloss' : 'matte') : 'underfired';
    const name = `T${String(i).padStart(5, '0')}`;
    const firing = `L${load}`;
    return aTile({ tile: name, line: i + 2, unity, firing, load: firing, heat, verdict });
  });
}
