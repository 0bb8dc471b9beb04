import { describe, expect, it } from 'vitest';
import type { Unity } from '../../src/chemistry/unity.ts';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { isJudged } from '../../src/model/stages.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { quantile } from '../../src/numeric/summary.ts';
import type { BoundaryAxis } from '../../src/predict/answers.ts';
import { boundaries } from '../../src/predict/boundaries.ts';
import { placeAlong } from '../../src/predict/lines.ts';
import { placePosterior } from '../../src/predict/place.ts';
import { DRAWS, normalTable, pathDraws } from '../../src/predict/path-draws.ts';
import { shift } from '../../src/predict/shift.ts';
import { surfaceInWords } from '../../src/predict/words.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { denseDraws, denseLogOdds, type Asked } from '../support/dense-draws.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

const tiles = inventedTiles({ tiles: 250, seed: 31 });
const model = fitUnvalidated(anArchive(tiles));
const unity = { SiO2: 3.4, Al2O3: 0.46, B2O3: 0.15, Na2O: 0.15, K2O: 0.15, MgO: 0.04, CaO: 0.66 };
const through = { point: 'P', unity };

describe('draws over a path', () => {
  const path: Asked[] = Array.from({ length: 41 }, (_, i) => ({ unity, coneIndex: 4 + i / 10 }));

  it.each(['melt', 'gloss'] as const)(
    'have the mean and covariance of the posterior: %s',
    (name) => {
      const { mean, covariance } = denseLogOdds(model[name], path);
      path.forEach((point, i) => {
        const { mean: own, sd } = stageLogOdds(model[name], point.unity, point.coneIndex);
        expect(own).toBeCloseTo(mean[i], 9);
        expect(sd ** 2).toBeCloseTo(covariance.get(i, i), 9);
      });
      const draws = pathDraws(model[name], path, normalTable(name));
      const values = Array.from({ length: draws.count }, (_, draw) => draws.logOdds(draw));
      for (const i of [0, 13, 20, 40]) {
        const average = values.reduce((sum, v) => sum + v[i], 0) / DRAWS;
        const sd = Math.sqrt(covariance.get(i, i));
        expect(Math.abs(average - mean[i])).toBeLessThan((4 * sd) / Math.sqrt(DRAWS));
        for (const j of [0, 20, 33]) {
          const shared =
            values.reduce((sum, v) => sum + (v[i] - mean[i]) * (v[j] - mean[j]), 0) / DRAWS;
          const scale = Math.sqrt(covariance.get(i, i) * covariance.get(j, j));
          const error = Math.abs(shared - covariance.get(i, j)) / scale;
          expect(error).toBeLessThan(4 * Math.sqrt(2 / DRAWS));
        }
      }
    },
  );
});

