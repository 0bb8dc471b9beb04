// More heat never makes a glaze less melted where the studio fired: P(melted) as the posterior mean, along
// the cones that the archive holds and one beyond each end.
import { describe, expect, it } from 'vitest';
import type { Archive } from '../../src/archive/archive.ts';
import { parseArchive } from '../../src/archive/read-archive.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { coneIndex } from '../../src/firing/cone.ts';
import { keptRows } from '../../src/model/design.ts';
import { evidenceFit } from '../../src/model/evidence.ts';
import { fitModel, fitUnvalidated, type UnvalidatedModel } from '../../src/model/fit.ts';
import { stageLogOdds } from '../../src/model/log-odds.ts';
import { fitStages, fittedStages, isJudged } from '../../src/model/stages.ts';
import { averagedProbability } from '../../src/numeric/logistic-normal.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { anArchive } from '../support/builders.ts';
import { demoFiles } from '../support/demo-archive.ts';
import { drawnUnity, inventedTiles, type InventedTruth } from '../support/invented-tiles.ts';

/** Rounding of a probability. */
const ROUNDING = 1e-12;

/** By how much P(melted) falls below what it was at a cooler cone, at worst. */
function greatestFall({ melt }: UnvalidatedModel, unity: Unity, low: number, high: number): number {
  let [highest, fall] = [0, 0];
  for (let step = 0; step <= Math.round((high - low) * 8); step++) {
    const { mean, sd } = stageLogOdds(melt, unity, low + step / 8);
    const melted = averagedProbability(mean, sd);
    highest = Math.max(highest, melted);
    fall = Math.max(fall, highest - melted);
  }
  return fall;
}

function fallingGlazes(archive: Archive): { asked: number; falling: string[] } {
  const model = fitUnvalidated(archive);
  const tiles = archive.tiles.filter(isJudged);
  const cones = tiles.map(({ heat }) => heat.coneIndex);
  const [low, high] = [Math.min(...cones) - 1, Math.max(...cones) + 1];
  const falling = tiles.flatMap(({ tile, unity }) => {
    const fall = greatestFall(model, unity, low, high);
    return fall > ROUNDING ? [`${tile}: ${fall.toFixed(5)}`] : [];
  });
  return { asked: tiles.length, falling };
}

/** A truth that melts over a narrow range of heat, alumina and silica acting by their squares. */
const CURVED: InventedTruth = {
  melt: ({ SiO2 = 0, Al2O3 = 0, B2O3 = 0 }, cone) =>
    4 - 3 * (SiO2 - 2.8) ** 2 - 60 * (Al2O3 - 0.38) ** 2 + 6 * (B2O3 - 0.15) + 1.2 * (cone - 6),
  gloss: ({ SiO2 = 0, Al2O3 = 1 }, cone) => 1.5 * (SiO2 / Al2O3 - 7) + 0.5 * (cone - 6),
};
/** Heat does half of what is usual: 0.8 a cone. */
const FLAT: InventedTruth = {
  melt: ({ SiO2 = 0, Al2O3 = 0 }, cone) =>
    1 - 2 * (SiO2 - 3.2) - 10 * (Al2O3 - 0.42) + 0.8 * (cone - 6),
  gloss: ({ SiO2 = 0 }) => 3 * (SiO2 - 3),
};
const LOADS = [0, 0.3, -0.3, 0.1, 0, -0.2, 0.2, 0];
const invented = [
  { tiles: 60, seed: 601, loadErrors: LOADS },
  { tiles: 100, seed: 602, loadErrors: LOADS, cones: ['4', '6', '7', '8'] },
  { tiles: 160, seed: 603, loadErrors: LOADS, truth: CURVED },
  { tiles: 240, seed: 604, loadErrors: LOADS, cones: ['04', '1', '6', '9'], truth: CURVED },
  { tiles: 400, seed: 605, loadErrors: LOADS, truth: FLAT },
  { tiles: 120, seed: 606, loadErrors: LOADS, cones: ['6', '6', '6', '6.5'] },
];

describe('P(melted) does not fall with heat', () => {
  it('at any glaze of the demo studio', () => {
    const files = Object.entries(demoFiles()).map(
      ([path, bytes]) => [path.replace('demo/', ''), bytes] as const,
    );
    const { asked, falling } = fallingGlazes(parseArchive(new Map(files)));
    expect(asked).toBeGreaterThan(300);
    expect(falling).toEqual([]);
  });

  it.each(invented)('at any glaze of an invented studio: $tiles tiles, seed $seed', (plan) => {
    const { asked, falling } = fallingGlazes(anArchive(inventedTiles(plan)));
    expect(asked).toBe(plan.tiles);
    expect(falling).toEqual([]);
  });
});

