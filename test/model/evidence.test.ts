import { inverse } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { problemAt, type Design } from '../../src/model/design.ts';
import { evidenceFit, type EvidenceFit } from '../../src/model/evidence.ts';
import { rowLogOdds, weightCount } from '../../src/model/latent.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { maximum } from '../../src/model/newton.ts';
import { LOAD_PRIOR, WRONG_VERDICTS } from '../../src/model/priors.ts';
import { startingScales, type Scales, type StageScales } from '../../src/model/scales.ts';
import {
  fitStages,
  fittedStages,
  isJudged,
  STAGE_PRIOR,
  type StagesFit,
} from '../../src/model/stages.ts';
import { loadSd, unknownsAt, weightsAt } from '../../src/model/units.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { densePrecision, denseRows, type DenseRow } from '../support/latent-problems.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

/** The code stops once no variance and no share moves by more than 1 % a round. */
const CONVERGED = 0.01;
const START = startingScales(STAGE_PRIOR);
const NAMES = ['melt', 'gloss'] as const;
const points = Array.from({ length: 20 }, (_, i) => drawnUnity(seededGenerator(100 + i)));

function logOddsOf(fit: StagesFit) {
  const stages = fittedStages(fit, new Set());
  return NAMES.flatMap((name) =>
    points.flatMap((unity) => [5, 6, 7].map((cone) => stageLogOdds(stages[name], unity, cone))),
  );
}

/** All scales by name: variances and shares, as the code compares them. */
function scalesByName({ melt, gloss, loads }: Scales): [string, number][] {
  const of = (name: string, { groups, residual, flipped }: StageScales): [string, number][] => [
    ...groups.map((sd, g): [string, number] => [`${name} ${g}`, sd ** 2]),
    [`${name} residual`, residual ** 2],
    [`${name} flipped`, flipped],
  ];
  return [
    ...of('melt', melt),
    ...of('gloss', gloss),
    ['offset', loads.offsetCones ** 2],
    ['load gloss', loads.gloss ** 2],
  ];
}

function greatestMove(a: Scales, b: Scales): number {
  const to = scalesByName(b);
  return Math.max(...scalesByName(a).map(([, value], i) => Math.abs(Math.log(value / to[i][1]))));
}

/** With the curvature of doubtful verdicts, as the rounds have it. */
const exactly = ({ curvature }: DenseRow) => curvature;

/** The exact mode at the scales, what a cone does at each tile taken at the mode itself. */
function modeAt(design: Design, { scales, weights: start, stretch }: EvidenceFit) {
  let weights = start;
  let loads = new Float64Array(2 * design.loadCount);
  for (let round = 0; ; round++) {
    const problem = problemAt(design, scales, weights, stretch);
    const from = unknownsAt(design, scales, weights, loads, stretch);
    const { unknowns } = maximum(problem, from, 1e-20);
    if (round === 40) return { problem, unknowns };
    weights = weightsAt(design, scales, unknowns.theta);
    loads = unknowns.loads.map((u, k) => u * loadSd(scales, k, stretch));
  }
}

