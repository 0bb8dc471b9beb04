import { describe, expect, it } from 'vitest';
import { boundaryPlaceError } from './boundary-place.ts';
import { DEVELOPMENT_FAMILIES, FAMILIES } from './families.ts';
import { ASKED_CONES, type Learned, type PointAnswer } from './learner.ts';
import { measured } from './measures.ts';
import { studioHabits } from './plan.ts';
import { drawStudio, studioTruth } from './studio.ts';
import { truthsOf } from './trial.ts';
import { glazeOf, trueProbability, type Truth } from './truths/truth.ts';
import { writtenVerdicts } from './verdicts.ts';

const seeds = Array.from({ length: 20 }, (_, i) => i + 1);
const all = Object.keys(FAMILIES);

describe('the truths of invented studios', () => {
  it.each(all)('%s: three probabilities that sum to 1, for every asked glaze', (family) => {
    for (const seed of seeds.slice(0, 4)) {
      for (const truth of truthsOf({ truth: studioTruth({ family, seed }) }, seed)) {
        const { underfired, matte, gloss } = truth;
        expect(Math.min(underfired, matte, gloss)).toBeGreaterThanOrEqual(0);
        expect(underfired + matte + gloss).toBeCloseTo(1, 12);
      }
    }
  });

  it.each(all)('%s: P(melted) never falls with heat', (family) => {
    for (const seed of seeds.slice(0, 4)) {
      const truths = truthsOf({ truth: studioTruth({ family, seed }) }, seed);
      for (let i = 0; i < truths.length; i += ASKED_CONES.length) {
        expect(truths[i + 1].underfired).toBeLessThanOrEqual(truths[i].underfired + 1e-12);
        expect(truths[i + 2].underfired).toBeLessThanOrEqual(truths[i + 1].underfired + 1e-12);
      }
    }
  });

  it.each(all.filter((family) => family !== 'strange'))(
    '%s: at cone 6 and SiO2 3.5 half melt at the alumina of common practice',
    (family) => {
      // 0.60 to 0.80, two sds of 0.075 and a little beyond.
      for (const seed of seeds) {
        const melted = (alumina: number) => meltedAt(studioTruth({ family, seed }), alumina);
        expect(melted(0.4)).toBeGreaterThan(0.5);
        expect(melted(0.95)).toBeLessThan(0.5);
      }
    },
  );
});

function meltedAt(truth: Truth, Al2O3: number): number {
  const fluxes = { K2O: 0.15, Na2O: 0.15, MgO: 0.05, ZnO: 0.02, CaO: 0.63 };
  return truth.melted(glazeOf({ SiO2: 3.5, Al2O3, B2O3: 0.175, ...fluxes }), 6);
}

describe('the archives of invented studios', () => {
  it('hold as many judged tiles as asked, the same ones each time', () => {
    for (const size of [40, 300]) {
      const { archive } = drawStudio({ family: 'curved', seed: 3, size });
      expect(archive.counts.fitted).toBe(size);
      const again = drawStudio({ family: 'curved', seed: 3, size });
      expect(again.archive.fingerprint).toBe(archive.fingerprint);
    }
  });

  it('differ only in their labels where another share of them is wrong', () => {
    const [right, wrong] = [0, 0.05].map((wrongShare) =>
      drawStudio({ family: 'planes', seed: 5, size: 300, wrongShare }),
    );
    const changed = right.archive.tiles.filter(
      ({ verdict }, i) => verdict !== wrong.archive.tiles[i].verdict,
    );
    expect(changed).toHaveLength(15);
    expect(wrong.archive.tiles.map(({ unity }) => unity)).toEqual(
      right.archive.tiles.map(({ unity }) => unity),
    );
  });

  it('have 1 to 40 loads, and some have no tile near cone 5 or near cone 7', () => {
    const habits = [40, 3000].flatMap((size) => seeds.map((seed) => studioHabits(seed, size)));
    const counts = habits.map(({ loads }) => loads.length);
    expect(Math.min(...counts)).toBeLessThanOrEqual(2);
    expect(Math.max(...counts)).toBe(40);
    for (const cone of [5, 7]) {
      const without = habits.filter(({ loads }) =>
        loads.every(({ coneIndex }) => Math.abs(coneIndex - cone) > 0.5),
      );
      expect(without.length).toBeGreaterThan(4);
      expect(without.length).toBeLessThan(36);
    }
  });

  it('confuse matte and underfired in half of the wrong verdicts', () => {
    const surfaces = Array.from({ length: 6000 }, (_, i) =>
      i % 3 === 0 ? 'matte' : i % 3 === 1 ? 'underfired' : 'gloss',
    );
    const written = writtenVerdicts(surfaces, 0.1, 1);
    const wrong = written.flatMap((word, i) => (word === surfaces[i] ? [] : [[word, surfaces[i]]]));
    expect(wrong).toHaveLength(600);
    const half = wrong.filter((pair) => !pair.includes('gloss')).length;
    // 300, and four standard deviations of a fair coin.
    expect(Math.abs(half - 300)).toBeLessThan(4 * Math.sqrt(150));
  });
});

describe('the measures', () => {
  const studio = drawStudio({ family: 'thermal', seed: 2, size: 40 });
  const truths = truthsOf(studio, 2);
  const answer = (probability: PointAnswer['probability'], margin: number): PointAnswer => {
    const about = (p: number) => [p - margin, p + margin] as const;
    const { underfired, matte, gloss } = probability;
    const interval90 = { underfired: about(underfired), matte: about(matte), gloss: about(gloss) };
    return { probability, interval90 };
  };

  it('find nothing wrong with the truth: no excess, all held, the width as the score', () => {
    const own = measured(
      truths,
      truths.map((truth) => answer(truth, 0.01)),
      studio.archive,
    );
    // An answer counts with at least 1e-9.
    expect(own.excess).toBeCloseTo(0, 9);
    expect(own.held!.held).toBe(own.held!.cells);
    expect(own.held!.cells).toBeGreaterThan(300);
    expect(own.intervalScore).toBeCloseTo(0.02, 12);
  });

  it('count 20 times what lies outside the interval', () => {
    const off = truths.map(({ underfired, matte, gloss }) =>
      answer({ underfired: underfired + 0.03, matte: matte + 0.03, gloss: gloss + 0.03 }, 0.01),
    );
    const own = measured(truths, off, studio.archive);
    expect(own.held!.held).toBe(0);
    expect(own.intervalScore).toBeCloseTo(0.02 + 20 * 0.02, 10);
  });

  it('find the truth’s own melt boundary where it is', () => {
    const knowing: Learned = (points, cones) =>
      points.flatMap((unity) =>
        cones.map((cone) => ({ probability: trueProbability(studio.truth, unity, cone) })),
      );
    expect(boundaryPlaceError(studio.truth, studio.archive, knowing)).toBeCloseTo(0, 10);
  });

  it('leave the held-back family out of development', () => {
    expect(DEVELOPMENT_FAMILIES).not.toContain('held-back');
    expect(DEVELOPMENT_FAMILIES).toHaveLength(5);
  });
});
