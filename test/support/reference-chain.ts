import type { Design, StageDesign } from '../../src/model/design.ts';
import { LOAD_PRIOR, WRONG_VERDICTS } from '../../src/model/priors.ts';
import { PSEUDO_OBSERVATIONS, type Scales } from '../../src/model/scales.ts';
import { STAGE_PRIOR } from '../../src/model/stages.ts';
import {
  choleskyFactor,
  lowerIndex,
  solveLower,
  solveUpper,
  type LowerTriangle,
} from '../../src/numeric/linalg.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator, type Generator } from '../../src/numeric/random.ts';
import { drawnBeta, drawnInverseGamma, drawnPolyaGamma } from './drawn-laws.ts';

/** One state of the chain: everything that the model does not know. */
export interface ChainState {
  readonly stages: readonly ChainStage[];
  /** Per load: heat less the cone on paper, cones; how much wider than usual its variance is; gloss. */
  readonly offsets: Float64Array;
  readonly widths: Float64Array;
  readonly gloss: Float64Array;
  offsetVariance: number;
  glossVariance: number;
}

export interface ChainStage {
  weights: Float64Array;
  /** Variance of each group, the smooth departure's last. */
  readonly variances: Float64Array;
  flipped: number;
}

export interface ChainOptions {
  readonly seed: number;
  /** Scales to hold, with each load's stretch; all are drawn where absent. */
  readonly held?: { readonly scales: Scales; readonly stretch: Float64Array };
  /** What the pseudo-observations of a variance are the density of; its inverse where absent. */
  readonly readAs?: 'inverse' | 'logarithm';
  /** Weights at which to hold what a cone does; the weights of the state where absent. */
  readonly slopesAt?: readonly Float64Array[];
}

/**
 * A Markov chain over the whole model, from DEVELOPERS.md and not by the fit's own means: Gibbs
 * sampling with Polya-Gamma variables. Every tile counts once.
 *
 * Densities: k pseudo-observations of a variance v at start^2 weigh v^(-k/2) exp(-k start^2 / 2 v), whose
 * greatest value the fit's fixed point seeks. It is read as the density of the precision 1/v: then the
 * variance of a weight before any tile, the mean of v, is start^2, as the fit has it. Read as that of ln v,
 * the same fixed point would leave twice that variance before any tile. A share of wrong verdicts worth n
 * tiles has the density of Beta(n start, n (1 - start)), with the mean at the start. A load's heat is
 * Gaussian with a variance of its own, whose spread makes it Student's t.
 *
 * @param design - rows of both stages
 * @param options - seed, what to hold
 * @returns a function that moves the state on by one sweep and returns it, the same object each time
 */
export function referenceChain(design: Design, options: ChainOptions): () => ChainState {
  const source = seededGenerator(options.seed);
  const state = startingState(design, source, options);
  return () => {
    const augmented = design.stages.map((stage, s) => augment(stage, s, state, options, source));
    design.stages.forEach((stage, s) => {
      drawWeights(stage, s, augmented[s], state, source, options);
    });
    drawLoads(design, augmented, state, source, options);
    if (!options.held) drawScales(design, augmented, state, source, options);
    return state;
  };
}

/** Dispersed: weights and loads from the prior. */
function startingState(
  { stages, loadCount }: Design,
  source: Generator,
  { held }: ChainOptions,
): ChainState {
  const normals = (sd: number) =>
    Float64Array.from({ length: loadCount }, () => sd * source.normal());
  const loads = held?.scales.loads;
  const offsetSd = loads?.offsetCones ?? LOAD_PRIOR.startOffsetCones;
  const glossSd = loads?.gloss ?? LOAD_PRIOR.startGlossSd;
  return {
    stages: stages.map((stage) => {
      const sds = startSds(stage, held?.scales);
      const weights = stage.groupOf.map((g, j) => stage.priorMean[j] + sds[g] * source.normal());
      return {
        weights: Float64Array.from(weights),
        variances: Float64Array.from(sds, (sd) => sd ** 2),
        flipped: held?.scales[stage.name].flipped ?? WRONG_VERDICTS.startShare,
      };
    }),
    offsets: normals(offsetSd),
    widths: held?.stretch.map((s) => s * s) ?? new Float64Array(loadCount).fill(1),
    gloss: normals(glossSd),
    offsetVariance: offsetSd ** 2,
    glossVariance: glossSd ** 2,
  };
}

