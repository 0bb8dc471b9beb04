import { describe, expect, it } from 'vitest';
import { problemAt } from '../../src/model/design.ts';
import { columnValues, scaledInputs } from '../../src/model/inputs.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import type { LoadEffect } from '../../src/model/model.ts';
import { LOAD_PRIOR, priorColumns } from '../../src/model/priors.ts';
import {
  fitStages,
  fittedStages,
  isJudged,
  STAGE_PRIOR,
  type FitSettings,
  type JudgedTile,
} from '../../src/model/stages.ts';
import { dot } from '../../src/numeric/linalg.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { drawnUnity, inventedTiles, PLAIN_TRUTH } from '../support/invented-tiles.ts';

const NAMES = new Set(Array.from({ length: 40 }, (_, l) => `L${l}`));
const fitOf = (tiles: readonly JudgedTile[], settings: FitSettings = {}) =>
  fittedStages(fitStages(tiles, settings), NAMES);
const loadOf = (loads: readonly LoadEffect[], name: string) =>
  loads.find(({ load }) => load === name)!;
const eightLoads = (l: number, offset: number) =>
  Array.from({ length: 8 }, (_, k) => (k === l ? offset : 0));

describe('the load that fired cool', () => {
  const lowestOf = (tiles: number, seed: number, cool: number) => {
    const loadErrors = eightLoads(cool, -1.2);
    const { loads } = fitOf(inventedTiles({ tiles, seed, loadErrors }).filter(isJudged));
    expect(loads.map(({ tiles: n }) => n)).toEqual(loadErrors.map(() => tiles / 8));
    return [...loads].sort((a, b) => a.offsetCones.mean - b.offsetCones.mean)[0];
  };

  // One of four loads of cone 6.
  it.each([1, 2, 3, 4, 5])('is found, by its offset in cones: studio %d', (seed) => {
    const few = lowestOf(400, seed, 2);
    expect(few.load).toBe('L2');
    expect(few.offsetCones.mean).toBeLessThan(-1.5 * few.offsetCones.sd);
    const { load, offsetCones } = lowestOf(1200, seed, 2);
    expect(load).toBe('L2');
    expect(offsetCones.mean).toBeLessThan(-3 * offsetCones.sd);
  });

  // One of the two loads of cone 7: what a cone does can be taken for it, and it takes more tiles.
  it.each([1, 2, 3])('is found at the end of the cones: studio %d', (seed) => {
    const { load, offsetCones } = lowestOf(1600, seed, 3);
    expect(load).toBe('L3');
    expect(offsetCones.mean).toBeLessThan(-2 * offsetCones.sd);
  });

  // With few tiles its own spread is hardly known, and the interval says so.
  it.each([2, 3, 5])('is found there with few tiles, unsurely: studio %d', (seed) => {
    const { load, offsetCones } = lowestOf(400, seed, 3);
    expect(load).toBe('L3');
    expect(offsetCones.mean).toBeLessThan(-0.3);
    expect(Math.abs(offsetCones.mean + 1.2)).toBeLessThan(3 * offsetCones.sd);
  });

  it.each([1, 2, 3])('with many tiles has its true offset: studio %d', (seed) => {
    const { mean, sd } = lowestOf(2400, seed, 2).offsetCones;
    expect(Math.abs(mean + 1.2)).toBeLessThan(3 * sd);
    expect(sd).toBeLessThan(0.3);
  });

  it('is told from one that fired hot, and from those that did neither', () => {
    const loadErrors = [0, 0.9, 0, 0, 0, 0, -0.9, 0];
    const tiles = inventedTiles({ tiles: 1200, seed: 6, loadErrors }).filter(isJudged);
    const { loads } = fitOf(tiles);
    const truths = new Map(loadErrors.map((error, l) => [`L${l}`, error]));
    for (const { load, offsetCones } of loads) {
      expect(Math.abs(offsetCones.mean - truths.get(load)!)).toBeLessThan(3 * offsetCones.sd);
      expect(Math.abs(offsetCones.mean) > 2 * offsetCones.sd).toBe(truths.get(load) !== 0);
    }
  });

  it('has the sds of its loads grow where loads disagree, and shrink where they agree', () => {
    const spreadOf = (errors: readonly number[]) =>
      fitOf(
        inventedTiles({ tiles: 1200, seed: 7, loadErrors: errors, cones: ['6'] }).filter(isJudged),
      ).loadSpread.offsetScaleCones;
    const agreeing = spreadOf(Array.from({ length: 20 }, () => 0));
    const apart = spreadOf(Array.from({ length: 20 }, (_, l) => (l % 2 ? 0.7 : -0.7)));
    const { startOffsetCones } = LOAD_PRIOR;
    expect(agreeing).toBeLessThan(startOffsetCones);
    expect(apart).toBeGreaterThan(2 * startOffsetCones);
  });
});

