import { describe, expect, it } from 'vitest';
import type { Oxide } from '../../src/chemistry/oxides.ts';
import { fitUnvalidated } from '../../src/model/fit.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { SURFACES } from '../../src/model/model.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { quantile } from '../../src/numeric/summary.ts';
import type { Point } from '../../src/predict/answers.ts';
import { experienceOf, placeInSteps, surroundings } from '../../src/predict/experience.ts';
import { glazePoint, recipePoint } from '../../src/predict/point.ts';
import { predict } from '../../src/predict/predict.ts';
import { aHeat, anArchive, aTile } from '../support/builders.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const model = fitUnvalidated(anArchive(inventedTiles({ tiles: 150, seed: 21 })));
const source = seededGenerator(5);
const points: Point[] = Array.from({ length: 12 }, (_, i) => ({
  point: `P${i}`,
  unity: drawnUnity(source),
}));

describe('predict', () => {
  const { predictions } = predict(model, points, [5, 6, 7]);

  it('answers in the order of the points, then of the cones', () => {
    expect(predictions.map(({ point, cone }) => `${point} ${cone}`).slice(0, 4)).toEqual([
      'P0 5',
      'P0 6',
      'P0 7',
      'P1 5',
    ]);
  });

  it('gives probabilities that sum to 1, each within its interval', () => {
    for (const { probability, interval90, surface } of predictions) {
      expect(SURFACES.reduce((sum, s) => sum + probability[s], 0)).toBeCloseTo(1, 12);
      for (const s of SURFACES) {
        const [low, high] = interval90[s];
        expect(probability[s]).toBeGreaterThan(low);
        expect(probability[s]).toBeLessThan(high);
        expect(probability[surface]).toBeGreaterThanOrEqual(probability[s]);
      }
    }
  });

  it('answers each point as if it were alone', () => {
    const alone = predict(model, [points[7]], [6]).predictions;
    expect(alone).toEqual(predictions.filter(({ point, cone }) => point === 'P7' && cone === '6'));
  });

  it('agrees with 200,000 draws of both log-odds', () => {
    const { unity } = points[3];
    const melt = stageLogOdds(model.melt, unity, 6);
    const gloss = stageLogOdds(model.gloss, unity, 6);
    const { normal } = seededGenerator(8);
    const draws = Array.from({ length: 200_000 }, () => {
      const m = sigmoid(melt.mean + melt.sd * normal());
      const g = sigmoid(gloss.mean + gloss.sd * normal());
      return { underfired: 1 - m, matte: m * (1 - g), gloss: m * g };
    });
    const { probability, interval90 } = predict(model, [points[3]], [6]).predictions[0];
    for (const surface of SURFACES) {
      const values = draws.map((draw) => draw[surface]);
      const average = values.reduce((sum, value) => sum + value, 0) / values.length;
      expect(Math.abs(probability[surface] - average)).toBeLessThan(2e-3);
      expect(Math.abs(interval90[surface][0] - quantile(values, 0.05))).toBeLessThan(3e-3);
      expect(Math.abs(interval90[surface][1] - quantile(values, 0.95))).toBeLessThan(3e-3);
    }
  });

  it('is wider at a cone without a tile, and says that it is cooler or hotter than any', () => {
    const width = (cone: number) =>
      points
        .map((point) => predict(model, [point], [cone]).predictions[0].interval90.underfired)
        .reduce((sum, [low, high]) => sum + high - low, 0);
    const without6 = fitUnvalidated(
      anArchive(inventedTiles({ tiles: 150, seed: 21, cones: ['4', '4', '5', '5'] })),
    );
    const widthAt7 = points
      .map((point) => predict(without6, [point], [7]).predictions[0].interval90.underfired)
      .reduce((sum, [low, high]) => sum + high - low, 0);
    expect(widthAt7).toBeGreaterThan(1.3 * width(7));
    const notes = (cone: number) => predict(model, points, [cone]).predictions[0].notes.join('\n');
    expect(notes(8)).toMatch(
      /hotter than the hottest judged .*cone 7.*not modelled; fire on a catcher/,
    );
    expect(notes(4)).toMatch(/cooler than the coolest judged .*cone 5/);
    expect(notes(6)).not.toMatch(/hotter|cooler/);
  });

  it('says of an oxide that no column stands for that the chances leave it out', () => {
    const iron = { point: 'iron', unity: { ...points[0].unity, Fe2O3: 0.06, TiO2: 0.01 } };
    const [with_, without] = [iron, points[0]].map(
      (one) => predict(model, [one], [6]).predictions[0],
    );
    expect(with_.notes).toContain('holds Fe2O3: what it does is not in these chances');
    expect(with_.probability).toEqual(without.probability);
    expect(without.notes.join()).not.toContain('not in these chances');
  });

  it('names the metals of a glaze that holds them', () => {
    const point = { point: 'blue', unity: { ...points[0].unity, CoO: 0.01 } };
    expect(predict(model, [point], [6]).predictions[0].notes.join('\n')).toContain('cobalt');
  });
});