function startSds({ name }: StageDesign, held?: Scales): number[] {
  if (held) return [...held[name].groups, held[name].residual];
  const { groups, startResidualSd } = STAGE_PRIOR[name];
  return [...groups.map(({ startSd }) => startSd), startResidualSd];
}

/** Per tile: precision and pull of its log-odds, and whether its verdict is taken as wrong. */
interface Augmented {
  readonly precision: Float64Array;
  readonly pull: Float64Array;
  wrong: number;
}

function rowTimes(
  { size }: StageDesign,
  rows: Float64Array,
  width: number,
  i: number,
  x: Float64Array,
) {
  let sum = 0;
  for (let j = 0; j < Math.min(size, width); j++) sum += rows[i * width + j] * x[j];
  return sum;
}

/** What a cone does at each tile, log-odds. */
function heatSlope(
  stage: StageDesign,
  s: number,
  i: number,
  state: ChainState,
  options: ChainOptions,
) {
  const weights = options.slopesAt?.[s] ?? state.stages[s].weights;
  return rowTimes(stage, stage.slopes, stage.columnCount, i, weights);
}

function augment(
  stage: StageDesign,
  s: number,
  state: ChainState,
  options: ChainOptions,
  source: Generator,
): Augmented {
  const { weights, flipped } = state.stages[s];
  const precision = new Float64Array(stage.count);
  const pull = new Float64Array(stage.count);
  let wrong = 0;
  for (let i = 0; i < stage.count; i++) {
    const load = stage.load[i];
    const logOdds =
      rowTimes(stage, stage.values, stage.size, i, weights) +
      heatSlope(stage, s, i, state, options) * state.offsets[load] +
      (stage.name === 'gloss' ? state.gloss[load] : 0);
    const said = stage.outcome[i] === 1 ? sigmoid(logOdds) : sigmoid(-logOdds);
    const ifWrong = flipped * (1 - said);
    const isWrong = source.uniform() < ifWrong / (ifWrong + (1 - flipped) * said);
    wrong += Number(isWrong);
    precision[i] = drawnPolyaGamma(source, logOdds);
    pull[i] = (isWrong ? 1 - stage.outcome[i] : stage.outcome[i]) - 0.5;
  }
  return { precision, pull, wrong };
}

/** Weights given loads, scales and augmentation: a Gaussian. */
function drawWeights(
  stage: StageDesign,
  s: number,
  { precision, pull }: Augmented,
  state: ChainState,
  source: Generator,
  options: ChainOptions,
): void {
  const { size, columnCount, groupOf, priorMean } = stage;
  const { variances } = state.stages[s];
  const matrix: LowerTriangle = new Float64Array(lowerIndex(size, 0));
  const right = new Float64Array(size);
  groupOf.forEach((g, j) => {
    matrix[lowerIndex(j, j)] = 1 / variances[g];
    right[j] = priorMean[j] / variances[g];
  });
  const row = new Float64Array(size);
  for (let i = 0; i < stage.count; i++) {
    row.set(stage.values.subarray(i * size, (i + 1) * size));
    const load = stage.load[i];
    let known = stage.name === 'gloss' ? state.gloss[load] : 0;
    if (options.slopesAt) {
      known += heatSlope(stage, s, i, state, options) * state.offsets[load];
    } else {
      for (let j = 0; j < columnCount; j++) {
        row[j] += state.offsets[load] * stage.slopes[i * columnCount + j];
      }
    }
    const target = pull[i] - precision[i] * known;
    for (let j = 0, cell = 0; j < size; j++) {
      right[j] += row[j] * target;
      const share = precision[i] * row[j];
      for (let k = 0; k <= j; k++) matrix[cell++] += share * row[k];
    }
  }
  const factor = choleskyFactor(matrix, size);
  const shaken = solveLower(factor, right).map((value) => value + source.normal());
  state.stages[s].weights = solveUpper(factor, shaken);
}

