import { describe, expect, it } from 'vitest';
import type { Archive, Firing } from '../../src/archive/archive.ts';
import { FIRING_EFFECT_SD } from '../../src/model/firing-columns.ts';
import { fitModel, fitUnvalidated } from '../../src/model/fit.ts';
import { modelText, parseModel } from '../../src/model/model-file.ts';
import { predict } from '../../src/predict/predict.ts';
import { fitPage } from '../../src/render/fit-page.ts';
import { PLAIN_LOOK } from '../../src/render/page.ts';
import { predictionPage } from '../../src/render/prediction-page.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { anArchive } from '../support/builders.ts';
import { inventedTiles, PLAIN_TRUTH } from '../support/invented-tiles.ts';

const LOADS = 12;
/** °C per hour: four loads each slow, usual and fast. */
const RATES = [50, 100, 200];
const rateOf = (l: number) => RATES[l % RATES.length];
/** Loads of cone 7, 6, 5 and 6. */
const isReduced = (l: number) => [3, 5, 8, 10].includes(l);

type Known = (load: number) => Partial<Firing>;
const bothKnown: Known = (l) => ({
  coolingCPerH: rateOf(l),
  atmosphere: isReduced(l) ? 'reduction' : 'oxidation',
});

interface Plan {
  readonly seed: number;
  readonly tiles?: number;
  /** Log-odds of gloss per doubling of the cooling, and of reduction. */
  readonly perDoubling?: number;
  readonly reduction?: number;
  readonly known?: Known;
}

/** An archive whose gloss depends on cooling and atmosphere as told. */
function coolingArchive(plan: Plan): Archive {
  const { seed, tiles = 720, perDoubling = 0, reduction = 0, known = bothKnown } = plan;
  const { uniform } = seededGenerator(9000 + seed);
  const drawn = inventedTiles({ tiles, seed, loadErrors: Array.from({ length: LOADS }, () => 0) });
  const judged = drawn.map((tile) => {
    if (tile.verdict === 'underfired') return tile;
    const load = Number(tile.load.slice(1));
    const moved =
      PLAIN_TRUTH.gloss(tile.unity, tile.heat!.coneIndex) +
      perDoubling * Math.log2(rateOf(load) / 100) +
      (isReduced(load) ? reduction : 0);
    return { ...tile, verdict: uniform() < sigmoid(moved) ? 'gloss' : 'matte' } as const;
  });
  const firings = Array.from({ length: LOADS }, (_, l) => ({
    firing: `L${l}`,
    line: l + 2,
    ...known(l),
  }));
  return anArchive(judged, { firings });
}

const effectsOf = (archive: Archive) => fitUnvalidated(archive).firingEffects ?? [];

describe('the effect of cooling and of atmosphere on gloss', () => {
  const truth = { perDoubling: 0.8, reduction: -1 };

  it('is found where there is one: the truth as far as the tiles tell, 90 % interval mostly holding it', () => {
    const seeds = Array.from({ length: 12 }, (_, i) => 100 + i);
    const found = seeds.map((seed) => effectsOf(coolingArchive({ seed, ...truth })));
    for (const [k, true_] of [truth.perDoubling, truth.reduction].entries()) {
      const gloss = found.map((effects) => effects[k].gloss);
      const mean = gloss.reduce((sum, one) => sum + one.mean, 0) / gloss.length;
      // The prior's mean is 0: what the tiles do not tell is given away.
      const told = gloss.map((one) => 1 - (one.sd / FIRING_EFFECT_SD) ** 2);
      const expected = (true_ * told.reduce((sum, share) => sum + share, 0)) / gloss.length;
      const off = Math.abs(mean - expected);
      expect(off).toBeLessThan((3 * gloss[0].sd) / Math.sqrt(gloss.length));
      expect(expected / true_).toBeGreaterThan(0.6);
      const held = gloss.filter((one) => Math.abs(one.mean - true_) < 1.645 * one.sd).length;
      expect(held).toBeGreaterThanOrEqual(9);
    }
  });

  it('is not found where there is none', () => {
    const seeds = Array.from({ length: 12 }, (_, i) => 200 + i);
    const found = seeds.flatMap((seed) => effectsOf(coolingArchive({ seed })));
    expect(found).toHaveLength(24);
    const clear = found.filter(({ gloss }) => Math.abs(gloss.mean) > 1.645 * gloss.sd);
    expect(clear.length).toBeLessThanOrEqual(6);
    for (const { gloss } of found) expect(Math.abs(gloss.mean)).toBeLessThan(0.5);
  });

  it('is taken off what the loads differ by', () => {
    const archive = coolingArchive({ seed: 31, ...truth });
    const spread = (one: Archive) => fitUnvalidated(one).loadSpread.glossSd;
    expect(spread(archive)).toBeLessThan(0.9 * spread({ ...archive, firings: [] }));
  });
});

