// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import { lowerIndex } from '../../../src/numeric/linalg.ts';
import { logisticPosterior, type LogisticPosterior } from './logistic.ts';
import { groupColumns, type GroupPrior, type StagePrior } from './priors.ts';
import type { LogisticData, LogisticPrior } from './whitened.ts';

/** Prior sds of one stage: per group, and of the loads' intercepts. */
export interface StageSds {
  readonly groups: readonly number[];
  readonly load: number;
}

/** A stage at its re-estimated sds. */
export interface EvidenceFit {
  readonly posterior: LogisticPosterior;
  readonly sds: StageSds;
}

/** What each starting sd weighs against the tiles: as many weights seen at exactly that size. */
const PSEUDO_OBSERVATIONS = 4;
/** Largest change of a log variance in the last round. */
const CONVERGED_LOG_VARIANCE = 1e-6;
const MOST_ROUNDS = 1000;

/**
 * Re-estimates the prior sds of a stage from its tiles, and fits the stage with them.
 *
 * Each group's variance is moved to its fixed point (pseudo-observations and squared departures from
 * the prior means, over pseudo-observations and well-determined weights). That is nearly a stationary
 * point of the Laplace evidence times a scaled inverse chi-squared prior, per log variance; the shift of
 * the mode with the sds is left out, as in the source. Without tiles the sds stay.
 *
 * @param data - rows in the order of `priorColumns`, outcomes, loads
 * @param prior - groups with their means and starting sds
 * @returns posterior and sds
 *
 * Source: D. J. C. MacKay, Bayesian interpolation, Neural Computation 4 (1992) 415-447, eq. 4.8.
 */
export function evidenceFit(data: LogisticData, prior: StagePrior): EvidenceFit {
  let sds = startingSds(prior);
  let posterior = logisticPosterior(data, logisticPrior(prior, sds));
  for (let round = 1; round <= MOST_ROUNDS; round++) {
    const next = reEstimated(prior, sds, posterior);
    const change = largestLogVarianceChange(sds, next);
    sds = next;
    const at = { weights: posterior.mean, loads: posterior.loadMean };
    posterior = logisticPosterior(data, logisticPrior(prior, sds), at);
    if (change < CONVERGED_LOG_VARIANCE) return { posterior, sds };
  }
  return { posterior, sds };
}

/**
 * The sds of a prior before any tile.
 *
 * @param prior - groups with their starting sds
 * @returns sds per group and of the loads
 */
function startingSds(prior: StagePrior): StageSds {
  return { groups: prior.groups.map((group) => group.startSd), load: prior.startLoadSd };
}

function logisticPrior({ groups }: StagePrior, sds: StageSds): LogisticPrior {
  return {
    mean: groups.flatMap((group) => Object.values(group.means)),
    sd: groups.flatMap((group, g) => groupColumns(group).map(() => sds.groups[g])),
    loadSd: sds.load,
  };
}

function reEstimated(prior: StagePrior, sds: StageSds, posterior: LogisticPosterior): StageSds {
  let column = 0;
  const groups = prior.groups.map((group, g) => {
    const departures = Object.values(group.means).map((mean) => {
      const at = column++;
      return {
        square: (posterior.mean[at] - mean) ** 2,
        variance: posterior.covarianceLower[lowerIndex(at, at)],
      };
    });
    return fixedPointSd(group, sds.groups[g], departures);
  });
  const loads = posterior.loadMean.map((mean, l) => ({
    square: mean ** 2,
    variance: posterior.loadVariance[l],
  }));
  return { groups, load: fixedPointSd({ startSd: prior.startLoadSd }, sds.load, loads) };
}

function fixedPointSd(
  { startSd }: Pick<GroupPrior, 'startSd'>,
  sd: number,
  departures: readonly { readonly square: number; readonly variance: number }[],
): number {
  let squares = PSEUDO_OBSERVATIONS * startSd ** 2;
  let determined = PSEUDO_OBSERVATIONS;
  for (const { square, variance } of departures) {
    squares += square;
    determined += 1 - variance / sd ** 2;
  }
  return Math.sqrt(squares / determined);
}

function largestLogVarianceChange(before: StageSds, after: StageSds): number {
  const pairs = [...before.groups.map((sd, g) => [sd, after.groups[g]]), [before.load, after.load]];
  return Math.max(...pairs.map(([a = 1, b = 1]) => 2 * Math.abs(Math.log(b / a))));
}