/** The scales that one more round would lead to, from the dense covariance of all unknowns. */
function nextScales(design: Design, fit: EvidenceFit): Scales {
  const { scales } = fit;
  const { problem, unknowns } = modeAt(design, fit);
  const covariance = inverse(densePrecision(denseRows(problem, unknowns), exactly));
  const all = [...unknowns.theta, ...unknowns.loads];
  /** (4 start^2 + sum of squares) / (4 + number determined), MacKay 1992 with four observations more. */
  const sdOf = (startSd: number, sd: number, members: readonly number[]) => {
    const squares = members.reduce((sum, k) => sum + (sd * all[k]) ** 2, 4 * startSd ** 2);
    const determined = members.reduce((sum, k) => sum + 1 - covariance.get(k, k), 4);
    return Math.sqrt(squares / determined);
  };
  let first = 0;
  const stages = design.stages.map(({ name, groupOf, size }, s): StageScales => {
    const base = first;
    first += size;
    const { groups, startResidualSd } = STAGE_PRIOR[name];
    const members = (g: number) => groupOf.flatMap((of, j) => (of === g ? [base + j] : []));
    const block = problem.blocks[s];
    const { flipped } = scales[name];
    let wrong = WRONG_VERDICTS.startShare * WRONG_VERDICTS.pseudoTiles;
    for (let i = 0; i < block.count; i++) {
      const yes = sigmoid(rowLogOdds(block, base, unknowns, i));
      // Bayes: a yes was either a true no turned round, or a true yes.
      const [turned, kept] = block.outcome[i] === 1 ? [1 - yes, yes] : [yes, 1 - yes];
      wrong += (flipped * turned) / (flipped * turned + (1 - flipped) * kept);
    }
    return {
      groups: groups.map(({ startSd }, g) => sdOf(startSd, scales[name].groups[g], members(g))),
      residual: sdOf(startResidualSd, scales[name].residual, members(groups.length)),
      flipped: wrong / (WRONG_VERDICTS.pseudoTiles + block.count),
    };
  });
  const ofLoads = (k: 0 | 1) =>
    Array.from({ length: design.loadCount }, (_, l) => weightCount(problem) + 2 * l + k);
  return {
    melt: stages[0],
    gloss: stages[1],
    loads: {
      offsetCones: sdOf(LOAD_PRIOR.startOffsetCones, scales.loads.offsetCones, ofLoads(0)),
      gloss: sdOf(LOAD_PRIOR.startGlossSd, scales.loads.gloss, ofLoads(1)),
    },
  };
}

const fitOf = (tiles: number, seed: number) =>
  fitStages(
    inventedTiles({ tiles, seed, loadErrors: [0, 0.3, -0.3, 0, 0.2, -0.4] }).filter(isJudged),
  );

describe.each([
  [120, 1],
  [400, 5],
])('the scales re-estimated from %d tiles', (tiles, seed) => {
  const whole = fitOf(tiles, seed);

  const exact = evidenceFit(whole.design, { scales: START, tolerance: 1e-7 });

  it('stand at their fixed point, as far as the code goes on', () => {
    expect(exact.rounds).toBeLessThan(200);
    expect(greatestMove(exact.scales, nextScales(whole.design, exact))).toBeLessThan(1e-5);
    expect(whole.fit.rounds).toBeLessThan(60);
    expect(greatestMove(whole.fit.scales, nextScales(whole.design, whole.fit))).toBeLessThan(
      CONVERGED,
    );
    expect(greatestMove(whole.fit.scales, exact.scales)).toBeLessThan(3 * CONVERGED);
  });

  it('do not depend on where they begin', () => {
    const { melt, gloss, loads } = exact.scales;
    const far = ({ groups, residual, flipped }: StageScales) => ({
      groups: groups.map((sd, g) => (g % 2 ? sd * 3 : sd / 3)),
      residual: 2 * residual,
      flipped: 4 * flipped,
    });
    const scales = {
      melt: far(melt),
      gloss: far(gloss),
      loads: { offsetCones: 4 * loads.offsetCones, gloss: loads.gloss / 4 },
    };
    const again = evidenceFit(whole.design, { scales, tolerance: 1e-7 });
    expect(greatestMove(exact.scales, again.scales)).toBeLessThan(1e-4);
    const answers = [exact, again, whole.fit].map((fit) => logOddsOf({ ...whole, fit }));
    answers[0].forEach(({ mean, sd }, i) => {
      expect(mean).toBeCloseTo(answers[1][i].mean, 4);
      expect(sd).toBeCloseTo(answers[1][i].sd, 4);
      // What stopping early costs: no probability by more than a quarter of a percent.
      expect(Math.abs(mean - answers[2][i].mean)).toBeLessThan(CONVERGED);
      expect(Math.abs(sd - answers[2][i].sd)).toBeLessThan(CONVERGED);
    });
  });

  it('each move, never below what four observations of the start leave', () => {
    for (const name of NAMES) {
      const { groups } = whole.fit.scales[name];
      groups.forEach((sd, g) => {
        const { startSd, means } = STAGE_PRIOR[name].groups[g];
        // No departures at all, every weight determined: 4 start^2 / (4 + columns).
        const least = startSd * Math.sqrt(4 / (4 + Object.keys(means).length));
        expect(sd).toBeGreaterThan(least * 0.999);
        expect(sd).not.toBe(startSd);
      });
    }
    const { offsetCones, gloss } = whole.fit.scales.loads;
    expect(offsetCones).toBeGreaterThan(LOAD_PRIOR.startOffsetCones * Math.sqrt(4 / 10) * 0.999);
    expect(gloss).toBeGreaterThan(LOAD_PRIOR.startGlossSd * Math.sqrt(4 / 10) * 0.999);
  });
});

