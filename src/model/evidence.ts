import { lowerIndex } from '../numeric/linalg.ts';
import { sigmoid } from '../numeric/logistic.ts';
import { stageCovariances, withScalesSpread } from './covariance.ts';
import { problemAt, STAGE_PRIOR, type Design } from './design.ts';
import { blockLogOdds, type LatentProblem, type Unknowns } from './latent.ts';
import { laplaceEvidence } from './logistic.ts';
import { backtracked, exactStep, maximum, newtonStep, type NewtonStep } from './newton.ts';
import { posteriorSpread, rowSds, type PosteriorSpread } from './spread.ts';
import { largestShift, type ModeShift } from './mode-shift.ts';
import { LOAD_PRIOR, WRONG_VERDICTS } from './priors.ts';
import {
  carriedOn,
  fixedPointSd,
  groupDepartures,
  largestMove,
  PSEUDO_OBSERVATIONS,
  startingScales,
  type Scales,
  type StageScales,
} from './scales.ts';
import { largestDifference, loadsAt, loadSd, unknownsAt, weightsAt } from './units.ts';

/** Both stages at their scales. */
export interface EvidenceFit {
  readonly scales: Scales;
  /** Per stage: posterior mean of the weights, log-odds per unit of the column. */
  readonly weights: readonly Float64Array[];
  /** Per stage: covariance of the weights, lower triangle; that of the scales is in it. */
  readonly covariances: readonly Float64Array[];
  /** The same without that of the scales. */
  readonly covariancesAtScales: readonly Float64Array[];
  /** [loads][2]: heat less the cone on paper, in cones, and the load's intercept of gloss. */
  readonly loads: Float64Array;
  /** [loads][2]: variance of each; that of the loads' spread is in it. */
  readonly loadVariance: Float64Array;
  /** Per load: how much wider than usual its heat is taken to spread, 1 for a load like the others. */
  readonly stretch: Float64Array;
  /** Laplace estimate of the log evidence at the scales. */
  readonly logEvidence: number;
  /** Rounds of re-estimation. */
  readonly rounds: number;
  /**
   * How far the posterior is from a Gaussian: by how many of its sds the log-odds of a verdict moves, at most,
   * from the mode to the centre of the Gaussian nearest to the posterior; and of which verdict.
   */
  readonly modeShift: ModeShift;
  /** Largest entry of the gradient at the answer, in units of the prior. */
  readonly gradientNorm: number;
}

/** Where a re-estimation begins, to save time. */
export interface EvidenceStart {
  readonly scales: Scales;
  readonly weights?: readonly Float64Array[];
  /** [loads][2] and per load, as in the fit. */
  readonly loads?: Float64Array;
  readonly stretch?: Float64Array;
  /** Largest relative move of a variance, or move of a weight, in the last round; 0.01 where absent. */
  readonly tolerance?: number;
}

const CONVERGED_MOVE = 0.01;
const MOST_ROUNDS = 200;
/** Once the scales approach their end steadily, every few rounds they are carried on to it. */
const LEAP_EVERY = 3;
const STEADY_MOVE = 0.3;
/** Decrement at which the last maximum is near enough, per square of the tolerance. */
const LAST_DECREMENT = 0.01;

/**
 * Fits both stages, and re-estimates from the tiles the prior sds, the spread of the loads and the share
 * of wrong verdicts, each with its starting value as a few pseudo-observations. Without tiles they stay.
 *
 * At the end the mode is replaced by the centre of the Gaussian that is nearest to the posterior: each
 * verdict's likelihood is averaged over the spread of its log-odds. The spread of the sds themselves is
 * added to the covariance.
 *
 * @param design - both stages
 * @param start - scales and weights to begin with
 * @param isHeld - whether the scales stay as they are
 * @returns scales, weights, covariance, loads
 *
 * The heat of the loads follows Student's t: one load that fired far off neither widens the spread of
 * all nor is pulled in with them.
 *
 * Sources: fixed point of the sds: D. J. C. MacKay, Neural Computation 4 (1992) 415-447. Averaged
 * likelihood: M. Opper and C. Archambeau, The variational Gaussian approximation revisited, Neural
 * Computation 21 (2009) 786-792. Spread of the sds: R. E. Kass and D. Steffey, Journal of the American
 * Statistical Association 84 (1989) 717-726. Student's t by scales: K. L. Lange, R. J. A. Little and J. M. G.
 * Taylor, ibid. 881-896.
 */
