import { around, between, chanceOf } from '../studios/chance.ts';
import { drawLine, drawLoose, type RecipeSet } from '../studios/recipes.ts';
import { studioTruth } from '../studios/studio.ts';
import type { Glaze, Truth } from '../studios/truths/truth.ts';
import type { Generator } from '../../../src/numeric/random.ts';

/** Tiles of a load: 100,000 tiles come from 4,000 loads. */
export const TILES_A_LOAD = 25;
const SEED = 7;
const OXIDES = 'SiO2,Al2O3,B2O3,K2O,Na2O,MgO,ZnO,CaO';
const LOAD_ERROR_CONES = 0.18;
const COOLING_SD = 0.2;

function oxides({ silica, alumina, boric, alkali, magnesia, zinc }: Glaze): string {
  const lime = 1 - alkali - magnesia - zinc;
  const amounts = [silica, alumina, boric, alkali / 2, alkali / 2, magnesia, zinc, lime];
  return amounts.map((amount) => amount.toFixed(4)).join(',');
}

/**
 * An invented archive of one size, as one CSV file: loads of 25 tiles, half of them lines of a blend, mostly at
 * cone 6. The same bytes for the same size.
 *
 * @param size - judged tiles
 * @returns text of the file
 */
export function speedArchive(size: number): string {
  const truth = studioTruth({ family: 'curved', seed: SEED });
  const chance = chanceOf(SEED, 'plan', size);
  const rows = [`tile,blend,firing,cone,${OXIDES},surface`];
  for (let load = 1; rows.length <= size; load++) {
    const room = Math.min(TILES_A_LOAD, size + 1 - rows.length);
    rows.push(...loadRows(truth, chance, load, room));
  }
  return `${rows.join('\n')}\n`;
}

function loadRows(truth: Truth, chance: Generator, load: number, room: number): string[] {
  const cone = [5, 6, 6, 7, 6][load % 5];
  const reached = around(chance, cone, LOAD_ERROR_CONES);
  const cooling = around(chance, 0, COOLING_SD);
  const rows: string[] = [];
  for (let set = 1; rows.length < room; set++) {
    const left = room - rows.length;
    const isLine = rows.length < room / 2 && left >= 3;
    const drawn: RecipeSet = isLine ? drawLine(chance, `B${load}-${set}`, left) : drawLoose(chance);
    for (const glaze of drawn.recipes) {
      const melts = chance.uniform() < truth.melted(glaze, reached);
      const shines = chance.uniform() < truth.glossy(glaze, reached, cooling);
      const surface = melts ? (shines ? 'gloss' : 'matte') : 'underfired';
      const name = `L${load}-${rows.length + 1}`;
      rows.push(`${name},${drawn.blend ?? ''},L${load},${cone},${oxides(glaze)},${surface}`);
    }
  }
  return rows;
}

/**
 * Points to ask about, as a CSV file.
 *
 * @param count - how many
 * @returns text of the file
 */
export function speedPoints(count: number): string {
  const chance = chanceOf(SEED, 'points', count);
  const rows = Array.from(
    { length: count },
    (_, i) => `P${i},${oxides(drawLoose(chance).recipes[0])}`,
  );
  return `${[`point,${OXIDES}`, ...rows].join('\n')}\n`;
}

/**
 * A map's points: a grid over silica and alumina at one flux.
 *
 * @param steps - points along each side
 * @returns text of a CSV file
 */
export function mapPoints(steps: number): string {
  const chance = chanceOf(SEED, 'points');
  const base = { boric: between(chance, 0.1, 0.2), alkali: 0.3, magnesia: 0.05, zinc: 0 };
  const rows = Array.from({ length: steps * steps }, (_, i) => {
    const silica = 1.8 + (3.2 * (i % steps)) / (steps - 1);
    const alumina = 0.18 + (0.57 * Math.floor(i / steps)) / (steps - 1);
    return `P${i},${oxides({ ...base, silica, alumina })}`;
  });
  return `${[`point,${OXIDES}`, ...rows].join('\n')}\n`;
}
