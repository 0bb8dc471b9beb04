import type { Unity } from '../chemistry/unity.ts';
import { averagedProbability, type GaussianLogOdds } from '../numeric/logistic-normal.ts';
import type { JudgedTile } from './judged.ts';
import { stageLogOdds, type StageWeights } from './log-odds.ts';

/** Glazes whose chance to melt falls as the fire grows hotter: more heat never melts less. */
export interface HeatCheck {
  /** Glazes looked at, and those that fall. */
  readonly glazes: number;
  readonly falling: number;
  /** Largest fall of P(melted) over a step of heat. */
  readonly worst: number;
  /** The steepest step of each falling glaze, the largest fall first. */
  readonly falls: readonly Fall[];
}

/** A step of heat over which the chance to melt falls. */
export interface Fall {
  readonly unity: Unity;
  /** Cone at which the step of `CONE_STEP` begins. */
  readonly coneIndex: number;
  /** By how much P(melted) falls. */
  readonly fall: number;
  /** Log-odds per cone that the mean would have to rise by more for P(melted) not to fall. */
  readonly short: number;
}

/** Looked at from one cone below the coolest fired to one above the hottest, in such steps. */
const CONES_BEYOND = 1;
export const CONE_STEP = 0.25;
/** First looked at in whole cones: where the score of the chance rises by this much, it falls nowhere between. */
const CLEAR_RISE = 0.3;
/** Of more glazes every k-th stands for the rest. */
const MOST_GLAZES = 1000;
/** Rounding of a probability. */
const ROUNDING = 1e-13;

/**
 * Whether the fitted chance to melt falls with heat at any fitted glaze.
 *
 * @param melt - fitted stage
 * @param tiles - judged tiles
 * @returns how many glazes fall, by how much, and where
 */
export function heatCheck(melt: StageWeights, tiles: readonly JudgedTile[]): HeatCheck {
  const cones = tiles.map(({ heat }) => heat.coneIndex);
  const coolest = cones.reduce((a, b) => Math.min(a, b), Infinity) - CONES_BEYOND;
  const hottest = cones.reduce((a, b) => Math.max(a, b), -Infinity) + CONES_BEYOND;
  const glazes = differentGlazes(tiles);
  const falls = glazes
    .flatMap((unity) => steepestFall(melt, unity, coolest, hottest) ?? [])
    .sort((a, b) => b.fall - a.fall);
  return { glazes: glazes.length, falling: falls.length, worst: falls[0]?.fall ?? 0, falls };
}

function differentGlazes(tiles: readonly JudgedTile[]): Unity[] {
  const sorted = [...tiles].sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const glazes = [...new Map(sorted.map(({ unity }) => [JSON.stringify(unity), unity])).values()];
  const every = Math.max(1, Math.ceil(glazes.length / MOST_GLAZES));
  return glazes.filter((_, i) => i % every === 0);
}

function steepestFall(
  melt: StageWeights,
  unity: Unity,
  coolest: number,
  hottest: number,
): Fall | undefined {
  if (clearlyRises(melt, unity, coolest, hottest)) return undefined;
  let found: Fall | undefined;
  let before = stageLogOdds(melt, unity, coolest);
  let chance = averagedProbability(before.mean, before.sd);
  for (let coneIndex = coolest; coneIndex < hottest; coneIndex += CONE_STEP) {
    const after = stageLogOdds(melt, unity, coneIndex + CONE_STEP);
    const next = averagedProbability(after.mean, after.sd);
    const fall = chance - next;
    if (fall > (found?.fall ?? ROUNDING)) {
      found = { unity, coneIndex, fall, short: missingRise(before, after) };
    }
    before = after;
    chance = next;
  }
  return found;
}

/** The averaged chance is nearly the logistic of mean / widened: so a growing spread lowers it. */
const widened = ({ sd }: GaussianLogOdds) => Math.sqrt(1 + (Math.PI / 8) * sd ** 2);

function clearlyRises(melt: StageWeights, unity: Unity, coolest: number, hottest: number): boolean {
  const steps = Math.ceil(hottest - coolest);
  let before = -Infinity;
  for (let i = 0; i <= steps; i++) {
    const there = stageLogOdds(melt, unity, coolest + ((hottest - coolest) * i) / steps);
    const score = there.mean / widened(there);
    if (score - before < (CLEAR_RISE * (hottest - coolest)) / steps) return false;
    before = score;
  }
  return true;
}

/** By how much more the mean would have to rise. */
function missingRise(before: GaussianLogOdds, after: GaussianLogOdds): number {
  const level = (before.mean * widened(after)) / widened(before);
  return Math.max(0, (level - after.mean) / CONE_STEP);
}