describe('turns', () => {
  const answer = shift(model, [through], [7, 5, 6]).points[0];

  it('sorts the cones and looks one cone beyond them', () => {
    expect(answer.cones.map(({ cone }) => cone)).toEqual(['5', '6', '7']);
    expect(answer.lookedAt).toEqual([4, 8]);
  });

  it('stand where two surfaces are equally probable', () => {
    expect(answer.turns.length).toBeGreaterThan(0);
    for (const { from, to, coneIndex } of answer.turns) {
      const there = shift(model, [through], [coneIndex]).points[0].cones[0].probability;
      expect(there[from]).toBeCloseTo(there[to], 4);
    }
  });

  it('have the interval of the draws, by brute force over a fine grid of cones', () => {
    const { from, to, coneIndex, interval90, noCrossing } = answer.turns[0];
    expect([from, to]).toEqual(['underfired', 'gloss']);
    const looked = 2000;
    const found: number[] = [];
    const cones = Array.from({ length: 201 }, (_, i) => 4 + i / 50);
    const path = cones.map((cone) => ({ unity, coneIndex: cone }));
    const melt = denseDraws(model.melt, path, looked, 71);
    const gloss = denseDraws(model.gloss, path, looked, 72);
    for (let draw = 0; draw < looked; draw++) {
      let before: string | undefined;
      const places: number[] = [];
      for (const [i, cone] of cones.entries()) {
        const m = sigmoid(melt[draw][i]);
        const g = sigmoid(gloss[draw][i]);
        const p = { underfired: 1 - m, matte: m * (1 - g), gloss: m * g };
        const now = (['underfired', 'matte', 'gloss'] as const).reduce((a, b) =>
          p[b] > p[a] ? b : a,
        );
        if (before === from && now === to) places.push(cone - 0.01);
        before = now;
      }
      if (places.length > 0) {
        found.push(
          places.reduce((a, b) => (Math.abs(b - coneIndex) < Math.abs(a - coneIndex) ? b : a)),
        );
      }
    }
    expect(Math.abs(1 - found.length / looked - noCrossing)).toBeLessThan(0.06);
    expect(Math.abs(quantile(found, 0.5) - coneIndex)).toBeLessThan(0.1);
    expect(Math.abs(quantile(found, 0.05) - interval90[0]!)).toBeLessThan(0.12);
    expect(Math.abs(quantile(found, 0.95) - interval90[1]!)).toBeLessThan(0.12);
  });

  it('are none for a glaze that stays what it is', () => {
    const hard = { point: 'hard', unity: { ...unity, SiO2: 6, Al2O3: 0.9 } };
    const [dry] = shift(model, [hard], [5, 6, 7]).points;
    expect(dry.turns).toEqual([]);
    expect(dry.words).toBe('at 5, 6 and 7 almost surely underfired (outside the archive)');
  });

  it('do not depend on the other points of the call', () => {
    const other = { point: 'Q', unity: { ...unity, SiO2: 2.4 } };
    expect(shift(model, [other, through], [5, 6, 7]).points[1]).toEqual(answer);
  });

  it('come with the overfired tiles near by', () => {
    const run = aTile({ tile: 'ran', unity, verdict: 'overfired', heat: aHeat('7') });
    const far = aTile({
      tile: 'far',
      unity: { ...unity, SiO2: 9 },
      verdict: 'overfired',
      heat: aHeat('7'),
    });
    const withRun = fitUnvalidated(anArchive([...tiles, run, far]));
    const near = shift(withRun, [through], [5, 6, 7]).points[0].overfiredNear;
    expect(near.map(({ tile, distance }) => [tile, distance])).toEqual([['ran', 0]]);
  });

  it('need a cone', () => {
    expect(() => shift(model, [through], [])).toThrow('expected at least one cone');
  });
});

describe('placePosterior', () => {
  it('counts draws that left the range at that end, and none apart', () => {
    const crossing = Array.from({ length: 90 }, (_, i) => 5 + i / 100);
    const left = Array.from({ length: 10 }, () => 'beyond' as const);
    const { interval90, noCrossing } = placePosterior([...crossing, ...left]);
    expect(interval90[0]).toBeCloseTo(5.05, 1);
    expect(interval90[1]).toBeNull();
    expect(noCrossing).toBeCloseTo(0.1, 12);
    expect(placePosterior(['none', 'none'])).toEqual({ interval90: [null, null], noCrossing: 1 });
    expect(placePosterior([1, 1, 'none', 'none']).interval90).toEqual([1, 1]);
  });
});