export function evidenceFit(
  design: Design,
  start: EvidenceStart = { scales: startingScales(STAGE_PRIOR) },
  isHeld = false,
): EvidenceFit {
  const { tolerance = CONVERGED_MOVE } = start;
  let { scales } = start;
  let weights = start.weights ?? design.stages.map((s) => Float64Array.from(s.priorMean));
  let loads = Float64Array.from(start.loads ?? new Float64Array(2 * design.loadCount));
  const stretch = Float64Array.from(start.stretch ?? new Float64Array(design.loadCount).fill(1));
  let before: Scales[] = [];
  let rounds = 0;
  for (let move = Infinity; rounds < MOST_ROUNDS && move > tolerance; rounds++) {
    const problem = problemAt(design, scales, weights, stretch);
    const from = unknownsAt(design, scales, weights, loads, stretch);
    const { step, spread } = soundStep(problem, from);
    const unknowns = backtracked(problem, from, step) ?? from;
    const reached = weightsAt(design, scales, unknowns.theta);
    move = largestDifference(weights, reached);
    weights = reached;
    loads = loadsAt(scales, unknowns.loads, stretch);
    if (isHeld) continue;
    const next = reEstimated(design, problem, scales, unknowns, spread);
    move = Math.max(move, largestMove(scales, next));
    widenOutliers(stretch, unknowns, spread);
    before = [...before, scales];
    scales = next;
    if (before.length < LEAP_EVERY || move > STEADY_MOVE) continue;
    const [first, second] = before.slice(-2) as [Scales, Scales];
    scales = carriedOn(first, second, next);
    before = [];
  }
  const reached = { scales, weights, loads, stretch, tolerance };
  return averagedFit(design, reached, rounds, isHeld);
}

/** In units of the prior no variance is above 1, but for what a few doubtful verdicts do. */
const MOST_VARIANCE = 1.05;

/** The exact step, unless its curvature leaves less known than the prior does. */
function soundStep(
  problem: LatentProblem,
  unknowns: Unknowns,
): { readonly step: NewtonStep; readonly spread: PosteriorSpread } {
  const step = exactStep(problem, unknowns);
  const spread = posteriorSpread(step);
  if (largestVariance(spread, step.theta.length) <= MOST_VARIANCE) return { step, spread };
  const sound = newtonStep(problem, unknowns);
  return { step: sound, spread: posteriorSpread(sound) };
}

function largestVariance({ covariance, loadVariance }: PosteriorSpread, size: number): number {
  let most = loadVariance.reduce((a, b) => Math.max(a, b), 0);
  for (let j = 0; j < size; j++) most = Math.max(most, covariance[lowerIndex(j, j)]!);
  return most;
}

function averagedFit(
  design: Design,
  { scales, weights, loads, stretch, tolerance }: Required<EvidenceStart>,
  rounds: number,
  isHeld: boolean,
): EvidenceFit {
  const problem = problemAt(design, scales, weights, stretch);
  const enough = LAST_DECREMENT * tolerance ** 2;
  const mode = maximum(problem, unknownsAt(design, scales, weights, loads, stretch), enough);
  const sds = rowSds(problem, mode.step);
  const centre = maximum(problem, { ...mode.unknowns, sds }, enough);
  // Without the curvature of doubtful verdicts the spread is never too wide for want of digits.
  const { covariance, loadVariance } = posteriorSpread(newtonStep(problem, centre.unknowns));
  const { theta } = centre.unknowns;
  const none = new Float64Array(loadVariance.length);
  const more = isHeld ? none : spreadOfOffsets(centre.unknowns.loads, loadVariance);
  const widened = isHeld ? covariance : withScalesSpread(design, scales, theta, covariance);
  return {
    scales,
    weights: weightsAt(design, scales, theta),
    covariances: stageCovariances(design, scales, widened),
    covariancesAtScales: stageCovariances(design, scales, covariance),
    loads: loadsAt(scales, centre.unknowns.loads, stretch),
    loadVariance: loadVariance.map(
      (variance, k) => (variance + more[k]!) * loadSd(scales, k, stretch) ** 2,
    ),
    stretch,
    logEvidence: laplaceEvidence(mode.step),
    rounds,
    gradientNorm: centre.step.gradientNorm,
    modeShift: largestShift(problem, mode.unknowns, centre.unknowns, sds),
  };
}

