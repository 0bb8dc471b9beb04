// What "more heat does not melt less" does to the Gaussian of the weights, against draws from the Gaussian of
// which those that break the rule are thrown away.
import { describe, expect, it } from 'vitest';
import { NO_CENTRES } from '../../src/model/radial.ts';
import { moreSteps, settledSteps, type RisingStep } from '../../src/model/rising.ts';
import { CONE_STEP } from '../../src/model/heat-check.ts';
import { stageRow, type StageWeights } from '../../src/model/log-odds.ts';
import { lowerIndex } from '../../src/numeric/linalg.ts';
import { seededGenerator } from '../../src/numeric/random.ts';

const UNITIES = [2.2, 3.2, 4.6].map((SiO2) => ({ SiO2, Al2O3: 0.42, K2O: 0.3, CaO: 0.7 }));
const COLUMNS = ['1', 'SiO2', 'heat', 'SiO2*heat'];

/** A stage whose slope with heat is `heat` + `silica` times the scaled silica. */
function aStage(heat: number, silica: number, sds: readonly number[]): StageWeights {
  const covarianceLower = new Array<number>(lowerIndex(COLUMNS.length, 0)).fill(0);
  sds.forEach((sd, j) => (covarianceLower[lowerIndex(j, j)] = sd * sd));
  return {
    columns: COLUMNS,
    radial: NO_CENTRES,
    mean: [1, -1, heat, silica],
    covarianceLower,
    residual: { startSd: 1, sd: 1 },
  };
}

const at = (unity: (typeof UNITIES)[number], coneIndex = 6): RisingStep => ({
  unity,
  coneIndex,
  least: 0,
  target: 0,
  precision: 0,
});

const slopesOf = (stage: StageWeights, steps: readonly RisingStep[]) =>
  steps.map(({ unity, coneIndex }) => {
    const [cool, hot] = [coneIndex, coneIndex + CONE_STEP].map(
      (c) => stageRow(stage, unity, c).values,
    );
    return hot.map((value, j) => (value - cool[j]) / CONE_STEP);
  });

/** Mean and sd of the two weights of heat: precision of the Gaussian plus that of the steps. */
function withSteps(stage: StageWeights, sds: readonly number[], steps: readonly RisingStep[]) {
  const rows = slopesOf(stage, steps).map((row) => [row[2], row[3]]);
  const precision = [
    [sds[2] ** -2, 0],
    [0, sds[3] ** -2],
  ];
  const pull = [stage.mean[2] * sds[2] ** -2, stage.mean[3] * sds[3] ** -2];
  steps.forEach((step, k) => {
    for (let i = 0; i < 2; i++) {
      pull[i] += step.precision * step.target * rows[k][i];
      for (let j = 0; j < 2; j++) precision[i][j] += step.precision * rows[k][i] * rows[k][j];
    }
  });
  const det = precision[0][0] * precision[1][1] - precision[0][1] * precision[1][0];
  const covariance = [
    [precision[1][1] / det, -precision[0][1] / det],
    [-precision[1][0] / det, precision[0][0] / det],
  ];
  const mean = covariance.map((row) => row[0] * pull[0] + row[1] * pull[1]);
  return { mean, sds: [Math.sqrt(covariance[0][0]), Math.sqrt(covariance[1][1])] };
}

function byDraws(stage: StageWeights, sds: readonly number[], steps: readonly RisingStep[]) {
  const rows = slopesOf(stage, steps);
  const { normal } = seededGenerator(11);
  const kept: number[][] = [];
  for (let i = 0; i < 200_000; i++) {
    const heat = stage.mean[2] + sds[2] * normal();
    const silica = stage.mean[3] + sds[3] * normal();
    if (rows.every((row, k) => heat * row[2] + silica * row[3] >= steps[k].least)) {
      kept.push([heat, silica]);
    }
  }
  expect(kept.length).toBeGreaterThan(2000);
  const mean = [0, 1].map((k) => kept.reduce((sum, draw) => sum + draw[k], 0) / kept.length);
  const spread = [0, 1].map((k) =>
    Math.sqrt(kept.reduce((sum, draw) => sum + (draw[k] - mean[k]) ** 2, 0) / kept.length),
  );
  return { mean, sds: spread };
}

describe('the knowledge that slopes do not fall', () => {
  const SDS = [1, 1, 0.5, 0.3];
  const cases = [
    { heat: 0.1, silica: 0.2, steps: [at(UNITIES[0])] },
    { heat: -0.3, silica: 0, steps: [at(UNITIES[1])] },
    { heat: 0.1, silica: 0.2, steps: UNITIES.map((unity) => at(unity)) },
    { heat: -0.2, silica: -0.2, steps: [at(UNITIES[0]), { ...at(UNITIES[2]), least: 0.2 }] },
  ];

  it.each(cases)('slope $heat and $silica: mean and spread of the draws that obey it', (one) => {
    const stage = aStage(one.heat, one.silica, SDS);
    const reached = withSteps(stage, SDS, settledSteps(stage, one.steps));
    const wanted = byDraws(stage, SDS, one.steps);
    for (const k of [0, 1]) {
      expect(Math.abs(reached.mean[k] - wanted.mean[k])).toBeLessThan(0.02);
      expect(Math.abs(reached.sds[k] / wanted.sds[k] - 1)).toBeLessThan(0.08);
    }
  });

  it('said twice says no more than once', () => {
    const stage = aStage(-0.2, 0.1, SDS);
    const once = withSteps(stage, SDS, settledSteps(stage, [at(UNITIES[0])]));
    const twice = withSteps(stage, SDS, settledSteps(stage, [at(UNITIES[0]), at(UNITIES[0])]));
    expect(Math.abs(twice.mean[0] - once.mean[0])).toBeLessThan(0.03);
    expect(Math.abs(twice.sds[0] - once.sds[0])).toBeLessThan(0.03);
  });

  it('hardly changes slopes that are far from falling', () => {
    const stage = aStage(3, 0, SDS);
    const { mean, sds } = withSteps(
      stage,
      SDS,
      settledSteps(
        stage,
        UNITIES.map((u) => at(u)),
      ),
    );
    expect([mean[0], mean[1], ...sds]).toEqual(
      [3, 0, 0.5, 0.3].map((x): unknown => expect.closeTo(x, 4)),
    );
  });
});

describe('steps to hold', () => {
  const fall = (k: number, short: number) => ({
    unity: UNITIES[k],
    coneIndex: 6,
    fall: 0.01,
    short,
  });

  it('begin at no fall, and ask for more where the chance falls all the same', () => {
    const once = moreSteps([], [fall(0, 0.3)]);
    expect(once.map(({ least }) => least)).toEqual([0]);
    const again = moreSteps(once, [fall(0, 0.3), fall(1, 0.1)]);
    expect(again.map(({ least }) => least)).toEqual([0.3, 0]);
    expect(moreSteps(again, [fall(0, 0)])[0].least).toBeCloseTo(0.32, 12);
  });
});