describe('boundaries', () => {
  const answer = boundaries(model, [5, 6, 7], { through });
  const held = (along: BoundaryAxis, value: number): Unity => {
    if (along !== 'SiO2:Al2O3') return { ...unity, [along]: value };
    const sum = unity.SiO2 + unity.Al2O3;
    return { ...unity, SiO2: (sum * value) / (1 + value), Al2O3: sum / (1 + value) };
  };

  it('have a row for each cone, line and kind', () => {
    const keys = answer.boundaries.map(({ cone, along, kind }) => `${cone} ${along} ${kind}`);
    expect(new Set(keys).size).toBe(18);
    expect(answer.throughSource).toBe('asked: P');
  });

  it('stand where the mean log-odds are 0, gloss only where melted', () => {
    const found = answer.boundaries.filter(({ value }) => value !== null);
    expect(found.length).toBeGreaterThan(12);
    for (const { kind, along, value, coneIndex, lookedAt } of found) {
      const there = held(along, value!);
      expect(Math.abs(stageLogOdds(model[kind], there, coneIndex).mean)).toBeLessThan(1e-6);
      if (kind === 'gloss') {
        expect(stageLogOdds(model.melt, there, coneIndex).mean).toBeGreaterThanOrEqual(0);
      }
      expect(placeAlong(there, along)).toBeCloseTo(value!, 9);
      expect(value).toBeGreaterThanOrEqual(lookedAt[0]);
      expect(value).toBeLessThanOrEqual(lookedAt[1]);
    }
  });

  it('move as the places half a cone cooler and hotter do', () => {
    const row = answer.boundaries.find(
      ({ cone, kind, along }) => cone === '6' && kind === 'melt' && along === 'Al2O3',
    )!;
    const at = (cone: number) =>
      boundaries(model, [cone], { through }).boundaries.find(
        ({ kind, along }) => kind === 'melt' && along === 'Al2O3',
      )!.value!;
    expect(row.perCone).toBeCloseTo(at(6.5) - at(5.5), 6);
    expect(row.perCone).toBeGreaterThan(0);
    expect(row.perConeInterval90[0]).toBeLessThan(row.perCone!);
    expect(row.perConeInterval90[1]).toBeGreaterThan(row.perCone!);
    expect([row.below, row.above]).toEqual(['melted', 'underfired']);
  });

  it('have an interval that holds about 90 % of the draws, by brute force', () => {
    const row = answer.boundaries.find(
      ({ cone, kind, along }) => cone === '6' && kind === 'melt' && along === 'Al2O3',
    )!;
    const looked = 2000;
    const [low, high] = row.interval90 as [number, number];
    const ends = [low, high].map((place) => ({ unity: held('Al2O3', place), coneIndex: 6 }));
    // Melted below the place, underfired above it: the place is inside if the ends differ.
    const inside = denseDraws(model.melt, ends, looked, 73).filter(
      ([atLow, atHigh]) => atLow > 0 && atHigh <= 0,
    ).length;
    expect(inside / looked).toBeGreaterThan(0.86);
    expect(inside / looked).toBeLessThan(0.94);
  });

  it.each(['melt', 'gloss'] as const)('count the judged tiles near by: %s', (kind) => {
    const row = answer.boundaries.find((one) => one.value !== null && one.kind === kind)!;
    const there = held(row.along, row.value!);
    // Only what these tiles vary in, in the steps that the documents state.
    const step = {
      SiO2: 0.5,
      Al2O3: 0.08,
      B2O3: 0.08,
      Na2O: 0.08,
      K2O: 0.08,
      MgO: 0.08,
      CaO: 0.12,
    };
    const near = tiles.filter(isJudged).filter((tile) => {
      if (kind === 'gloss' && tile.verdict === 'underfired') return false;
      const squares = Object.entries(step).map(([oxide, size]) => {
        const key = oxide as keyof typeof step;
        return (((tile.unity[key] ?? 0) - (there[key] ?? 0)) / size) ** 2;
      });
      return (
        squares.reduce((a, b) => a + b, 0) <= 9 &&
        Math.abs(tile.heat.coneIndex - row.coneIndex) <= 0.5
      );
    });
    expect(row.tilesNear).toBe(near.length);
  });

  it('list both ends of the melted region where the line has two', () => {
    const wide = fitUnvalidated(
      anArchive(
        inventedTiles({
          tiles: 1500,
          seed: 3,
          truth: { melt: ({ SiO2 = 0 }) => 6 - 6 * (SiO2 - 3.2) ** 2, gloss: () => 1 },
        }),
      ),
    );
    const rows = boundaries(wide, [6], { through }).boundaries.filter(
      ({ kind, along }) => kind === 'melt' && along === 'SiO2',
    );
    expect(rows.map(({ below, above }) => `${below} ${above}`)).toEqual([
      'underfired melted',
      'melted underfired',
    ]);
    expect(rows[0].value!).toBeCloseTo(2.2, 0);
    expect(rows[1].value!).toBeCloseTo(4.2, 0);
    for (const { interval90, value } of rows) {
      expect(interval90[0]).toBeLessThan(value!);
      expect(interval90[1]).toBeGreaterThan(value!);
    }
  });

  it('without a tile run through a usual glaze, wide', () => {
    const none = boundaries(fitUnvalidated(anArchive()), [6]);
    expect(none.throughSource).toContain('no judged tile');
    const melt = none.boundaries.find(({ kind, along }) => kind === 'melt' && along === 'Al2O3')!;
    const [low, high] = melt.interval90;
    expect((high ?? melt.lookedAt[1]) - (low ?? melt.lookedAt[0])).toBeGreaterThan(0.3);
  });
});

describe('words', () => {
  it.each([
    [[0.02, 0.05, 0.93], 'almost surely gloss'],
    [[0.1, 0.75, 0.15], 'most likely matte'],
    [[0.44, 0.1, 0.46], 'as likely underfired as gloss'],
    [[0.6, 0.35, 0.05], 'rather underfired than matte, but far from sure'],
  ] as const)('for %j are "%s"', ([underfired, matte, gloss], words) => {
    expect(surfaceInWords({ underfired, matte, gloss })).toBe(words);
  });
});
