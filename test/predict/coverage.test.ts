import { beforeAll, describe, expect, it } from 'vitest';
import type { Unity } from '../../src/chemistry/unity.ts';
import { SURFACES, type Surface } from '../../src/model/model.ts';
import type { StageName } from '../../src/model/stages.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import type { Boundary, PlaceInterval90, Point, Turn } from '../../src/predict/answers.ts';
import { boundaries } from '../../src/predict/boundaries.ts';
import { predict } from '../../src/predict/predict.ts';
import { shift } from '../../src/predict/shift.ts';
import { drawnUnity } from '../support/invented-tiles.ts';
import { priorStudio, type PriorStudio } from '../support/prior-studios.ts';

/** Where the truth has it: at a place, outside the range at either end, or nowhere. */
type TruePlace = number | 'below' | 'beyond' | 'none';

/** How often the truth lies off an end of an interval: 5 % of it should, at each end that is known. */
class Tails {
  asked = 0;
  off = 0;
  add([low, high]: PlaceInterval90, place: TruePlace): void {
    if (place === 'none') return;
    const value = place === 'below' ? -Infinity : place === 'beyond' ? Infinity : place;
    this.asked += Number(low !== null) + Number(high !== null);
    this.off += Number(low !== null && value < low) + Number(high !== null && value > high);
  }
  get share(): number {
    return this.off / this.asked;
  }
}

const nearest = (places: readonly number[], to: number) =>
  places.reduce((a, b) => (Math.abs(b - to) < Math.abs(a - to) ? b : a));

function trueProbability({ truth }: PriorStudio, unity: Unity, cone: number) {
  const m = sigmoid(truth('melt', unity, cone));
  const g = sigmoid(truth('gloss', unity, cone));
  return { underfired: 1 - m, matte: m * (1 - g), gloss: m * g };
}

function trueTurn(
  studio: PriorStudio,
  unity: Unity,
  { from, to, coneIndex }: Turn,
  [low, high]: readonly [number, number],
): TruePlace {
  const surfaceAt = (cone: number) => {
    const p = trueProbability(studio, unity, cone);
    return SURFACES.reduce<Surface>(
      (best, next) => (p[next] > p[best] ? next : best),
      'underfired',
    );
  };
  const cones = Array.from({ length: 401 }, (_, i) => low + ((high - low) * i) / 400);
  const path = cones.map(surfaceAt);
  const places = cones.filter((_, i) => i > 0 && path[i - 1] === from && path[i] === to);
  if (places.length > 0) return nearest(places, coneIndex);
  if (path.every((surface, i) => cones[i] < coneIndex || surface === from)) return 'beyond';
  if (path.every((surface, i) => cones[i] > coneIndex || surface === to)) return 'below';
  return 'none';
}

function unityOn({ along }: Boundary, unity: Unity, place: number): Unity {
  if (along !== 'SiO2:Al2O3') return { ...unity, [along]: place };
  const sum = (unity.SiO2 ?? 0) + (unity.Al2O3 ?? 0);
  return { ...unity, SiO2: (sum * place) / (1 + place), Al2O3: sum / (1 + place) };
}

function trueBoundary(studio: PriorStudio, unity: Unity, row: Boundary): TruePlace {
  const { kind, coneIndex, lookedAt, value } = row;
  const [low, high] = lookedAt;
  const rises = row.above === (kind === 'melt' ? 'melted' : 'gloss');
  const logOdds = (stage: StageName, place: number) =>
    studio.truth(stage, unityOn(row, unity, place), coneIndex);
  const nodes = Array.from({ length: 401 }, (_, i) => low + ((high - low) * i) / 400);
  const own = nodes.map((place) => logOdds(kind, place));
  const places = nodes.filter(
    (_, i) => i > 0 && own[i - 1] >= 0 !== own[i] >= 0 && own[i] >= 0 === rises,
  );
  const melted = places.filter((place) => kind === 'melt' || logOdds('melt', place) >= 0);
  if (melted.length > 0) return nearest(melted, value!);
  if (places.length > 0) return 'none';
  return logOdds(kind, value!) >= 0 === rises ? 'below' : 'beyond';
}