describe('with no tiles at all P(melted) does not fall from cone 06 to 14', () => {
  const model = fitUnvalidated(anArchive());
  const studio = { K2O: 0.12, Na2O: 0.18, CaO: 0.65, MgO: 0.05 };
  const usual: Readonly<Record<string, Unity>> = {
    'clear of cone 6': { ...studio, SiO2: 3.2, Al2O3: 0.42, B2O3: 0.18 },
    'low-fire with much boron': { ...studio, SiO2: 2.5, Al2O3: 0.25, B2O3: 0.6 },
    'soft with boron': { ...studio, SiO2: 2.2, Al2O3: 0.3, B2O3: 0.5 },
    'clear without boron': { ...studio, SiO2: 4.2, Al2O3: 0.45 },
    'feldspathic of cone 9': { K2O: 0.3, CaO: 0.7, SiO2: 4, Al2O3: 0.5 },
    'lime-alkali': { K2O: 0.2, CaO: 0.8, SiO2: 3, Al2O3: 0.35 },
    'alumina matte': { K2O: 0.25, CaO: 0.75, SiO2: 2.1, Al2O3: 0.55 },
    'lime matte': { K2O: 0.1, CaO: 0.9, SiO2: 1.6, Al2O3: 0.25 },
    'magnesia matte': { Na2O: 0.2, MgO: 0.4, CaO: 0.4, SiO2: 3.2, Al2O3: 0.5, B2O3: 0.1 },
    'with zinc': { Na2O: 0.2, ZnO: 0.3, CaO: 0.5, SiO2: 2.6, Al2O3: 0.3, B2O3: 0.1 },
    'alkaline with boron': { Na2O: 0.5, K2O: 0.2, CaO: 0.3, SiO2: 2.5, Al2O3: 0.3, B2O3: 0.3 },
    'stiff of cone 10': { K2O: 0.3, CaO: 0.7, SiO2: 6, Al2O3: 0.7 },
    'dry with alumina': { K2O: 0.2, CaO: 0.8, SiO2: 3.6, Al2O3: 0.65 },
    'standard cone 9': { K2O: 0.3, CaO: 0.7, SiO2: 9, Al2O3: 0.9 },
  };

  it.each(Object.entries(usual))('for a usual glaze: %s', (_, unity) => {
    expect(greatestFall(model, unity, coneIndex('06'), 14)).toBeLessThan(ROUNDING);
  });

  it('for any drawn over what studios make', () => {
    const source = seededGenerator(3);
    for (let i = 0; i < 100; i++) {
      expect(greatestFall(model, drawnUnity(source), coneIndex('06'), 14)).toBeLessThan(ROUNDING);
    }
  });
});

describe('a studio whose tiles hardly show heat', () => {
  const weakTiles = (perCone: number, tiles: number, seed: number) =>
    inventedTiles({
      tiles,
      seed,
      loadErrors: LOADS,
      truth: {
        melt: ({ SiO2 = 0, Al2O3 = 0 }, cone) =>
          1 - 2 * (SiO2 - 3.2) - 10 * (Al2O3 - 0.42) + perCone * (cone - 6),
        gloss: ({ SiO2 = 0 }) => 3 * (SiO2 - 3),
      },
    });
  const weak = [
    [0.2, 100, 611],
    [0.2, 400, 605],
    [0.2, 1200, 607],
    [0.4, 100, 611],
    [0.4, 400, 605],
    [0, 300, 613],
  ] as const;

  it.each(weak)(
    'of %d log-odds a cone, %d tiles, seed %d, falls at none of its glazes',
    (...plan) => {
      const archive = anArchive(weakTiles(...plan));
      const { heatBefore, heatAfter } = fitStages(archive.tiles.filter(isJudged));
      expect(heatBefore.falling).toBeGreaterThan(0);
      expect([heatAfter.falling, heatAfter.worst, heatAfter.falls]).toEqual([0, 0, []]);
      expect(fallingGlazes(archive).falling).toEqual([]);
    },
  );

  it('is told that the tiles alone would let the chance fall', () => {
    const tiles = weakTiles(0.4, 400, 605);
    const { heatBefore } = fitStages(tiles.filter(isJudged));
    const note = `would fall with more heat for ${heatBefore.falling} of 400 fitted glazes, by up to ${heatBefore.worst.toFixed(3)}`;
    const { notes } = fitModel(anArchive(tiles));
    expect(notes.filter((one) => one.includes(note))).toHaveLength(1);
  });

  it('and one whose tiles show it is not', () => {
    const { notes } = fitModel(anArchive(inventedTiles({ tiles: 90, seed: 8 })));
    expect(notes.filter((note) => note.includes('with more heat'))).toEqual([]);
  });

  it('is answered nearer to its truth than by the tiles alone', () => {
    // The same tiles; the second fit is that of the first round, without the knowledge.
    const tiles = weakTiles(0.4, 400, 605).filter(isJudged);
    const fit = fitStages(tiles);
    const [melt, gloss] = fit.design.stages;
    const bare = keptRows(
      { ...melt, assumed: 0 },
      tiles.map((_, i) => i),
      melt.load,
    );
    const alone = { ...fit, design: { ...fit.design, stages: [bare, gloss] } };
    const plain = { ...alone, fit: evidenceFit(alone.design) };
    const errors = [fit, plain].map((one) => {
      const { melt: stage } = fittedStages(one, new Set());
      const offs = tiles.map(({ unity }) => {
        const at = (cone: number) => stageLogOdds(stage, unity, cone).mean;
        return (at(7) - at(5) - 0.8) ** 2;
      });
      return offs.reduce((sum, square) => sum + square, 0);
    });
    expect(errors[0]).toBeLessThan(0.8 * errors[1]);
  });
});