describe('a firing of which it is not known', () => {
  it('counts as usual, and a note says how many tiles that are', () => {
    const known: Known = (l) => (l < 8 ? { coolingCPerH: rateOf(l) } : {});
    const model = fitModel(coolingArchive({ seed: 5, perDoubling: 0.8, known, tiles: 240 }));
    const [effect] = model.firingEffects!;
    expect(effect.column).toBe('cooling');
    expect(effect.known + effect.unknown).toBe(model.gloss.tiles.yes + model.gloss.tiles.no);
    expect(effect.unknown).toBeGreaterThan(40);
    const words = `cooling is recorded for ${effect.known} of ${effect.known + effect.unknown} matte and gloss tiles`;
    expect(model.notes.filter((note) => note.includes(words))).toHaveLength(1);
  });

  it.each<[string, Known]>([
    ['none at all', () => ({})],
    ['the same everywhere', () => ({ coolingCPerH: 120, atmosphere: 'oxidation' })],
    ['nearly the same everywhere', (l) => ({ coolingCPerH: 100 + l })],
  ])('changes nothing where there is %s', (_, known) => {
    const bare = coolingArchive({ seed: 6, tiles: 120, known: () => ({}) });
    const archive = coolingArchive({ seed: 6, tiles: 120, known });
    const text = modelText(fitModel({ ...archive, firings: bare.firings }));
    const own = fitModel(archive);
    expect(modelText({ ...own, archive: { ...archive, firings: bare.firings } })).toBe(text);
    expect('firingEffects' in own).toBe(false);
  });
});

describe('a model with such effects', () => {
  const model = fitModel(coolingArchive({ seed: 7, perDoubling: 1, reduction: -1, tiles: 360 }));

  it('comes back from its file whole', () => {
    const text = modelText(model);
    const again = parseModel(text);
    expect(again.firingEffects).toEqual(model.firingEffects);
    expect(modelText(parseModel(modelText(again)))).toBe(modelText(again));
    expect(() => parseModel(text.replace('"usualCPerH":100', '"usualCPerH":-1'))).toThrow();
  });

  it('has stages that hold the asked columns only', () => {
    const { columns, radial, mean } = model.gloss;
    expect(mean).toHaveLength(columns.length + radial.centres.length);
  });

  it('says in every answer which firing it is for', () => {
    const unity = { SiO2: 3.4, Al2O3: 0.42, K2O: 0.3, CaO: 0.7 };
    const point = { point: 'A', unity };
    const answers = predict(model, [point], [6]);
    expect(answers.model.usualFiring).toEqual({ coolingCPerH: 100, atmosphere: 'oxidation' });
    const page = predictionPage(answers, [point], PLAIN_LOOK).replaceAll(/\s+/g, ' ');
    expect(page).toContain('truly reaches the cone, cools at about 100 °C/h, fired in oxidation.');
  });

  it('shows them on the page of the fit', () => {
    const page = fitPage({ model, leftOut: [] }, PLAIN_LOOK).replaceAll(/\s+/g, ' ');
    expect(page).toMatch(
      /cooling twice as fast: gloss log-odds \+\d\.\d, 90 % [+-]\d\.\d to \+\d\.\d/,
    );
    expect(page).toMatch(/reduction: gloss log-odds -\d\.\d, 90 % -\d\.\d to [+-]\d\.\d/);
    expect(page).toContain('Answers are for oxidation.');
  });
});