/** A whole chain each: truth, tiles, fit, answers. Boundaries take the most time: every other studio. */
const STUDIOS = 80;
const TILES = 120;

describe('over invented studios whose truth is drawn from the prior', () => {
  const surfaces = { underfired: new Tails(), matte: new Tails(), gloss: new Tails() };
  const turns = new Tails();
  const places = { melt: new Tails(), gloss: new Tails() };
  const crossings = { stated: 0, missing: 0, asked: 0 };
  const called = { stated: 0, true: 0, asked: 0 };
  const offsets = new Tails();
  beforeAll(() => {
    const source = seededGenerator(1);
    for (let i = 0; i < STUDIOS; i++) {
      const studio = priorStudio(source, TILES);
      const points: Point[] = [0, 1, 2].map((k) => ({ point: `P${k}`, unity: drawnUnity(source) }));
      const unityOf = new Map(points.map(({ point, unity }) => [point, unity]));
      for (const answer of predict(studio.model, points, [5, 6, 7]).predictions) {
        const p = trueProbability(studio, unityOf.get(answer.point)!, answer.coneIndex);
        for (const s of SURFACES) surfaces[s].add(answer.interval90[s], p[s]);
        called.stated += answer.probability[answer.surface];
        called.true += p[answer.surface];
        called.asked += 1;
      }
      for (const answer of shift(studio.model, points, [5, 6, 7]).points) {
        for (const turn of answer.turns) {
          turns.add(turn.interval90, trueTurn(studio, answer.unity, turn, answer.lookedAt));
        }
      }
      studio.model.loads.forEach(({ offsetCones: { mean, sd } }, l) => {
        offsets.add([mean - 1.6449 * sd, mean + 1.6449 * sd], studio.offsets[l]);
      });
      if (i % 2 === 1) continue;
      const [through] = points;
      for (const row of boundaries(studio.model, [6], { through }).boundaries) {
        if (row.value === null) continue;
        const place = trueBoundary(studio, through.unity, row);
        places[row.kind].add(row.interval90, place);
        crossings.stated += row.noCrossing;
        crossings.missing += Number(typeof place !== 'number');
        crossings.asked += 1;
      }
    }
  });

  // 720 answers of 80 studios, those of one studio alike: a standard error of about 0.012. An sd too
  // small by a quarter would put 0.11 off each end.
  it.each(SURFACES)('5 %% of the true probabilities of %s lie off each end', (surface) => {
    expect(surfaces[surface].asked).toBe(2 * 9 * STUDIOS);
    expect(surfaces[surface].share).toBeGreaterThan(0.02);
    expect(surfaces[surface].share).toBeLessThan(0.08);
  });

  it('what is called most probable is true as often as stated', () => {
    const error = (called.stated - called.true) / called.asked;
    expect(Math.abs(error)).toBeLessThan(0.03);
  });

  it('about 5 % of the true turns lie off each end that is known', () => {
    expect(turns.asked).toBeGreaterThan(100);
    expect(turns.share).toBeGreaterThan(0);
    expect(turns.share).toBeLessThan(0.09);
  });

  it.each(['melt', 'gloss'] as const)('about 5 %% of the true %s boundaries do', (kind) => {
    expect(places[kind].asked).toBeGreaterThan(80);
    expect(places[kind].share).toBeLessThan(0.1);
  });

  it('some of the true boundaries do: the intervals are no whole ranges', () => {
    expect(places.melt.off + places.gloss.off).toBeGreaterThan(0);
  });

  it('boundaries are missing from the range as often as stated', () => {
    expect(crossings.asked).toBeGreaterThan(100);
    expect(crossings.missing / crossings.stated).toBeGreaterThan(0.4);
    expect(crossings.missing / crossings.stated).toBeLessThan(1.6);
  });

  // 640 loads: a standard error of 0.006.
  it('5 % of the true offsets of the loads lie off each end', () => {
    expect(offsets.asked).toBe(2 * 8 * STUDIOS);
    expect(offsets.share).toBeGreaterThan(0.03);
    expect(offsets.share).toBeLessThan(0.07);
  });
});
