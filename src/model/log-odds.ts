import { dot, quadraticForm } from '../numeric/linalg.ts';
import { averagedBoth, type GaussianLogOdds } from '../numeric/logistic-normal.ts';
import { findRoot } from '../numeric/roots.ts';
import type { Unity } from '../chemistry/unity.ts';
import { fillColumnValues, scaledInputs } from './inputs.ts';
import type { LoadSpread, Stage, SurfaceProbability } from './model.ts';
import { fillRadialValues, radialPlace, type RadialNumbers } from './radial.ts';

/** What the log-odds of a stage are computed from. */
export type StageWeights = Pick<
  Stage,
  'columns' | 'radial' | 'mean' | 'covarianceLower' | 'residual'
>;

/** A stage made ready to be asked at many points. */
interface ReadyStage {
  readonly columns: readonly string[];
  /** Numbers in typed arrays, which are read twice as fast as those of a file. */
  readonly radial: RadialNumbers;
  readonly mean: Float64Array;
  readonly covarianceLower: Float64Array;
  readonly residualVariance: number;
  /** Where the row of the point asked about is written. */
  readonly row: number[];
  readonly radialPart: number[];
}

const READY = new WeakMap<StageWeights, ReadyStage>();

function readyStage(stage: StageWeights): ReadyStage {
  const known = READY.get(stage);
  if (known !== undefined) return known;
  const { columns, radial, mean, covarianceLower, residual } = stage;
  const made: ReadyStage = {
    columns,
    radial: {
      centres: radial.centres.map((centre) => new Float64Array(centre)),
      factorLower: new Float64Array(radial.factorLower),
    },
    mean: new Float64Array(mean),
    covarianceLower: new Float64Array(covarianceLower),
    residualVariance: residual.sd ** 2,
    row: [],
    radialPart: [],
  };
  READY.set(stage, made);
  return made;
}

/** Writes the row of a composition at a cone; returns the variance that is left over. */
function fillRow(stage: ReadyStage, unity: Unity, coneIndex: number): number {
  const { columns, radial, row, radialPart } = stage;
  const inputs = scaledInputs(unity, coneIndex);
  fillColumnValues(inputs, columns, row);
  const leftOver = fillRadialValues(radial, radialPlace(inputs), radialPart);
  for (let i = 0; i < radialPart.length; i++) row[columns.length + i] = radialPart[i]!;
  return leftOver * stage.residualVariance;
}

/** One row of a fitted stage's design. */
export interface StageRow {
  readonly values: readonly number[];
  /** Variance of the smooth departure that the radial columns do not hold. */
  readonly leftOverVariance: number;
}

/**
 * The row of a composition at a cone.
 *
 * @param stage - fitted stage
 * @param unity - unity formula
 * @param coneIndex - heat work, cone as a number
 * @returns columns, then radial columns
 */
export function stageRow(stage: StageWeights, unity: Unity, coneIndex: number): StageRow {
  const ready = readyStage(stage);
  const leftOverVariance = fillRow(ready, unity, coneIndex);
  return { values: [...ready.row], leftOverVariance };
}

/**
 * Posterior of the log-odds of one stage for a composition at a cone.
 *
 * @param stage - fitted stage
 * @param unity - unity formula
 * @param coneIndex - heat work of the load, cone as a number
 * @param loadSd - a load's own intercept, log-odds; 0 for a load that truly reaches that cone
 * @returns mean and sd of the log-odds
 */
export function stageLogOdds(
  stage: StageWeights,
  unity: Unity,
  coneIndex: number,
  loadSd = 0,
): GaussianLogOdds {
  const ready = readyStage(stage);
  const leftOverVariance = fillRow(ready, unity, coneIndex);
  const { row, mean, covarianceLower } = ready;
  const variance = quadraticForm(covarianceLower, row) + leftOverVariance + loadSd ** 2;
  return { mean: dot(mean, row), sd: Math.sqrt(Math.max(0, variance)) };
}