/**
 * Widens the spread of the loads that stand off from the others: their offsets follow Student's t, whose
 * spread is re-estimated for each load like a scale of one observation.
 */
function widenOutliers(
  stretch: Float64Array,
  { loads }: Unknowns,
  { loadVariance }: PosteriorSpread,
): void {
  stretch.forEach((own, l) => {
    const square = own * own * (loads[2 * l]! ** 2 + loadVariance[2 * l]!);
    const { degreesOfFreedom } = LOAD_PRIOR;
    stretch[l] = Math.sqrt((degreesOfFreedom + square) / (degreesOfFreedom + 1));
  });
}

/**
 * What the uncertain spread of a load's heat adds to the variance of its offset, in units of that spread:
 * the offset moves with the logarithm of the spread by twice itself times its variance. The spread of all
 * loads and the load's own stretch are both uncertain.
 */
function spreadOfOffsets(unknowns: Float64Array, loadVariance: Float64Array): Float64Array {
  let determined = PSEUDO_OBSERVATIONS;
  for (let k = 0; k < loadVariance.length; k += 2) determined += 1 - loadVariance[k]!;
  const ofLogSpread = 1 / (2 * determined) + 1 / (2 * (LOAD_PRIOR.degreesOfFreedom + 1));
  return loadVariance.map((variance, k) =>
    k % 2 === 0 ? (2 * unknowns[k]! * variance) ** 2 * ofLogSpread : 0,
  );
}

function reEstimated(
  design: Design,
  problem: LatentProblem,
  scales: Scales,
  unknowns: Unknowns,
  { covariance, loadVariance }: PosteriorSpread,
): Scales {
  let first = 0;
  const [melt, gloss] = design.stages.map((stage, s): StageScales => {
    const own = scales[stage.name];
    const prior = STAGE_PRIOR[stage.name];
    const departures = groupDepartures(stage, unknowns.theta, covariance, first);
    const none = { square: 0, determined: 0 };
    const base = first;
    first += stage.size;
    return {
      groups: own.groups.map((sd, g) =>
        fixedPointSd(prior.groups[g]!.startSd, sd, departures[g] ?? none),
      ),
      residual: fixedPointSd(
        prior.startResidualSd,
        own.residual,
        departures[own.groups.length] ?? none,
      ),
      flipped: shareFlipped(problem.blocks[s]!, base, unknowns, own.flipped),
    };
  }) as [StageScales, StageScales];
  const ofLoads = (k: 0 | 1) => {
    const departures = { square: 0, determined: 0 };
    for (let at = k; at < loadVariance.length; at += 2) {
      departures.square += unknowns.loads[at]! ** 2;
      departures.determined += 1 - loadVariance[at]!;
    }
    return departures;
  };
  const { offsetCones, gloss: glossSd } = scales.loads;
  return {
    melt,
    gloss,
    loads: {
      offsetCones: fixedPointSd(LOAD_PRIOR.startOffsetCones, offsetCones, ofLoads(0)),
      gloss: fixedPointSd(LOAD_PRIOR.startGlossSd, glossSd, ofLoads(1)),
    },
  };
}

/** Mean probability that a verdict is the wrong way round, given the log-odds at the maximum. */
function shareFlipped(
  block: LatentProblem['blocks'][number],
  first: number,
  unknowns: Unknowns,
  flipped: number,
): number {
  const { startShare, pseudoTiles } = WRONG_VERDICTS;
  let sum = startShare * pseudoTiles;
  let tiles = pseudoTiles;
  const logOdds = blockLogOdds(block, first, unknowns);
  for (let i = 0; i < block.count - (block.assumed ?? 0); i++) {
    const yes = sigmoid(logOdds[i]!);
    const outcome = block.outcome[i]!;
    const weight = block.weight[i]!;
    const ifYes = (flipped * (1 - yes)) / (flipped + (1 - 2 * flipped) * yes);
    const ifNo = (flipped * yes) / (flipped + (1 - 2 * flipped) * (1 - yes));
    sum += weight * (outcome * ifYes + (1 - outcome) * ifNo);
    tiles += weight;
  }
  return sum / tiles;
}
