import type { Unity } from '../../src/chemistry/unity.ts';
import type { Design } from '../../src/model/design.ts';
import { stageRow } from '../../src/model/log-odds.ts';
import { STAGE_PRIOR } from '../../src/model/stages.ts';
import { priorColumns } from '../../src/model/priors.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { convergence } from './chain-convergence.ts';
import { referenceChain, type ChainOptions, type ChainState } from './reference-chain.ts';

/** A composition at a cone. */
export interface AskedAt {
  readonly unity: Unity;
  readonly coneIndex: number;
}

export interface ChainRun extends Omit<ChainOptions, 'seed'> {
  readonly chains: number;
  readonly warmUp: number;
  /** Draws kept of each chain, and sweeps between two of them. */
  readonly draws: number;
  readonly every: number;
}

/** What the draws of all chains say, chain after chain. */
export interface ChainDraws {
  /** [stage][point][draw]: log-odds in a load that truly reaches the cone. */
  readonly logOdds: readonly (readonly Float64Array[])[];
  /** [load][draw]: cones. */
  readonly offsets: readonly Float64Array[];
  /** [scale][draw]: logarithms of the variances of both stages' groups, of the loads, and of the shares. */
  readonly scales: readonly Float64Array[];
  /** Over all of the above: the worst. */
  readonly rHat: number;
  readonly effectiveDraws: number;
}

/**
 * Runs the chain, and asks every draw about some points.
 *
 * @param design - rows of both stages
 * @param asked - points
 * @param run - length
 * @returns draws and how well they converged
 */
export function chainDraws(design: Design, asked: readonly AskedAt[], run: ChainRun): ChainDraws {
  const kept = run.chains * run.draws;
  const empty = (count: number) => Array.from({ length: count }, () => new Float64Array(kept));
  const ask = pointsOf(design, asked);
  const logOdds = design.stages.map(() => empty(asked.length));
  const offsets = empty(design.loadCount);
  const scales = empty(logScales(referenceChain(design, { ...run, seed: 1 })()).length);
  const source = seededGenerator(77);
  for (let c = 0; c < run.chains; c++) {
    const next = referenceChain(design, { ...run, seed: 1 + c });
    for (let k = 0; k < run.warmUp; k++) next();
    for (let d = c * run.draws; d < (c + 1) * run.draws; d++) {
      for (let k = 1; k < run.every; k++) next();
      const state = next();
      ask(state, source.normal, (s, p, value) => (logOdds[s][p][d] = value));
      offsets.forEach((own, l) => (own[d] = state.offsets[l]));
      logScales(state).forEach((value, k) => (scales[k][d] = value));
    }
  }
  const all = [...logOdds.flat(), ...offsets, ...(run.held ? [] : scales)];
  const agreement = all.map((own) =>
    convergence(
      Array.from({ length: run.chains }, (_, c) =>
        Array.from(own.subarray(c * run.draws, (c + 1) * run.draws)),
      ),
    ),
  );
  return {
    logOdds,
    offsets,
    scales,
    rHat: Math.max(...agreement.map(({ rHat }) => rHat)),
    effectiveDraws: Math.min(...agreement.map(({ effectiveDraws }) => effectiveDraws)),
  };
}

function logScales({ stages, offsetVariance, glossVariance }: ChainState): number[] {
  return [
    ...stages.flatMap(({ variances, flipped }) =>
      [...variances, flipped].map((value) => Math.log(value)),
    ),
    Math.log(offsetVariance),
    Math.log(glossVariance),
  ];
}

/** Rows of the points, and what the centres leave over of the smooth departure there. */
function pointsOf({ stages }: Design, asked: readonly AskedAt[]) {
  const rows = stages.map((stage) => {
    const numbers = {
      columns: priorColumns(STAGE_PRIOR[stage.name]),
      radial: stage.radial,
      mean: [],
      covarianceLower: [],
      residual: { startSd: 1, sd: 1 },
    };
    return asked.map(({ unity, coneIndex }) => stageRow(numbers, unity, coneIndex));
  });
  return (
    state: ChainState,
    normal: () => number,
    tell: (stage: number, point: number, logOdds: number) => void,
  ) => {
    rows.forEach((own, s) => {
      const { weights, variances } = state.stages[s];
      const residual = Math.sqrt(variances[variances.length - 1]);
      own.forEach(({ values, leftOverVariance }, p) => {
        let sum = residual * Math.sqrt(leftOverVariance) * normal();
        for (let j = 0; j < values.length; j++) sum += values[j] * weights[j];
        tell(s, p, sum);
      });
    });
  };
}
