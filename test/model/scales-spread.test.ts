import { inverse, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { withScalesSpread } from '../../src/model/covariance.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { fitStages, fittedStages, isJudged, type StagesFit } from '../../src/model/stages.ts';
import { sdsOf } from '../../src/model/units.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { symmetricMatrix } from '../support/dense.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const NAMES = ['melt', 'gloss'] as const;
const points = Array.from({ length: 20 }, (_, i) => drawnUnity(seededGenerator(100 + i)));

function logOddsOf(fit: StagesFit) {
  const stages = fittedStages(fit, new Set());
  return NAMES.flatMap((name) =>
    points.flatMap((unity) => [5, 6, 7].map((cone) => stageLogOdds(stages[name], unity, cone))),
  );
}

describe('the spread of the scales themselves', () => {
  const tiles = inventedTiles({ tiles: 200, seed: 9 }).filter(isJudged);
  const free = fitStages(tiles);
  const { scales } = free.fit;
  const held = fitStages(tiles, { heldScales: scales });

  it('widens every answer of the same scales held, and none by more than a half', () => {
    const [wide, narrow] = [logOddsOf(free), logOddsOf(held)];
    let widened = 0;
    wide.forEach(({ sd }, i) => {
      expect(sd / narrow[i].sd).toBeGreaterThan(0.999);
      expect(sd / narrow[i].sd).toBeLessThan(1.5);
      widened += Number(sd > 1.001 * narrow[i].sd);
    });
    expect(widened).toBeGreaterThan(0.5 * wide.length);
  });

  it.each(NAMES)('is what the weights move by when each sd of %s is moved', (name) => {
    const s = NAMES.indexOf(name);
    const { groupOf } = free.design.stages[s];
    const own = scales[name];
    const variance = (fit: StagesFit, j: number) => fit.fit.covariances[s][(j * (j + 1)) / 2 + j];
    const exact = groupOf.map(() => 0);
    const step = 0.05;
    for (let g = 0; g <= own.groups.length; g++) {
      const members = groupOf.flatMap((of, j) => (of === g ? [j] : []));
      const sd = own.groups[g] ?? own.residual;
      const determined = members.reduce((sum, j) => sum + 1 - variance(held, j) / sd ** 2, 4);
      const movedTo = (by: number) => {
        const to = sd * Math.exp(by);
        const groups = own.groups.map((old, k) => (k === g ? to : old));
        const residual = g === own.groups.length ? to : own.residual;
        const heldScales = { ...scales, [name]: { ...own, groups, residual } };
        return fitStages(tiles, { heldScales }).fit.weights[s];
      };
      const [before, after] = [movedTo(-step), movedTo(step)];
      exact.forEach((_, j) => {
        exact[j] += ((after[j] - before[j]) / (2 * step)) ** 2 / (2 * determined);
      });
    }
    const sum = (values: readonly number[]) => values.reduce((a, b) => a + b, 0);
    const found = sum(exact.map((_, j) => variance(free, j) - variance(held, j)));
    // First order, and the averaged likelihood moves with the sds too.
    expect(Math.abs(found / sum(exact) - 1)).toBeLessThan(0.2);
  });

  it('is exact where the tiles are Gaussian: moves against differences of the solved weights', () => {
    const { design } = free;
    const sds = design.stages.flatMap((stage) => sdsOf(stage, scales));
    const means = design.stages.flatMap(({ priorMean }) => priorMean);
    const size = sds.length;
    const { normal } = seededGenerator(3);
    const noise = new Matrix(Array.from({ length: 60 }, () => sds.map(() => 0.3 * normal())));
    const information = noise.transpose().mmul(noise);
    const pull = Matrix.columnVector(sds.map(() => 4 * normal()));
    /** Mean and covariance of the weights under a Gaussian likelihood. */
    const solved = (at: readonly number[]) => {
      const prior = Matrix.diag(at.map((sd) => sd ** -2));
      const covariance = inverse(information.clone().add(prior));
      const mean = covariance.mmul(prior.mmul(Matrix.columnVector(means)).add(pull));
      return { covariance, mean: mean.to1DArray() };
    };
    const { covariance, mean } = solved(sds);
    const unit = Array.from({ length: (size * (size + 1)) / 2 }, () => 0);
    const cellOf = (i: number, j: number) => covariance.get(i, j) / (sds[i] * sds[j]);
    for (let i = 0, at = 0; i < size; i++) for (let j = 0; j <= i; j++) unit[at++] = cellOf(i, j);
    const theta = Float64Array.from(mean, (w, j) => (w - means[j]) / sds[j]);
    const widened = withScalesSpread(design, scales, theta, Float64Array.from(unit));
    const exact = symmetricMatrix(unit, size);
    const step = 1e-4;
    let first = 0;
    for (const { groupOf, size: own } of design.stages) {
      const base = first;
      first += own;
      for (const g of new Set(groupOf)) {
        const isMember = (j: number) => j >= base && j < base + own && groupOf[j - base] === g;
        const at = (by: number) =>
          solved(sds.map((sd, j) => (isMember(j) ? sd * Math.exp(by) : sd))).mean;
        const [before, after] = [at(-step), at(step)];
        const moves = Matrix.columnVector(
          sds.map((sd, j) => (after[j] - before[j]) / (2 * step * sd)),
        );
        const determined = sds.reduce((sum, _, j) => sum + (isMember(j) ? 1 - cellOf(j, j) : 0), 4);
        exact.add(moves.mmul(moves.transpose()).div(2 * determined));
      }
    }
    expect(symmetricMatrix(widened, size).sub(exact).abs().max()).toBeLessThan(1e-6);
    expect(exact.sub(symmetricMatrix(unit, size)).abs().max()).toBeGreaterThan(0.05);
  });
});
