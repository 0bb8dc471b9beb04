/**
 * What the truths of invented studios share. All numbers of these families are invented; they follow
 * common practice (no source) at cone 6: with SiO2 3.5 and B2O3 0.15 to 0.20 a glaze melts up to 0.60
 * to 0.80 alumina, a ratio of SiO2 to Al2O3 near 5 and below is matte, a cone moves the limits by
 * about 0.1 alumina or 0.7 silica, and a transition is 0.3 to 1 cones wide.
 */
import type { Unity } from '../../../../src/chemistry/unity.ts';
import type { SurfaceProbability } from '../../../../src/model/model.ts';
import { sigmoid } from '../../../../src/numeric/logistic.ts';
import { normalCdf } from '../../../../src/numeric/normal.ts';
import type { Generator } from '../../../../src/numeric/random.ts';

/** The part of a unity formula on which surfaces depend here, mol per mol flux; the rest is lime. */
export interface Glaze {
  readonly silica: number;
  readonly alumina: number;
  readonly boric: number;
  readonly alkali: number;
  readonly magnesia: number;
  readonly zinc: number;
}

/** How tiles of one studio truly come out. */
export interface Truth {
  readonly family: string;
  /** P(melted) at the heat truly reached. */
  readonly melted: (glaze: Glaze, coneIndex: number) => number;
  /** P(gloss | melted); `cooling` is what the load's cooling adds, about log-odds. */
  readonly glossy: (glaze: Glaze, coneIndex: number, cooling: number) => number;
}

/** A kind of truth: draws the parameters of a studio. */
export type Family = (chance: Generator) => Truth;

/** From a score (0 on the boundary, about log-odds) to a probability. */
export type Link = (score: number) => number;

/**
 * The composition as the truths see it.
 *
 * @param unity - unity formula
 * @returns amounts, mol per mol flux
 */
export function glazeOf(unity: Unity): Glaze {
  return {
    silica: unity.SiO2 ?? 0,
    alumina: unity.Al2O3 ?? 0,
    boric: unity.B2O3 ?? 0,
    alkali: (unity.K2O ?? 0) + (unity.Na2O ?? 0) + (unity.Li2O ?? 0),
    magnesia: unity.MgO ?? 0,
    zinc: unity.ZnO ?? 0,
  };
}

/**
 * True probability of each surface, without load error, cooling or wrong label.
 *
 * @param truth - the studio's truth
 * @param unity - composition
 * @param coneIndex - heat truly reached
 * @returns probabilities that sum to 1
 */
export function trueProbability(truth: Truth, unity: Unity, coneIndex: number): SurfaceProbability {
  const glaze = glazeOf(unity);
  const melted = truth.melted(glaze, coneIndex);
  const glossy = truth.glossy(glaze, coneIndex, 0);
  return { underfired: 1 - melted, matte: melted * (1 - glossy), gloss: melted * glossy };
}

/** A usual glaze on the melt boundary of cone 6, but for its alumina, which the studio decides. */
export function boundaryGlaze(alumina: number): Glaze {
  return { silica: 3.5, alumina, boric: 0.175, alkali: 0.3, magnesia: 0.05, zinc: 0.02 };
}

/** Alumina of the melt boundary of cone 6 at `boundaryGlaze`: 0.60 to 0.80 in most studios. */
export function boundaryAlumina(chance: Generator): number {
  return Math.min(0.9, Math.max(0.52, 0.7 + 0.075 * chance.normal()));
}

/** Student's t with 3 degrees of freedom (closed form), as steep as the logistic at 0. */
const heavyTailed: Link = (score) => {
  const x = 0.68 * score;
  return 0.5 + (x / Math.sqrt(3) / (1 + (x * x) / 3) + Math.atan(x / Math.sqrt(3))) / Math.PI;
};
/** The normal, as steep as the logistic at 0: sharper tails. */
const sharpTailed: Link = (score) => normalCdf(score / 1.596);

/**
 * The tails of a studio's transitions: half logistic, the others sharper or heavier.
 *
 * @param chance - decides
 * @returns probability by score
 */
export function drawLink(chance: Generator): Link {
  const ticket = chance.uniform();
  if (ticket < 0.5) return sigmoid;
  return ticket < 0.78 ? sharpTailed : heavyTailed;
}

/** Rises steeply at first and then ever less, from 0 towards 1. */
export function saturating(amount: number, scale: number): number {
  return 1 - Math.exp(-amount / scale);
}

/** Rises to 1 at `peak` and falls off beyond it. */
export function hump(amount: number, peak: number): number {
  return (amount / peak) * Math.exp(1 - amount / peak);
}