describe('an offset', () => {
  const tiles = inventedTiles({ tiles: 120, seed: 3, loadErrors: [0, 0.3, -0.3, 0] }).filter(
    isJudged,
  );

  it('moves the log-odds of a tile in both stages by what a cone does there', () => {
    const { fit, design } = fitStages(tiles);
    const { blocks } = problemAt(design, fit.scales, fit.weights, fit.stretch);
    const h = 1e-4;
    design.stages.forEach((stage, s) => {
      const columns = priorColumns(STAGE_PRIOR[stage.name]);
      const weights = fit.weights[s].subarray(0, columns.length);
      let moving = 0;
      stage.tiles.forEach(({ unity, heat }, i) => {
        const at = (cone: number) => dot(columnValues(scaledInputs(unity, cone), columns), weights);
        const perCone = (at(heat.coneIndex + h) - at(heat.coneIndex - h)) / (2 * h);
        const sd = fit.scales.loads.offsetCones * fit.stretch[stage.load[i]];
        const offset = blocks[s].effects[2 * i] / sd;
        expect(Math.abs(offset - perCone)).toBeLessThan(1e-6);
        const gloss = stage.name === 'gloss' ? fit.scales.loads.gloss : 0;
        expect(blocks[s].effects[2 * i + 1]).toBe(gloss);
        moving += Number(Math.abs(perCone) > 0.05);
      });
      expect(moving).toBeGreaterThan(0.8 * stage.count);
    });
  });

  // Heat is the only thing that tells gloss from matte here, and nothing is underfired; or the reverse.
  const loadErrors = eightLoads(2, 1);
  const cones = ['4', '5', '6', '7'];
  const byGloss = inventedTiles({
    tiles: 960,
    seed: 21,
    loadErrors,
    cones,
    truth: { melt: () => 40, gloss: (_, cone) => 4 * (cone - 6.2) },
  }).filter(isJudged);
  const byMelt = inventedTiles({ tiles: 960, seed: 22, loadErrors, cones })
    .filter(isJudged)
    .map((tile): JudgedTile =>
      tile.verdict === 'underfired' ? tile : { ...tile, verdict: 'melted' },
    );

  it.each([
    ['gloss alone', byGloss],
    ['melting alone', byMelt],
  ])('is found from %s', (_, own) => {
    const { loads } = fitOf(own);
    const { mean, sd } = loadOf(loads, 'L2').offsetCones;
    expect(mean).toBeGreaterThan(2 * sd);
    expect(Math.max(...loads.map(({ offsetCones }) => offsetCones.mean))).toBe(mean);
  });

  it('is known better from both stages than from melting alone', () => {
    const both = inventedTiles({
      tiles: 480,
      seed: 23,
      loadErrors,
      cones,
      truth: { ...PLAIN_TRUTH, gloss: (_, cone) => 4 * (cone - 6.2) },
    }).filter(isJudged);
    const meltOnly = both.map((tile): JudgedTile =>
      tile.verdict === 'underfired' ? tile : { ...tile, verdict: 'melted' },
    );
    const heldScales = fitStages(both).fit.scales;
    const sdOf = (own: readonly JudgedTile[]) =>
      loadOf(fitOf(own, { heldScales }).loads, 'L2').offsetCones.sd;
    expect(sdOf(both)).toBeLessThan(0.9 * sdOf(meltOnly));
  });
});

describe("a load's own intercept of gloss", () => {
  /** One load of eight cooled so slowly that its gloss turned matte; its heat was right. */
  const dulled = (seed: number) => {
    const source = seededGenerator(1000 + seed);
    return inventedTiles({ tiles: 480, seed, loadErrors: eightLoads(0, 0) })
      .filter(isJudged)
      .map((tile): JudgedTile => {
        if (tile.load !== 'L5' || tile.verdict === 'underfired') return tile;
        const logOdds = PLAIN_TRUTH.gloss(tile.unity, tile.heat.coneIndex) - 3;
        return { ...tile, verdict: source.uniform() < sigmoid(logOdds) ? 'gloss' : 'matte' };
      });
  };

  it.each([31, 32, 33])('takes what melting does not show: studio %d', (seed) => {
    const { loads } = fitOf(dulled(seed));
    const [lowest] = [...loads].sort((a, b) => a.glossLogOdds.mean - b.glossLogOdds.mean);
    expect(lowest.load).toBe('L5');
    expect(lowest.glossLogOdds.mean).toBeLessThan(-2 * lowest.glossLogOdds.sd);
    for (const { load, offsetCones, glossLogOdds } of loads) {
      expect(Math.abs(offsetCones.mean)).toBeLessThan(3.5 * offsetCones.sd);
      if (load !== 'L5') expect(Math.abs(glossLogOdds.mean)).toBeLessThan(3.5 * glossLogOdds.sd);
    }
  });
});

describe('loads with offsets', () => {
  const points = Array.from({ length: 40 }, (_, i) => drawnUnity(seededGenerator(500 + i)));
  /** Mean error of the log-odds of glazes near the melt boundary, where a bias shows. */
  const biasOf = ({ melt }: ReturnType<typeof fitOf>) => {
    const errors = [5, 6, 7].flatMap((cone) =>
      points
        .filter((unity) => Math.abs(PLAIN_TRUTH.melt(unity, cone)) < 3)
        .map((unity) => stageLogOdds(melt, unity, cone).mean - PLAIN_TRUTH.melt(unity, cone)),
    );
    return errors.reduce((sum, error) => sum + error, 0) / errors.length;
  };

  it('do not draw the others after them: a full load that fired hot, a small one as cool', () => {
    let [aware, blind] = [0, 0];
    const seeds = [40, 41, 42];
    for (const seed of seeds) {
      const isSmall = ({ load }: JudgedTile) => Number(load.slice(1)) >= 6;
      const loadErrors = Array.from({ length: 12 }, (_, l) => (l >= 6 ? -0.6 : 0.6));
      const tiles = inventedTiles({ tiles: 1200, seed, loadErrors, cones: ['5', '6', '7'] })
        .filter(isJudged)
        .filter((tile, i) => !isSmall(tile) || Math.floor(i / 12) % 4 === 0);
      const { scales } = fitStages(tiles).fit;
      const heldScales = { ...scales, loads: { ...scales.loads, offsetCones: 1e-4 } };
      aware += biasOf(fitOf(tiles)) / seeds.length;
      blind += biasOf(fitOf(tiles, { heldScales })) / seeds.length;
    }
    expect(blind).toBeGreaterThan(0.4);
    expect(Math.abs(aware)).toBeLessThan(0.5 * blind);
  });
});
