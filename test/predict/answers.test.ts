import { describe, expect, it } from 'vitest';
import { OXIDES } from '../../src/chemistry/oxides.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { surfaceProbability } from '../../src/model/log-odds.ts';
import { SURFACES, type Surface } from '../../src/model/model.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import type { Point, Turn } from '../../src/predict/answers.ts';
import { boundaries } from '../../src/predict/boundaries.ts';
import { experienceOf, placeInSteps, surroundings } from '../../src/predict/experience.ts';
import { predict, surfaceIntervals } from '../../src/predict/predict.ts';
import { shift } from '../../src/predict/shift.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { denseDraws } from '../support/dense-draws.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const tiles = inventedTiles({ tiles: 140, seed: 41 });
const model = fitUnvalidated(anArchive(tiles));
const source = seededGenerator(42);
const points: Point[] = Array.from({ length: 8 }, (_, i) => ({
  point: `P${i}`,
  unity: drawnUnity(source),
}));
const GLOSSY = { SiO2: 3.6, Al2O3: 0.42, B2O3: 0.1, Na2O: 0.15, K2O: 0.15, MgO: 0.04, CaO: 0.66 };

describe('probability and interval', () => {
  const logOdds = [-6, -2, 0, 1, 5].flatMap((mean) => [0.1, 1, 2].map((sd) => ({ mean, sd })));

  it('agree up to an sd of 2 in both stages: the mean lies between the quantiles', () => {
    for (const melt of logOdds) {
      for (const gloss of logOdds) {
        const probability = surfaceProbability(melt, gloss);
        const interval = surfaceIntervals(melt, gloss);
        expect(SURFACES.reduce((sum, s) => sum + probability[s], 0)).toBeCloseTo(1, 10);
        for (const s of SURFACES) {
          expect(probability[s]).toBeGreaterThan(interval[s][0]);
          expect(probability[s]).toBeLessThan(interval[s][1]);
        }
      }
    }
  });

  // Small probabilities are about log-normal: their mean exceeds the 95 % quantile once the sd of the
  // logarithm is above 2 * 1.645 = 3.29. Both are right: a few draws then carry the whole mean.
  it('may part where the posterior is so lop-sided that its mean is above its 95 % quantile', () => {
    const melt = { mean: -20, sd: 5 };
    const { gloss } = surfaceProbability(melt, { mean: 8, sd: 0.1 });
    const [, high] = surfaceIntervals(melt, { mean: 8, sd: 0.1 }).gloss;
    expect(gloss).toBeGreaterThan(high);
    const { normal } = seededGenerator(7);
    const draws = Float64Array.from({ length: 200_000 }, () => sigmoid(-20 + 5 * normal())).sort();
    const mean = draws.reduce((sum, p) => sum + p, 0) / draws.length;
    expect(draws[190_000] / high).toBeCloseTo(1, 1);
    expect(Math.abs(mean / gloss - 1)).toBeLessThan(0.2);
  });
});

describe('answers', () => {
  it('are the same in any order of points and cones, and for points asked twice', () => {
    const forward = predict(model, points, [5, 6, 7]).predictions;
    const backward = predict(model, [...points, ...points].reverse(), [7, 5, 6]).predictions;
    for (const answer of forward) {
      const same = backward.filter(
        ({ point, cone }) => point === answer.point && cone === answer.cone,
      );
      expect(same).toEqual([answer, answer]);
    }
  });

  it('are the same for any order of the rows of the archive', () => {
    const turned = fitUnvalidated(anArchive([...tiles].reverse()));
    const [through] = points;
    expect(predict(turned, points, [6])).toEqual(predict(model, points, [6]));
    expect(shift(turned, [through], [6])).toEqual(shift(model, [through], [6]));
    expect(boundaries(turned, [6], { through })).toEqual(boundaries(model, [6], { through }));
  });

  it('of a boundary at one cone do not depend on the other cones', () => {
    const [through] = points;
    const both = boundaries(model, [5, 7], { through }).boundaries;
    const one = boundaries(model, [7], { through }).boundaries;
    expect(both.filter(({ cone }) => cone === '7')).toEqual(one);
  });

  it('count overfired tiles neither as near nor as heat that was tried', () => {
    const over = Array.from({ length: 4 }, (_, i) =>
      aTile({ tile: `O${i}`, unity: GLOSSY, verdict: 'overfired', heat: aHeat('9') }),
    );
    const withOver = fitUnvalidated(anArchive([...tiles, ...over]));
    const [answer] = predict(withOver, [{ point: 'P', unity: GLOSSY }], [9]).predictions;
    expect(answer.nearest.map(({ tile }) => tile).join()).not.toContain('O');
    expect(answer.notes.join('\n')).toMatch(/hotter than the hottest judged .*\(cone 7\)/);
    expect(answer.support).not.toBe('inside');
  });

  it('without any tile say so, and are as wide as the prior', () => {
    const none = fitUnvalidated(anArchive());
    const [wide] = predict(none, [{ point: 'P', unity: GLOSSY }], [6]).predictions;
    const [known] = predict(model, [{ point: 'P', unity: GLOSSY }], [6]).predictions;
    const width = ([low, high]: readonly [number, number]) => high - low;
    expect(wide.notes).toContain('no judged tile at all: this is what is usual elsewhere');
    expect([wide.support, wide.nearest]).toEqual(['outside', []]);
    expect(width(wide.interval90.gloss)).toBeGreaterThan(1.5 * width(known.interval90.gloss));
  });
});

