import { describe, expect, it } from 'vitest';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { productQuantile } from '../../src/numeric/logistic-normal.ts';
import { log1pExp } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { glazePoint } from '../../src/predict/point.ts';
import { predict } from '../../src/predict/predict.ts';
import { anArchive } from '../support/builders.ts';
import { inventedTiles } from '../support/invented-tiles.ts';

describe('productQuantile of log-odds that are hardly known, or far from 0', () => {
  it.each([
    [0, 85, 0, 90],
    [-17, 400, -4, 390],
    [-700, 30, -100, 60],
    [-3000, 2, -2000, 3],
    [3000, 2, 2000, 3],
    [1e5, 1e4, -1e5, 1e4],
    [-750, 2, 5, 0.1],
  ])('ends, within [0, 1]: means %d and %d', (a, s, b, t) => {
    const [low, high] = [0.05, 0.95].map((p) =>
      productQuantile({ mean: a, sd: s }, { mean: b, sd: t }, p),
    ) as [number, number];
    expect(low).toBeGreaterThanOrEqual(0);
    expect(high).toBeGreaterThanOrEqual(low);
    expect(high).toBeLessThanOrEqual(1);
  });

  it.each([70, 150, 250])('agrees with draws at sd %d, in the logarithm of the odds', (sd) => {
    const { normal } = seededGenerator(5);
    const draws = Float64Array.from(
      { length: 100_000 },
      () => -log1pExp(-sd * normal()) - log1pExp(-sd * normal()),
    ).sort();
    const q = productQuantile({ mean: 0, sd }, { mean: 0, sd }, 0.4);
    const below = draws.findIndex((logProduct) => logProduct > Math.log(q)) / draws.length;
    expect(Math.abs(below - 0.4)).toBeLessThan(0.01);
  });

  it('keeps 1e-8 at sd 20, where the bound rounds to 1', () => {
    const q = productQuantile({ mean: 0, sd: 20 }, { mean: -2, sd: 20 }, 0.95);
    expect(1 - q).toBeGreaterThan(1e-8);
  });
});

it.each([
  ['a cone of enamels', 'SiO2=3.4 Al2O3=0.46 B2O3=0.15 K2O=0.3 CaO=0.7', -16],
  ['the hottest cone', 'SiO2=3.4 Al2O3=0.46 B2O3=0.15 K2O=0.3 CaO=0.7', 42],
  ['a clay slip', 'SiO2=20 Al2O3=5 K2O=1', 6],
  ['a pinch of flux', 'SiO2=300 Al2O3=90 K2O=1', 6],
])('predict answers and does not hang: %s', (_, glaze, cone) => {
  for (const tiles of [0, 60]) {
    const model = fitUnvalidated(anArchive(inventedTiles({ tiles, seed: 3 })));
    const [answer] = predict(model, [glazePoint(glaze)], [cone]).predictions;
    for (const [low, high] of Object.values(answer.interval90) as [number, number][]) {
      expect(low >= 0 && high <= 1 && low <= high).toBe(true);
    }
  }
});
