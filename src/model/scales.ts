import { lowerIndex } from '../numeric/linalg.ts';
import type { StageDesign, StageName } from './design.ts';
import { LOAD_PRIOR, WRONG_VERDICTS, type StagePrior } from './priors.ts';

/** Prior sds of one stage, and how often its verdicts are wrong. */
export interface StageScales {
  /** Per group of columns. */
  readonly groups: readonly number[];
  /** Of the smooth departure. */
  readonly residual: number;
  /** Share of verdicts that are the wrong way round. */
  readonly flipped: number;
}

/** All that is re-estimated from the tiles beside the weights. */
export interface Scales {
  readonly melt: StageScales;
  readonly gloss: StageScales;
  readonly loads: {
    /** Sd of a load's heat about the cone on paper, in cones. */
    readonly offsetCones: number;
    /** Sd of a load's own intercept of gloss, log-odds. */
    readonly gloss: number;
  };
}

/**
 * Sd of the weights of a group.
 *
 * @param scales - of the stage
 * @param group - its number; after the groups come the smooth departure and what is held at 1
 * @returns sd
 */
export function sdOfGroup({ groups, residual }: StageScales, group: number): number {
  if (group > groups.length) return 1;
  return groups[group] ?? residual;
}

/** What each starting sd weighs against the tiles: as many weights seen at exactly that size. */
export const PSEUDO_OBSERVATIONS = 4;

/**
 * The scales before any tile.
 *
 * @param priors - prior of each stage
 * @returns sds and shares
 */
export function startingScales(priors: Readonly<Record<StageName, StagePrior>>): Scales {
  const of = ({ groups, startResidualSd }: StagePrior): StageScales => ({
    groups: groups.map(({ startSd }) => startSd),
    residual: startResidualSd,
    flipped: WRONG_VERDICTS.startShare,
  });
  return {
    melt: of(priors.melt),
    gloss: of(priors.gloss),
    loads: { offsetCones: LOAD_PRIOR.startOffsetCones, gloss: LOAD_PRIOR.startGlossSd },
  };
}

/** Unknowns that share one sd, in units of it. */
export interface Departures {
  square: number;
  /** Sum of 1 - variance: how many of them the tiles determine. */
  determined: number;
}

/**
 * The next sd of a group, on the way to the fixed point at which it fits its weights.
 *
 * @param startSd - before any tile
 * @param sd - at present
 * @param departures - in units of the present sd
 * @returns the next sd
 *
 * Source: D. J. C. MacKay, Bayesian interpolation, Neural Computation 4 (1992) 415-447, eq. 4.8, with the
 * starting sd as pseudo-observations.
 */
export function fixedPointSd(
  startSd: number,
  sd: number,
  { square, determined }: Departures,
): number {
  const squares = PSEUDO_OBSERVATIONS * startSd ** 2 + square * sd ** 2;
  return Math.sqrt(squares / (PSEUDO_OBSERVATIONS + determined));
}

/**
 * How far the weights of each group stand from the prior.
 *
 * @param design - the stage
 * @param theta - weights of all stages, in units of the prior
 * @param covariance - their covariance, lower triangle
 * @param first - place of the stage's first weight
 * @returns per group, the radial columns last
 */
export function groupDepartures(
  { size, groupOf }: StageDesign,
  theta: Float64Array,
  covariance: Float64Array,
  first: number,
): Departures[] {
  const groups = groupOf.reduce((a, b) => Math.max(a, b), -1) + 1;
  const departures = Array.from({ length: groups }, () => ({ square: 0, determined: 0 }));
  for (let j = 0; j < size; j++) {
    const at = first + j;
    const own = departures[groupOf[j]!]!;
    own.square += theta[at]! ** 2;
    own.determined += 1 - covariance[lowerIndex(at, at)]!;
  }
  return departures;
}

/** Logarithms of all variances and shares, in one order. */
function logsOf({ melt, gloss, loads }: Scales): number[] {
  return [
    ...[melt, gloss].flatMap(({ groups, residual, flipped }) => [
      ...[...groups, residual].map((sd) => 2 * Math.log(sd)),
      Math.log(flipped),
    ]),
    2 * Math.log(loads.offsetCones),
    2 * Math.log(loads.gloss),
  ];
}

function fromLogs(logs: readonly number[], like: Scales): Scales {
  let at = 0;
  const sd = () => Math.exp(logs[at++]! / 2);
  const stage = ({ groups }: StageScales): StageScales => ({
    groups: groups.map(sd),
    residual: sd(),
    flipped: Math.exp(logs[at++]!),
  });
  return {
    melt: stage(like.melt),
    gloss: stage(like.gloss),
    loads: { offsetCones: sd(), gloss: sd() },
  };
}

/**
 * Largest relative move between two scales: of a variance or a share.
 *
 * @param before - scales
 * @param after - scales
 * @returns largest difference of logarithms
 */
export function largestMove(before: Scales, after: Scales): number {
  const to = logsOf(after);
  return logsOf(before).reduce((most, value, i) => Math.max(most, Math.abs(value - to[i]!)), 0);
}

/** Only a steady approach is carried on, and no farther than this, in logarithms. */
const STEADY = { least: 0.3, most: 0.97 } as const;
const LONGEST_LEAP = 1;

/**
 * Where three scales in a row lead to, each approaching its end by a steady share of what is left.
 *
 * @param first - scales two rounds ago
 * @param second - a round ago
 * @param third - now
 * @returns scales nearer to the end; those that do not approach steadily stay
 *
 * Source: A. C. Aitken's delta squared, Proceedings of the Royal Society of Edinburgh 46 (1926) 289-305.
 */
export function carriedOn(first: Scales, second: Scales, third: Scales): Scales {
  const [a, b] = [logsOf(first), logsOf(second)];
  const ends = logsOf(third).map((c, i) => {
    const share = (c - b[i]!) / (b[i]! - a[i]!);
    if (!(share > STEADY.least && share < STEADY.most)) return c;
    const leap = ((c - b[i]!) * share) / (1 - share);
    return c + Math.max(-LONGEST_LEAP, Math.min(LONGEST_LEAP, leap));
  });
  return fromLogs(ends, third);
}
