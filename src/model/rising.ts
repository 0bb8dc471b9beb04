import type { Unity } from '../chemistry/unity.ts';
import { dot, symmetricTimes } from '../numeric/linalg.ts';
import { truncatedBelow } from '../numeric/truncated.ts';
import type { StageDesign } from './design.ts';
import { CONE_STEP, type Fall } from './heat-check.ts';
import { stageRow, type StageWeights } from './log-odds.ts';

/** A glaze and a step of heat over which the log-odds of melting are known to rise. */
export interface RisingStep {
  readonly unity: Unity;
  readonly coneIndex: number;
  /** Log-odds per cone that they rise by at least. */
  readonly least: number;
  /** What that knowledge comes to: as if the slope had been seen at `target` with this precision. */
  readonly target: number;
  readonly precision: number;
}

/** Steps added at a time, those of the largest falls. */
const STEPS_AT_ONCE = 4;
/** Where a step is held and P(melted) falls nevertheless, its bound grows by no less. */
const LEAST_MORE = 0.02;

/**
 * More steps to hold, for the next fit: new ones where the chance falls, stricter ones where it is held already.
 *
 * @param held - steps held so far
 * @param falls - where the chance falls, the largest fall first
 * @returns steps to hold
 */
export function moreSteps(held: readonly RisingStep[], falls: readonly Fall[]): RisingStep[] {
  const steps = [...held];
  for (const { unity, coneIndex, short } of falls.slice(0, STEPS_AT_ONCE)) {
    const at = steps.findIndex((one) => one.unity === unity && one.coneIndex === coneIndex);
    if (at < 0) {
      steps.push({ unity, coneIndex, least: 0, target: 0, precision: 0 });
    } else {
      steps[at] = { ...steps[at]!, least: steps[at]!.least + Math.max(LEAST_MORE, short) };
    }
  }
  return steps;
}

/** Slope of the log-odds over each step, as a row of the design. */
function slopeRows(melt: StageWeights, steps: readonly RisingStep[]): number[][] {
  return steps.map(({ unity, coneIndex }) => {
    const cool = stageRow(melt, unity, coneIndex).values;
    const hot = stageRow(melt, unity, coneIndex + CONE_STEP).values;
    return hot.map((value, j) => (value - cool[j]!) / CONE_STEP);
  });
}

const MOST_SWEEPS = 50;
/** Largest move of a slope, in its sds, at which the sweeps end. */
const SETTLED = 1e-3;
/** What a step says is left as it is where nothing else tells of the slope. */
const LEAST_CAVITY = 1e-6;

/**
 * What it comes to that each slope is not below its bound, given the Gaussian for the weights: expectation
 * propagation on the joint Gaussian of the slopes.
 *
 * @param melt - stage as fitted with the steps as they were; its covariance without that of the scales
 * @param steps - steps to hold
 * @returns the steps with targets and precisions
 *
 * Sources: T. P. Minka, Expectation propagation for approximate Bayesian inference, UAI 2001, 362-369. A derivative's
 * sign as an observation: J. Riihimäki and A. Vehtari, Gaussian processes with monotonicity information, AISTATS 2010,
 * JMLR W&CP 9, 645-652.
 */
export function settledSteps(melt: StageWeights, steps: readonly RisingStep[]): RisingStep[] {
  const rows = slopeRows(melt, steps);
  const mean = rows.map((row) => dot(melt.mean, row));
  const images = rows.map((row) => symmetricTimes(melt.covarianceLower, row));
  const covariance = images.map((image) => rows.map((row) => dot(image, row)));
  const settled = [...steps];
  for (let sweep = 0, move = Infinity; sweep < MOST_SWEEPS && move > SETTLED; sweep++) {
    move = 0;
    for (let k = 0; k < steps.length; k++) {
      const step = settled[k]!;
      const variance = covariance[k]![k]!;
      const cavity = 1 / variance - step.precision;
      if (!(cavity * variance > LEAST_CAVITY)) continue;
      const cavityMean = (mean[k]! / variance - step.precision * step.target) / cavity;
      const known = truncatedBelow(cavityMean, Math.sqrt(1 / cavity), step.least);
      const precision = Math.max(0, 1 / known.variance - cavity);
      const pull = known.mean / known.variance - cavity * cavityMean;
      move = Math.max(move, Math.abs(known.mean - mean[k]!) / Math.sqrt(variance));
      addSite(mean, covariance, k, {
        precision: precision - step.precision,
        pull: pull - step.precision * step.target,
      });
      settled[k] = { ...step, precision, target: precision > 0 ? pull / precision : 0 };
    }
  }
  return settled;
}

/** Multiplies the Gaussian by one for its k-th variable. */
function addSite(
  mean: number[],
  covariance: number[][],
  k: number,
  { precision, pull }: { readonly precision: number; readonly pull: number },
): void {
  const column = covariance.map((row) => row[k]!);
  const share = 1 / (1 + precision * column[k]!);
  const gain = share * (pull - precision * mean[k]!);
  for (let i = 0; i < mean.length; i++) {
    mean[i]! += gain * column[i]!;
    for (let j = 0; j < mean.length; j++) {
      covariance[i]![j]! -= precision * share * column[i]! * column[j]!;
    }
  }
}

/**
 * The design of the melt stage with a row for each step: its slope, seen at its target with its precision.
 *
 * @param melt - design of the tiles
 * @param stage - what names the columns and centres
 * @param steps - steps to hold
 * @returns the design with the rows at its end
 */
export function withRising(
  melt: StageDesign,
  stage: StageWeights,
  steps: readonly RisingStep[],
): StageDesign {
  const rows = slopeRows(stage, steps);
  const longer = (own: Float64Array, more: readonly number[]) =>
    Float64Array.from([...own, ...more]);
  return {
    ...melt,
    count: melt.tiles.length + steps.length,
    assumed: steps.length,
    values: longer(melt.values, rows.flat()),
    // A load's error in heat hardly moves a slope.
    slopes: longer(melt.slopes, new Array<number>(steps.length * melt.columnCount).fill(0)),
    priorLogOdds: longer(
      melt.priorLogOdds,
      rows.map((row) => dot(melt.priorMean, row)),
    ),
    outcome: longer(
      melt.outcome,
      steps.map(({ target }) => target),
    ),
    weight: longer(
      melt.weight,
      steps.map(({ precision }) => precision),
    ),
    load: Int32Array.from([...melt.load, ...steps.map(() => 0)]),
  };
}
