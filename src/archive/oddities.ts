import { median, quantile } from '../numeric/summary.ts';
import type { Recipe, Tile } from './archive.ts';
import { counted, listed, quoted } from './found-text.ts';
import { grouped } from './grouped.ts';
import type { LoadTiles } from './inventory.ts';
import type { KilnAccount } from './kiln-account.ts';
import { measureOf, type Measure } from './measures.ts';

/** What the odd things are looked for in. */
export interface Looked {
  readonly tiles: readonly Tile[];
  readonly recipes: readonly Recipe[];
  readonly kilns: readonly KilnAccount[];
  readonly loads: readonly LoadTiles[];
}

/** Over its whole history a kiln may wander by the step to which cones are read. */
const READ_TO_CONES = 0.25;
/** A reading so far from the set cone is another firing than was meant. */
const FAR_FROM_SET_CONES = 0.75;
/** Fewer tiles may all look alike by chance. */
const TILES_OF_A_LOAD = 8;
/** Quartiles give or take three times their distance: "far out" in Tukey's words. */
const FAR_OUT = 3;
/** So far from the hundred, a recipe of a studio that weighs by the hundred is a slip. */
const OFF_HUNDRED_PARTS = 2;
/** Names that a sentence spells out. */
const SHOWN_NAMES = 6;

/**
 * What in an archive is worth a second look. Nothing of it is wrong for certain.
 *
 * @param looked - tiles, recipes, kilns and loads
 * @returns sentences, each with what was found and what to look at
 *
 * Source of "far out": J. W. Tukey, Exploratory Data Analysis (1977), section 2D. The other limits are
 * common practice, no source.
 */
export function oddities(looked: Looked): string[] {
  return [
    ...driftingKilns(looked.kilns),
    ...farFromSet(looked.kilns),
    ...uniformLoads(looked.loads),
    ...contraryVerdicts(looked.tiles),
    ...farOutTiles(looked.tiles),
    ...offHundred(looked.recipes),
  ];
}

function driftingKilns(kilns: readonly KilnAccount[]): string[] {
  return kilns.flatMap(({ kiln, trend, firings }) => {
    if (trend === null || kiln === null) return [];
    const perFiring = Math.abs(trend.conesPerFiring);
    if (perFiring * (firings.length - 1) <= READ_TO_CONES) return [];
    const cooler = trend.conesPerFiring < 0;
    const read = trend.firings === firings.length ? '' : `, ${trend.firings} of them read`;
    const why = cooler ? 'elements wear' : 'look at the controller and the thermocouple';
    return [
      `${printed(kiln)} reads ${perFiring.toFixed(2)} cone ${cooler ? 'cooler' : 'warmer'} each ` +
        `firing (${counted(firings.length, 'firing')}${read}): ${why}`,
    ];
  });
}

function farFromSet(kilns: readonly KilnAccount[]): string[] {
  return kilns.flatMap(({ firings }) =>
    firings.flatMap(({ firing, setCone, lessSet }) => {
      if (lessSet === null || Math.abs(lessSet) < FAR_FROM_SET_CONES) return [];
      const side = lessSet < 0 ? 'below' : 'above';
      return [
        `load ${quoted(firing)} was set to cone ${setCone ?? ''} and reads ` +
          `${Math.abs(lessSet).toFixed(2)} cone ${side} it`,
      ];
    }),
  );
}

function uniformLoads(loads: readonly LoadTiles[]): string[] {
  return loads.flatMap(({ load, tiles }) => {
    const judged = tiles.underfired + tiles.matte + tiles.gloss;
    const same = (['underfired', 'matte', 'gloss'] as const).find(
      (surface) => tiles[surface] === judged,
    );
    if (judged < TILES_OF_A_LOAD || same === undefined) return [];
    return [`all ${judged} judged tiles of load ${quoted(load)} are ${same}`];
  });
}

/** The same recipe at the same cone both underfired and glossy: not a near thing. */
function contraryVerdicts(tiles: readonly Tile[]): string[] {
  const made = tiles.filter(({ recipe, heat }) => recipe !== undefined && heat !== undefined);
  const groups = grouped(made, ({ recipe, heat }) => JSON.stringify([recipe, heat!.coneIndex]));
  const contrary = [...groups.values()].flatMap((own) => {
    const judged = (verdict: Tile['verdict']) => own.filter((tile) => tile.verdict === verdict);
    const [underfired, gloss] = [judged('underfired'), judged('gloss')];
    return underfired.length > 0 && gloss.length > 0 ? [{ own, underfired, gloss }] : [];
  });
  if (contrary.length === 0) return [];
  const names = (some: readonly Tile[]) => shortened(some.map(({ tile }) => printed(tile)));
  const pairs = contrary.map(({ own, underfired, gloss }) => {
    return `${printed(own[0]!.recipe ?? '')} (${names(underfired)} against ${names(gloss)})`;
  });
  const blamed = mostFrequentLoad(contrary.flatMap(({ underfired }) => underfired));
  return [
    `the same recipe at the same cone is underfired on one tile and gloss on another: ` +
      `${shortened(pairs)}${blamed}`,
  ];
}

/** One load behind most of it is the likelier reason than so many slips. */
function mostFrequentLoad(underfired: readonly Tile[]): string {
  const byLoad = [...grouped(underfired, ({ load }) => load)];
  const [load, own] = byLoad.sort(([, a], [, b]) => b.length - a.length)[0]!;
  if (own.length < 2 || 2 * own.length <= underfired.length) return '';
  return `; ${own.length} of the ${underfired.length} underfired ones are of load ${quoted(load)}`;
}

const MEASURE_WORDS: Readonly<Record<Measure, string>> = {
  SiO2: 'silica',
  Al2O3: 'alumina',
  B2O3: 'boric oxide',
  alkaliShare: 'alkali share',
  'SiO2:Al2O3': 'SiO2:Al2O3',
};

function farOutTiles(tiles: readonly Tile[]): string[] {
  return (Object.keys(MEASURE_WORDS) as Measure[]).flatMap((measure) => {
    const placed = tiles
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
    const isOut = (value: number) => value < low - room || value > high + room;
    const out = placed.filter(({ value }) => isOut(scale(value)));
    if (out.length === 0) return [];
    const names = out.map(({ tile, value }) => `${printed(tile)} (${value.toFixed(2)})`);
    return [`${MEASURE_WORDS[measure]} far from that of the other tiles: ${shortened(names)}`];
  });
}

function offHundred(recipes: readonly Recipe[]): string[] {
  const sums = recipes.map(({ recipe, lines }) => ({
    recipe,
    sum: lines.reduce((sum, { parts, over100 }) => sum + (over100 ? 0 : parts), 0),
  }));
  if (sums.length === 0) return [];
  const weighsByHundred =
    Math.abs(median(sums.map(({ sum }) => sum)) - 100) < OFF_HUNDRED_PARTS / 4;
  const off = sums.filter(({ sum }) => Math.abs(sum - 100) > OFF_HUNDRED_PARTS);
  if (!weighsByHundred || off.length === 0) return [];
  const names = off.map(({ recipe, sum }) => `${printed(recipe)} (${sum.toFixed(1)})`);
  return [`recipes usually make 100 parts, but not ${shortened(names)}`];
}

function shortened(names: readonly string[]): string {
  const left = names.length - SHOWN_NAMES;
  if (left <= 0) return listed(names, 'and');
  return `${names.slice(0, SHOWN_NAMES).join(', ')} and ${left} more`;
}

/** As `quoted`, without the quotes: for names in lists. */
function printed(name: string): string {
  return quoted(name).slice(1, -1);
}