/**
 * Probability of each surface, averaged over the posterior of both stages.
 *
 * The stages share no more than the heat of the loads, which ties their log-odds by a correlation of
 * less than 0.1: they are taken as independent, and the mean of the product is the product of the means.
 *
 * @param melt - log-odds of melted
 * @param gloss - log-odds of gloss given melted
 * @returns probabilities that sum to 1
 * @example
 * surfaceProbability({ mean: 0, sd: 1 }, { mean: 0, sd: 1 }).matte; // 0.25
 */
export function surfaceProbability(
  melt: GaussianLogOdds,
  gloss: GaussianLogOdds,
): SurfaceProbability {
  const melts = averagedBoth(melt.mean, melt.sd);
  const shines = averagedBoth(gloss.mean, gloss.sd);
  return {
    underfired: melts.no,
    matte: melts.yes * shines.no,
    gloss: melts.yes * shines.yes,
  };
}

/** So many offsets of equal weight stand for Student's t. */
const OFFSETS = 11;

/**
 * Offsets that each stand for the same share of the loads, in units of their spread: the middles of equal
 * shares of Student's t with 5 degrees of freedom, whose distribution has a closed form (M. Abramowitz and I. A.
 * Stegun, Handbook of Mathematical Functions 1964, 26.7.3).
 */
const LOAD_OFFSETS: readonly number[] = Array.from({ length: OFFSETS }, (_, k) => {
  const share = (k + 0.5) / OFFSETS;
  return findRoot((t) => studentCdf5(t) - share, -10, 10, 1e-12);
});

function studentCdf5(t: number): number {
  const x = t / Math.sqrt(5);
  const c = 1 / (1 + x * x);
  return 0.5 + (Math.atan(x) + x * c * (1 + (2 / 3) * c)) / Math.PI;
}

/**
 * Probability of each surface in a load not seen, averaged over how far its heat may be from the cone
 * on paper (Student's t, as the fit has it) and over its own intercept of gloss.
 *
 * @param model - both stages and the loads' spread
 * @param unity - unity formula
 * @param coneIndex - the cone on paper
 * @returns probabilities that sum to 1
 */
export function newLoadProbability(
  model: {
    readonly melt: StageWeights;
    readonly gloss: StageWeights;
    readonly loadSpread: LoadSpread;
  },
  unity: Unity,
  coneIndex: number,
): SurfaceProbability {
  const { offsetScaleCones, glossSd } = model.loadSpread;
  const reach = LOAD_OFFSETS.at(-1)! * offsetScaleCones;
  const melt = logOddsAbout(model.melt, unity, coneIndex, reach, 0);
  const gloss = logOddsAbout(model.gloss, unity, coneIndex, reach, glossSd);
  const sum = { underfired: 0, matte: 0, gloss: 0 };
  for (const offset of LOAD_OFFSETS) {
    const at = offset / LOAD_OFFSETS.at(-1)!;
    const here = surfaceProbability(melt(at), gloss(at));
    sum.underfired += here.underfired / OFFSETS;
    sum.matte += here.matte / OFFSETS;
    sum.gloss += here.gloss / OFFSETS;
  }
  return sum;
}

/** Log-odds as a function of heat from -1 to 1 times the reach, by the parabola through three cones. */
function logOddsAbout(
  stage: StageWeights,
  unity: Unity,
  coneIndex: number,
  reach: number,
  loadSd: number,
): (at: number) => GaussianLogOdds {
  const [low, middle, high] = [-1, 0, 1].map((side) =>
    stageLogOdds(stage, unity, coneIndex + side * reach, loadSd),
  ) as [GaussianLogOdds, GaussianLogOdds, GaussianLogOdds];
  const parabola = (a: number, b: number, c: number, at: number) =>
    b + ((c - a) / 2) * at + ((a + c) / 2 - b) * at * at;
  return (at) => ({
    mean: parabola(low.mean, middle.mean, high.mean, at),
    sd: Math.max(0, parabola(low.sd, middle.sd, high.sd, at)),
  });
}
