import { sigmoid } from '../numeric/logistic.ts';
import { stageCovariances, withScalesSpread } from './covariance.ts';
import { problemAt, STAGE_PRIOR, type Design } from './design.ts';
import { rowLogOdds, type LatentProblem, type Unknowns } from './latent.ts';
import { laplaceEvidence } from './logistic.ts';
import {
  backtracked,
  maximum,
  newtonStep,
  posteriorSpread,
  rowSds,
  type NewtonStep,
} from './newton.ts';
import { LOAD_PRIOR, WRONG_VERDICTS } from './priors.ts';
import {
  fixedPointSd,
  groupDepartures,
  largestMove,
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
  /** [loads][2]: heat less the cone on paper, in cones, and the load's intercept of gloss. */
  readonly loads: Float64Array;
  /** [loads][2]: variance of each. */
  readonly loadVariance: Float64Array;
  /** Laplace estimate of the log evidence at the scales. */
  readonly logEvidence: number;
  /** Rounds of re-estimation. */
  readonly rounds: number;
  /** Largest entry of the gradient at the answer, in units of the prior. */
  readonly gradientNorm: number;
}

/** Where a re-estimation begins, to save time. */
export interface EvidenceStart {
  readonly scales: Scales;
  readonly weights?: readonly Float64Array[];
  /** Largest relative move of a variance, or move of a weight, in the last round; 0.01 where absent. */
  readonly tolerance?: number;
}

const CONVERGED_MOVE = 0.01;
const MOST_ROUNDS = 200;
/** Decrement at which the last maximum is near enough, per square of the tolerance. */
const LAST_DECREMENT = 1e-3;

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
 * Sources: fixed point of the sds: D. J. C. MacKay, Neural Computation 4 (1992) 415-447. Averaged
 * likelihood: M. Opper and C. Archambeau, The variational Gaussian approximation revisited, Neural
 * Computation 21 (2009) 786-792. Spread of the sds: R. E. Kass and D. Steffey, Journal of the American
 * Statistical Association 84 (1989) 717-726.
 */
export function evidenceFit(
  design: Design,
  start: EvidenceStart = { scales: startingScales(STAGE_PRIOR) },
  isHeld = false,
): EvidenceFit {
  const { tolerance = CONVERGED_MOVE } = start;
  let { scales } = start;
  let weights = start.weights ?? design.stages.map((s) => Float64Array.from(s.priorMean));
  let loads = new Float64Array(2 * design.loadCount);
  let rounds = 0;
  for (let move = Infinity; rounds < MOST_ROUNDS && move > tolerance; rounds++) {
    const problem = problemAt(design, scales, weights);
    const from = unknownsAt(design, scales, weights, loads);
    const step = newtonStep(problem, from);
    const unknowns = backtracked(problem, from, step) ?? from;
    const next = isHeld ? scales : reEstimated(design, problem, scales, unknowns, step);
    const reached = weightsAt(design, scales, unknowns.theta);
    move = Math.max(isHeld ? 0 : largestMove(scales, next), largestDifference(weights, reached));
    weights = reached;
    loads = loadsAt(scales, unknowns.loads);
    scales = next;
  }
  return averagedFit(design, { scales, weights, tolerance }, loads, rounds, isHeld);
}

function averagedFit(
  design: Design,
  { scales, weights, tolerance }: Required<EvidenceStart>,
  loads: Float64Array,
  rounds: number,
  isHeld: boolean,
): EvidenceFit {
  const problem = problemAt(design, scales, weights);
  const enough = LAST_DECREMENT * tolerance ** 2;
  const mode = maximum(problem, unknownsAt(design, scales, weights, loads), enough);
  const sds = rowSds(problem, mode.step);
  const centre = maximum(problem, { ...mode.unknowns, sds }, enough);
  const { covariance, loadVariance } = posteriorSpread(centre.step);
  const { theta } = centre.unknowns;
  const widened = isHeld ? covariance : withScalesSpread(design, theta, covariance);
  return {
    scales,
    weights: weightsAt(design, scales, theta),
    covariances: stageCovariances(design, scales, widened),
    loads: loadsAt(scales, centre.unknowns.loads),
    loadVariance: loadVariance.map((v, k) => v * loadSd(scales, k) ** 2),
    logEvidence: laplaceEvidence(mode.step),
    rounds,
    gradientNorm: centre.step.gradientNorm,
  };
}

function reEstimated(
  design: Design,
  problem: LatentProblem,
  scales: Scales,
  unknowns: Unknowns,
  step: NewtonStep,
): Scales {
  const { covariance, loadVariance } = posteriorSpread(step);
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
  for (let i = 0; i < block.count; i++) {
    const yes = sigmoid(rowLogOdds(block, first, unknowns, i));
    const outcome = block.outcome[i]!;
    const weight = block.weight[i]!;
    const ifYes = (flipped * (1 - yes)) / (flipped + (1 - 2 * flipped) * yes);
    const ifNo = (flipped * yes) / (flipped + (1 - 2 * flipped) * (1 - yes));
    sum += weight * (outcome * ifYes + (1 - outcome) * ifNo);
    tiles += weight;
  }
  return sum / tiles;
}