describe('support', () => {
  const unity = { SiO2: 3.2, Al2O3: 0.42, B2O3: 0.15, K2O: 0.1, Na2O: 0.15, CaO: 0.75 };
  const at = (silica: number, cone = '6', name = `${silica}`) =>
    aTile({ tile: name, unity: { ...unity, SiO2: silica }, heat: aHeat(cone) });
  const look = (tiles: Parameters<typeof experienceOf>[0], asked: typeof unity, cone = 6) => {
    const experience = experienceOf(tiles);
    return surroundings(experience, placeInSteps(experience, asked), cone);
  };

  it('is inside with three tiles within 1.5 steps, at the edge within 3, else outside', () => {
    const three = [at(3.2), at(3.5), at(3.9)];
    expect(look(three, unity).support).toBe('inside');
    expect(look(three.slice(1), unity).support).toBe('outside');
    expect(look([at(3.2), at(3.5), at(4)], unity).support).toBe('edge');
    expect(look([at(3.2), at(3.5), at(4.8)], unity).support).toBe('outside');
  });

  it('takes half a cone as a step', () => {
    const three = [at(3.2, '6', 'a'), at(3.2, '6', 'b'), at(3.2, '6', 'c')];
    expect(look(three, unity, 6.7).support).toBe('inside');
    expect(look(three, unity, 7).support).toBe('edge');
    expect(look(three, unity, 7.6).support).toBe('outside');
    expect(look(three, unity, 7).nearest[0].distance).toBe(2);
  });

  it.each<[Oxide, number]>([
    ['BaO', 0.3],
    ['SrO', 0.3],
    ['TiO2', 0.15],
    ['P2O5', 0.12],
    ['Fe2O3', 0.15],
    ['ZrO2', 0.15],
    ['CoO', 0.08],
  ])('counts %s, which the model does not use', (oxide, amount) => {
    const three = [at(3.2, '6', 'a'), at(3.2, '6', 'b'), at(3.2, '6', 'c')];
    expect(look(three, { ...unity, [oxide]: amount }).support).toBe('outside');
  });

  it('names the nearest tiles, nearest first, five at most', () => {
    const tiles = [4, 3.3, 3.9, 3.2, 3.6, 3.4, 3.5].map((silica) => at(silica));
    const { nearest } = look(tiles, unity);
    expect(nearest.map(({ tile }) => tile)).toEqual(['3.2', '3.3', '3.4', '3.5', '3.6']);
    expect(nearest[1]).toEqual({ tile: '3.3', surface: 'gloss', cone: '6', distance: 0.2 });
  });
});

describe('points', () => {
  it('reads a composition at any scale', () => {
    const { unity } = glazePoint('SiO2=6.8, Al2O3=.84 K2O=0.5;CaO=1.5');
    expect(unity).toEqual({ SiO2: 3.4, Al2O3: 0.42, K2O: 0.25, CaO: 0.75 });
  });

  it('reports everything that is wrong at once', () => {
    const read = () => glazePoint('SiO2=3.4 AI2O3=0.4 K2O=x CaO CaO=1 CaO=2');
    expect(read).toThrow('expected an oxide, got "AI2O3"; nearest known: "Al2O3"');
    expect(read).toThrow('expected moles of K2O: a number such as 0.42, got "x"');
    expect(read).toThrow('expected OXIDE=MOLES, got "CaO"');
    expect(read).toThrow('expected CaO once, got it again ("CaO=2")');
  });

  it.each([
    ['Al2O3=0.4 CaO=1', 'expected SiO2=..., found none'],
    ['SiO2=3 CaO=1', 'expected Al2O3=..., found none'],
    ['SiO2=3 Al2O3=0.4', 'expected a flux, found none'],
    ['SiO2=3 Al2O3=-0.4 CaO=1', 'expected moles of Al2O3'],
    ['SiO2=1e999 Al2O3=0.4 CaO=1', 'expected moles of SiO2'],
    ['', 'expected SiO2=..., found none'],
  ])('refuses %j', (text, message) => {
    expect(() => glazePoint(text)).toThrow(message);
  });

  it('finds a recipe, or names the nearest', () => {
    const recipe = { recipe: 'Wren white', lines: [], unity: { SiO2: 3, Al2O3: 0.4, CaO: 1 } };
    const archive = anArchive([], { recipes: [recipe] });
    expect(recipePoint(archive, 'Wren white').unity.SiO2).toBe(3);
    expect(() => recipePoint(archive, 'Wern white')).toThrow('nearest known: "Wren white"');
  });
});
