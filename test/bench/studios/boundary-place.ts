import type { Archive } from '../../../src/archive/archive.ts';
import type { Unity } from '../../../src/chemistry/unity.ts';
import { mean, median } from '../../../src/numeric/summary.ts';
import { ASKED_CONES, type Learned } from './learner.ts';
import { glazeOf, type Truth } from './truths/truth.ts';

/** Where the melt boundary is looked for along alumina, mol per mol flux. */
const FROM = 0.1;
const STEPS = 80;
const STEP = 0.01;

/**
 * Error of the melt boundary's place along alumina, through the middle of the studio's tiles.
 *
 * The place is where P(melted) falls below 1/2 for the last time from 0.1 to 0.9 alumina. Cones at
 * which the truth has no such place are left out; an answer without one counts as at the end of the
 * range.
 *
 * @param truth - the studio's truth
 * @param archive - its archive
 * @param learned - what is asked
 * @returns mean absolute error over the cones, mol Al2O3; null where the truth has no boundary
 */
export function boundaryPlaceError(
  truth: Truth,
  archive: Archive,
  learned: Learned,
): number | null {
  const middle = middleOf(archive);
  const line = Array.from({ length: STEPS + 1 }, (_, i) => ({ ...middle, Al2O3: FROM + STEP * i }));
  const answers = learned(line, ASKED_CONES);
  const errors = ASKED_CONES.flatMap((cone, c) => {
    const trueMelted = line.map((unity) => truth.melted(glazeOf(unity), cone));
    const stated = line.map((_, i) => {
      return 1 - answers[i * ASKED_CONES.length + c].probability.underfired;
    });
    const truePlace = lastFall(trueMelted);
    if (truePlace === undefined) return [];
    const end = stated[STEPS] >= 0.5 ? FROM + STEP * STEPS : FROM;
    return [Math.abs((lastFall(stated) ?? end) - truePlace)];
  });
  return errors.length === 0 ? null : mean(errors);
}

/** Alumina at the last fall through 1/2 along the line, by a straight line between two steps. */
function lastFall(melted: readonly number[]): number | undefined {
  const after = melted.findLastIndex((m, i) => i > 0 && m < 0.5 && melted[i - 1] >= 0.5);
  if (after < 0) return undefined;
  const before = melted[after - 1];
  return FROM + STEP * (after - 1 + (before - 0.5) / (before - melted[after]));
}

function middleOf({ tiles }: Archive): Unity {
  const middle = (oxide: keyof Unity & string) =>
    median(tiles.map(({ unity }) => unity[oxide] ?? 0));
  const KNaO = middle('K2O') + middle('Na2O');
  const MgO = middle('MgO');
  const ZnO = middle('ZnO');
  return {
    SiO2: middle('SiO2'),
    B2O3: middle('B2O3'),
    K2O: KNaO / 2,
    Na2O: KNaO / 2,
    MgO,
    ZnO,
    CaO: 1 - KNaO - MgO - ZnO,
  };
}