it.each(OXIDES)('support falls to outside with far more %s than any tile holds', (oxide) => {
  const alike = ['a', 'b', 'c'].map((tile) => aTile({ tile, unity: GLOSSY }));
  const experience = experienceOf(alike);
  const asked: Unity = { ...GLOSSY, [oxide]: ((GLOSSY as Unity)[oxide] ?? 0) + 2 };
  const supportAt = (unity: Unity) =>
    surroundings(experience, placeInSteps(experience, unity), 6).support;
  expect(supportAt(GLOSSY)).toBe('inside');
  expect(supportAt(asked)).toBe('outside');
});

function surfaceOf(melt: number, gloss: number): Surface {
  const [m, g] = [sigmoid(melt), sigmoid(gloss)];
  const p = { underfired: 1 - m, matte: m * (1 - g), gloss: m * g };
  return SURFACES.reduce<Surface>((a, b) => (p[b] > p[a] ? b : a), 'underfired');
}

describe('a turn, against draws of another library', () => {
  const surer = fitUnvalidated(anArchive(inventedTiles({ tiles: 400, seed: 45 })));
  const cones = Array.from({ length: 161 }, (_, i) => 4 + i / 40);
  const [{ turns }] = shift(surer, [{ point: 'P', unity: GLOSSY }], [5, 6, 7]).points;
  const [turn] = turns;
  const path = cones.map((coneIndex) => ({ unity: GLOSSY, coneIndex }));
  const melt = denseDraws(surer.melt, path, 3000, 77);
  const gloss = denseDraws(surer.gloss, path, 3000, 78);

  const placeOf = ({ from, to, coneIndex }: Turn, draw: number): number | undefined => {
    const path = cones.map((_, i) => surfaceOf(melt[draw][i], gloss[draw][i]));
    const places = cones.flatMap((cone, i) =>
      i > 0 && path[i - 1] === from && path[i] === to ? [cone - 1 / 80] : [],
    );
    if (places.length === 0) return undefined;
    return places.reduce((a, b) => (Math.abs(b - coneIndex) < Math.abs(a - coneIndex) ? b : a));
  };

  it('has their share without it, and their quantiles', () => {
    const places = melt.flatMap((_, draw) => placeOf(turn, draw) ?? []).sort((a, b) => a - b);
    expect([turns.length, turn.from, turn.to]).toEqual([1, 'underfired', 'gloss']);
    // Two sets of 2,000 and 3,000 draws: four standard errors of a share of 0.1 are 0.035.
    expect(Math.abs(1 - places.length / 3000 - turn.noCrossing)).toBeLessThan(0.035);
    const [low, high] = turn.interval90 as [number, number];
    const share = (from: number, to: number) =>
      places.filter((place) => place >= from && place <= to).length / places.length;
    expect(share(-Infinity, low)).toBeGreaterThan(0.02);
    expect(share(-Infinity, low)).toBeLessThan(0.08);
    expect(share(high, Infinity)).toBeGreaterThan(0.02);
    expect(share(high, Infinity)).toBeLessThan(0.08);
  });
});

describe('turns of a glaze that is underfired, then matte, then gloss', () => {
  const stepwise = fitUnvalidated(
    anArchive(
      inventedTiles({
        tiles: 900,
        seed: 43,
        cones: ['4', '5', '6', '7', '8', '5', '6', '7'],
        loadErrors: [0, 0, 0, 0, 0, 0, 0, 0],
        truth: { melt: (_, cone) => 4 * (cone - 5.2), gloss: (_, cone) => 4 * (cone - 6.6) },
      }),
    ),
  );
  const unity = { ...GLOSSY, SiO2: 3.2, B2O3: 0.18 };
  const turnsOver = (cones: number[]) => shift(stepwise, [{ point: 'P', unity }], cones).points[0];

  it('are two, from cool to hot, each beginning where the one before ended', () => {
    const { turns, words } = turnsOver([5, 6, 7]);
    expect(turns.map(({ from, to }) => `${from} ${to}`)).toEqual([
      'underfired matte',
      'matte gloss',
    ]);
    expect(Math.abs(turns[0].coneIndex - 5.2)).toBeLessThan(0.4);
    expect(Math.abs(turns[1].coneIndex - 6.6)).toBeLessThan(0.4);
    for (const { coneIndex, interval90, noCrossing } of turns) {
      expect(interval90[0]!).toBeLessThan(coneIndex);
      expect(interval90[1]!).toBeGreaterThan(coneIndex);
      expect(noCrossing).toBeLessThan(0.05);
    }
    expect(words).toMatch(/at 6 .*matte.*at 7 .*gloss/);
  });

  it('outside the range looked at are not listed', () => {
    expect(turnsOver([8]).turns).toEqual([]);
    expect(turnsOver([4]).turns).toHaveLength(0);
    expect(turnsOver([5]).turns.map(({ to }) => to)).toEqual(['matte']);
    expect(turnsOver([5]).lookedAt).toEqual([4, 6]);
  });
});

it('a turn has no end where its posterior leaves the range', () => {
  const few = fitUnvalidated(anArchive(inventedTiles({ tiles: 20, seed: 44 })));
  const [{ turns, lookedAt }] = shift(few, [{ point: 'P', unity: GLOSSY }], [6]).points;
  expect(turns).toHaveLength(1);
  const [{ interval90, noCrossing, coneIndex }] = turns;
  expect(interval90).toContain(null);
  expect(noCrossing).toBeGreaterThan(0.1);
  expect(coneIndex).toBeGreaterThan(lookedAt[0]);
  expect(coneIndex).toBeLessThan(lookedAt[1]);
});