describe('without tiles', () => {
  const { fit, design } = fitStages([]);

  it('the scales are the starting ones to the last bit, and the posterior is the prior', () => {
    expect(fit.scales).toEqual(START);
    expect(fit.rounds).toBe(1);
    expect(fit.weights.map((own) => [...own])).toEqual(
      design.stages.map(({ priorMean }) => priorMean),
    );
    expect(fit.logEvidence).toBeCloseTo(0, 12);
    NAMES.forEach((name, s) => {
      const sds = STAGE_PRIOR[name].groups.flatMap(({ means, startSd }) =>
        Object.keys(means).map(() => startSd),
      );
      const variance = sds.map((sd) => sd ** 2);
      let at = 0;
      variance.forEach((exact, i) => {
        for (let j = 0; j <= i; j++, at++) {
          expect(Math.abs(fit.covariances[s][at] - (i === j ? exact : 0))).toBeLessThan(1e-15);
        }
      });
      expect(fit.covariances[s]).toHaveLength(at);
    });
  });

  it('of loads there is nothing to tell', () => {
    expect([fit.loads.length, fit.loadVariance.length]).toEqual([0, 0]);
  });
});

describe('scales that are held', () => {
  const tiles = inventedTiles({ tiles: 90, seed: 8 }).filter(isJudged);
  const held: Scales = {
    melt: { ...START.melt, groups: START.melt.groups.map((sd) => 0.7 * sd), flipped: 0.03 },
    gloss: { ...START.gloss, residual: 0.3 },
    loads: { offsetCones: 0.11, gloss: 0.07 },
  };
  const { fit, design } = fitStages(tiles, { heldScales: held });

  it('stay to the last bit, and the posterior is the averaged one at them', () => {
    expect(fit.scales).toBe(held);
    const { problem, unknowns } = modeAt(design, fit);
    // Averaged over the spread at the mode: where the expected gradient is 0.
    const atMode = inverse(densePrecision(denseRows(problem, unknowns), exactly));
    const rows = denseRows(problem, unknowns);
    let row = 0;
    const sds = problem.blocks.map(({ count }) =>
      Float64Array.from({ length: count }, () => {
        const { effects } = rows[row++];
        let variance = 0;
        effects.forEach((x, i) => {
          if (x !== 0) effects.forEach((y, j) => (variance += x * y * atMode.get(i, j)));
        });
        return Math.sqrt(variance);
      }),
    );
    const averaged = maximum(problem, { ...unknowns, sds }, 1e-20).unknowns;
    weightsAt(design, held, averaged.theta).forEach((exact, s) => {
      exact.forEach((weight, j) => {
        expect(Math.abs(weight - fit.weights[s][j])).toBeLessThan(1e-3);
      });
    });
    const covariance = inverse(densePrecision(denseRows(problem, averaged)));
    design.stages.forEach((stage, s) => {
      const first = s === 0 ? 0 : design.stages[0].size;
      stage.groupOf.forEach((g, j) => {
        const own = held[stage.name];
        const sd = own.groups[g] ?? own.residual;
        const exact = sd ** 2 * covariance.get(first + j, first + j);
        const found = fit.covariances[s][(j * (j + 1)) / 2 + j];
        expect(Math.abs(found / exact - 1)).toBeLessThan(1e-3);
      });
    });
  });
});