/** Heat and gloss of each load given all else: a Gaussian of two. */
function drawLoads(
  { stages, loadCount }: Design,
  augmented: readonly Augmented[],
  state: ChainState,
  source: Generator,
  options: ChainOptions,
): void {
  const sums = Array.from({ length: loadCount }, (_, l) => ({
    heat: 1 / (state.offsetVariance * state.widths[l]),
    both: 0,
    gloss: 1 / state.glossVariance,
    rightHeat: 0,
    rightGloss: 0,
  }));
  stages.forEach((stage, s) => {
    const { precision, pull } = augmented[s];
    const ofGloss = stage.name === 'gloss' ? 1 : 0;
    for (let i = 0; i < stage.count; i++) {
      const own = sums[stage.load[i]];
      const slope = heatSlope(stage, s, i, state, options);
      const weights = state.stages[s].weights;
      const left = pull[i] - precision[i] * rowTimes(stage, stage.values, stage.size, i, weights);
      own.heat += precision[i] * slope * slope;
      own.both += precision[i] * slope * ofGloss;
      own.gloss += precision[i] * ofGloss;
      own.rightHeat += slope * left;
      own.rightGloss += ofGloss * left;
    }
  });
  sums.forEach(({ heat, both, gloss, rightHeat, rightGloss }, l) => {
    const first = Math.sqrt(heat);
    const cross = both / first;
    const second = Math.sqrt(gloss - cross * cross);
    const a = rightHeat / first + source.normal();
    const b = (rightGloss - (cross * rightHeat) / first) / second + source.normal();
    state.gloss[l] = b / second;
    state.offsets[l] = (a - cross * state.gloss[l]) / first;
  });
}

function drawScales(
  { stages, loadCount }: Design,
  augmented: readonly Augmented[],
  state: ChainState,
  source: Generator,
  { readAs = 'inverse' }: ChainOptions,
): void {
  const more = readAs === 'inverse' ? 2 : 0;
  const variance = (start: number, count: number, squares: number) =>
    drawnInverseGamma(
      source,
      (PSEUDO_OBSERVATIONS + more + count) / 2,
      (PSEUDO_OBSERVATIONS * start ** 2 + squares) / 2,
    );
  stages.forEach((stage, s) => {
    const own = state.stages[s];
    startSds(stage).forEach((start, g) => {
      const members = stage.groupOf.flatMap((of, j) => (of === g ? [j] : []));
      const squares = members.reduce(
        (sum, j) => sum + (own.weights[j] - stage.priorMean[j]) ** 2,
        0,
      );
      own.variances[g] = variance(start, members.length, squares);
    });
    const { startShare, pseudoTiles } = WRONG_VERDICTS;
    const { wrong } = augmented[s];
    const right = stage.count - wrong;
    own.flipped = drawnBeta(
      source,
      startShare * pseudoTiles + wrong,
      (1 - startShare) * pseudoTiles + right,
    );
  });
  const { degreesOfFreedom, startOffsetCones, startGlossSd } = LOAD_PRIOR;
  state.offsets.forEach((offset, l) => {
    const square = offset ** 2 / state.offsetVariance;
    const shape = (degreesOfFreedom + 1) / 2;
    state.widths[l] = drawnInverseGamma(source, shape, (degreesOfFreedom + square) / 2);
  });
  const squares = state.offsets.reduce((sum, u, l) => sum + u ** 2 / state.widths[l], 0);
  state.offsetVariance = variance(startOffsetCones, loadCount, squares);
  const ofGloss = state.gloss.reduce((sum, g) => sum + g * g, 0);
  state.glossVariance = variance(startGlossSd, loadCount, ofGloss);
}
