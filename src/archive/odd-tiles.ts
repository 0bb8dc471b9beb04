import { wildAmounts } from '../chemistry/plausible-glaze.ts';
import { quantile } from '../numeric/summary.ts';
import type { Tile } from './archive.ts';
import { quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import type { LoadTiles } from './inventory.ts';
import { measureOf, type Measure } from './measures.ts';
import { byName } from './name-order.ts';
import { farthest, printed, shortened } from './odd-words.ts';

/** Fewer tiles may all look alike by chance. */
const TILES_OF_A_LOAD = 8;
/** Quartiles give or take three times their distance: "far out" in Tukey's words. */
const FAR_OUT = 3;

/**
 * Loads of which all judged tiles have one surface.
 *
 * @param loads - loads with their tiles counted
 * @returns one sentence, or none
 */
export function uniformLoads(loads: readonly LoadTiles[]): string[] {
  const uniform = loads.flatMap(({ load, tiles }) => {
    const judged = tiles.underfired + tiles.matte + tiles.gloss;
    const same = (['underfired', 'matte', 'gloss'] as const).find(
      (surface) => tiles[surface] === judged,
    );
    if (judged < TILES_OF_A_LOAD || same === undefined) return [];
    return [{ words: `${printed(load)} (all ${judged} ${same})`, by: judged }];
  });
  return uniform.length === 0 ? [] : [`loads of one surface alone: ${farthest(uniform)}`];
}

/**
 * The same recipe at the same cone both underfired and glossy: not a near thing.
 *
 * @param tiles - tiles
 * @returns one sentence, or none
 */
export function contraryVerdicts(tiles: readonly Tile[]): string[] {
  const made = tiles.filter(({ recipe, heat }) => recipe !== undefined && heat !== undefined);
  const groups = grouped(made, ({ recipe, heat }) => JSON.stringify([recipe, heat!.coneIndex]));
  const contrary = [...groups.values()].flatMap((own) => {
    const judged = (verdict: Tile['verdict']) => own.filter((tile) => tile.verdict === verdict);
    const [underfired, gloss] = [judged('underfired'), judged('gloss')];
    return underfired.length > 0 && gloss.length > 0 ? [{ own, underfired, gloss }] : [];
  });
  if (contrary.length === 0) return [];
  const pairs = contrary.map(({ own, underfired, gloss }) => {
    const against = `(${namesOf(underfired)} against ${namesOf(gloss)})`;
    return `${printed(own[0]!.recipe ?? '')} ${against}`;
  });
  const blamed = mostFrequentLoad(contrary.flatMap(({ underfired }) => underfired));
  return [
    `the same recipe at the same cone is underfired on one tile and gloss on another: ` +
      `${shortened(pairs.sort(byName))}${blamed}`,
  ];
}

function namesOf(tiles: readonly Tile[]): string {
  return shortened(tiles.map(({ tile }) => printed(tile)).sort(byName));
}

/** One load behind most of it is the likelier reason than so many slips. */
function mostFrequentLoad(underfired: readonly Tile[]): string {
  const byLoad = [...grouped(underfired, ({ load }) => load)];
  const [load, own] = byLoad.sort(([, a], [, b]) => b.length - a.length)[0]!;
  // More than half: no other load has as many.
  if (own.length < 2 || 2 * own.length <= underfired.length) return '';
  return `; ${own.length} of the ${underfired.length} underfired ones are of load ${quoted(load)}`;
}

/**
 * Tiles whose drip tells another story than the word for their surface.
 *
 * @param tiles - tiles
 * @returns one sentence, or none
 */
export function dripsAgainstSurface(tiles: readonly Tile[]): string[] {
  const written = (surface: string, drip: Tile['drip']) =>
    tiles.filter((tile) => tile.surfaceWritten === surface && tile.drip === drip);
  const kinds = [
    { own: written('overfired', 'unmelted'), words: 'overfired, yet the drip is unmelted' },
    { own: written('underfired', 'melted'), words: 'underfired, yet the drip is melted' },
  ].filter(({ own }) => own.length > 0);
  if (kinds.length === 0) return [];
  const each = kinds.map(({ own, words }) => `${namesOf(own)} (${words})`);
  return [`drip and surface contradict each other: ${each.join('; ')}`];
}

const MEASURE_WORDS: Readonly<Record<Measure, string>> = {
  SiO2: 'silica',
  Al2O3: 'alumina',
  B2O3: 'boric oxide',
  alkaliShare: 'alkali share',
  'SiO2:Al2O3': 'SiO2:Al2O3',
};

/**
 * Tiles whose composition lies far from that of the others, in any measure. Those that no glaze has are
 * another matter (`oddCompositions`) and left aside.
 *
 * @param tiles - tiles
 * @returns a sentence a measure
 *
 * Source of "far out": J. W. Tukey, Exploratory Data Analysis (1977), section 2D.
 */
export function farOutTiles(tiles: readonly Tile[]): string[] {
  return (Object.keys(MEASURE_WORDS) as Measure[]).flatMap((measure) => {
    const placed = tiles
      .filter(({ unity }) => wildAmounts(unity).length === 0)
      .map(({ tile, unity }) => ({ tile, value: measureOf(unity, measure) }))
      .filter(({ value }) => Number.isFinite(value));
    if (placed.length < TILES_OF_A_LOAD) return [];
    // A ratio is as far from its fellows at half as at twice their value.
    const scale = measure === 'SiO2:Al2O3' ? Math.log : (value: number) => value;
    const values = placed.map(({ value }) => scale(value));
    const [low, high] = [quantile(values, 0.25), quantile(values, 0.75)];
    const room = FAR_OUT * (high - low);
    // Half of all tiles alike: the quartiles say nothing of what is far.
    if (room === 0) return [];
    const out = placed.flatMap(({ tile, value }) => {
      const by = Math.max(low - scale(value), scale(value) - high);
      return by > room ? [{ words: `${printed(tile)} (${value.toFixed(2)})`, by }] : [];
    });
    if (out.length === 0) return [];
    return [`${MEASURE_WORDS[measure]} far from that of the other tiles: ${farthest(out)}`];
  });
}
