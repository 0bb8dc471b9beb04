import type { Archive } from '../../../src/archive/archive.ts';
import { parseArchive } from '../../../src/archive/read-archive.ts';
import type { Surface } from '../../../src/model/model.ts';
import type { Generator } from '../../../src/numeric/random.ts';
import { chanceOf } from './chance.ts';
import { loadContents, type PlannedTile } from './contents.ts';
import { FAMILIES } from './families.ts';
import { studioHabits, type PlannedLoad, type StudioHabits } from './plan.ts';
import type { Glaze, Truth } from './truths/truth.ts';
import { writtenVerdicts } from './verdicts.ts';

/** What to draw. The truth depends on family and seed alone, the archive on all of it. */
export interface StudioAsked {
  readonly family: string;
  readonly seed: number;
  /** Judged tiles. */
  readonly size: number;
  /** Share of wrong verdicts; drawn from 0 to 5 % where absent. */
  readonly wrongShare?: number;
}

/** An invented studio: its truth and the archive that it keeps. */
export interface Studio {
  readonly truth: Truth;
  readonly habits: StudioHabits;
  readonly archive: Archive;
}

/**
 * The truth of a studio.
 *
 * @param asked - family and seed
 * @returns the truth
 * @throws {RangeError} if there is no such family
 */
export function studioTruth({ family, seed }: Pick<StudioAsked, 'family' | 'seed'>): Truth {
  if (!Object.hasOwn(FAMILIES, family)) throw new RangeError(`no family ${family}`);
  return FAMILIES[family](chanceOf(seed, 'truth'));
}

/**
 * Draws a studio. Verdicts come from the glaze as weighed and the heat truly reached; the archive
 * holds the formula as meant and the heat on paper.
 *
 * @param asked - family, seed, size
 * @returns truth and archive
 */
export function drawStudio(asked: StudioAsked): Studio {
  const { seed, size } = asked;
  const truth = studioTruth(asked);
  const habits = studioHabits(seed, size, asked.wrongShare);
  const contents = loadContents(habits, seed, size);
  const surfaces = firedSurfaces(truth, habits, contents, asked);
  const verdicts = writtenVerdicts(surfaces, habits.wrongShare, seed);
  const csv = new TextEncoder().encode(tilesCsv(habits.loads, contents, verdicts));
  return { truth, habits, archive: parseArchive(new Map([['tiles.csv', csv]])) };
}

function firedSurfaces(
  truth: Truth,
  habits: StudioHabits,
  contents: readonly (readonly PlannedTile[])[],
  { seed, size }: StudioAsked,
): Surface[] {
  const heat = chanceOf(seed, 'heat', size);
  const weighing = chanceOf(seed, 'weighing', size);
  const surfaces = chanceOf(seed, 'surfaces', size);
  const mixed = new Map<string, Glaze>();
  return habits.loads.flatMap(({ coneIndex }, l) => {
    const reached = coneIndex + habits.loadErrorSdCones * heat.normal();
    const cooling = habits.coolingSd * heat.normal();
    return contents[l].map(({ recipe, mixing }) => {
      const glaze = mixed.get(mixing) ?? weighed(recipe, habits.weighingSd, weighing);
      mixed.set(mixing, glaze);
      if (surfaces.uniform() >= truth.melted(glaze, reached)) return 'underfired';
      return surfaces.uniform() < truth.glossy(glaze, reached, cooling) ? 'gloss' : 'matte';
    });
  });
}

/** Every oxide weighed with an error of its own, brought back to a flux of 1. */
function weighed(glaze: Glaze, sd: number, chance: Generator): Glaze {
  const off = (amount: number) => amount * (1 + sd * chance.normal());
  const lime = off(1 - glaze.alkali - glaze.magnesia - glaze.zinc);
  const alkali = off(glaze.alkali);
  const magnesia = off(glaze.magnesia);
  const zinc = off(glaze.zinc);
  const flux = lime + alkali + magnesia + zinc;
  return {
    silica: off(glaze.silica) / flux,
    alumina: off(glaze.alumina) / flux,
    boric: off(glaze.boric) / flux,
    alkali: alkali / flux,
    magnesia: magnesia / flux,
    zinc: zinc / flux,
  };
}

const HEADER = 'tile,blend,firing,cone,SiO2,Al2O3,B2O3,K2O,Na2O,MgO,ZnO,CaO,surface';

function tilesCsv(
  loads: readonly PlannedLoad[],
  contents: readonly (readonly PlannedTile[])[],
  verdicts: readonly Surface[],
): string {
  let at = 0;
  const rows = loads.flatMap(({ firing, coneIndex }, l) =>
    contents[l].map(({ recipe, blend = '' }, i) => {
      const { silica, alumina, boric, alkali, magnesia, zinc } = recipe;
      const lime = 1 - alkali - magnesia - zinc;
      const oxides = [silica, alumina, boric, alkali / 2, alkali / 2, magnesia, zinc, lime];
      const moles = oxides.map((amount) => amount.toFixed(4)).join(',');
      return `${firing}-${i + 1},${blend},${firing},${coneIndex},${moles},${verdicts[at++]}`;
    }),
  );
  return `${[HEADER, ...rows].join('\n')}\n`;
}
