import { coneIndex, coneText } from '../firing/cone.ts';
import { quantile } from '../numeric/summary.ts';
import type { Firing, Tile, WitnessReading } from './archive.ts';
import { counted } from './found-text.ts';
import { grouped } from './grouped.ts';
import { byName, inNameOrder } from './name-order.ts';
import { farthest, printed, shortenedGroup, SHOWN_OF_GROUP } from './odd-words.ts';

/** What odd heat is looked for in. */
export interface HeatLooked {
  readonly tiles: readonly Tile[];
  readonly firings: readonly Firing[];
  readonly witness: readonly WitnessReading[];
}

/** Beyond the middle half of the tiles by so many cones: another kind of firing, or a slip. */
const FAR_FROM_MIDDLE_CONES = 3;
/** A tile so far from its firing was hardly in it. */
const FAR_FROM_FIRING_CONES = 1;

/**
 * Cones that are far from those of the archive's other tiles.
 *
 * @param looked - tiles, and firings that hold none
 * @returns one sentence, or none
 *
 * Source of the limit: common practice, no source.
 */
export function farCones({ tiles, firings }: Omit<HeatLooked, 'witness'>): string[] {
  const heated = tiles.flatMap((tile) => (tile.heat ? [{ ...tile, heat: tile.heat }] : []));
  if (heated.length === 0) return [];
  const indices = heated.map(({ heat }) => heat.coneIndex);
  const [low, high] = [quantile(indices, 0.25), quantile(indices, 0.75)];
  const beyond = (index: number) => Math.max(low - index, index - high);
  const isFar = (index: number) => beyond(index) > FAR_FROM_MIDDLE_CONES;
  const ownOf = offFiring(firings);
  const groups = grouped(
    // Of those with another cone than their firing's that is said already.
    heated.filter((tile) => isFar(tile.heat.coneIndex) && ownOf(tile) === undefined),
    ({ firing, heat }) => JSON.stringify([firing ?? null, heat.coneIndex]),
  );
  const ofTiles = [...groups.values()].map((own) => {
    const { firing, heat } = own[0]!;
    const names = own.map(({ tile }) => printed(tile)).sort(byName);
    const words =
      firing === undefined || own.length <= SHOWN_OF_GROUP
        ? `${shortenedGroup(names)} (${heat.cone})`
        : `load ${printed(firing)} (${heat.cone}, ${counted(own.length, 'tile')})`;
    return { words, by: beyond(heat.coneIndex) };
  });
  const far = [...ofTiles, ...emptyLoads(heated, firings, isFar, beyond)];
  if (far.length === 0) return [];
  const middle = low === high ? coneText(low) : `${coneText(low)} to ${coneText(high)}`;
  return [`cones far from those of the other tiles (middle half: ${middle}): ${farthest(far)}`];
}

function emptyLoads(
  tiles: readonly Pick<Tile, 'load'>[],
  firings: readonly Firing[],
  isFar: (index: number) => boolean,
  beyond: (index: number) => number,
) {
  const filled = new Set(tiles.map(({ load }) => load));
  return firings.flatMap(({ firing, cone, setCone }) => {
    // What it was meant to be: that it missed it is told of the load itself.
    const own = setCone ?? cone;
    if (own === undefined || filled.has(firing) || !isFar(coneIndex(own))) return [];
    return [{ words: `load ${printed(firing)} (${own}, no tile)`, by: beyond(coneIndex(own)) }];
  });
}

/**
 * Tiles whose own cone is another than that of the firing they name.
 *
 * @param looked - tiles and firings
 * @returns one sentence, or none
 *
 * Source of the limit: common practice, no source.
 */
export function conesAgainstFiring({ tiles, firings }: Omit<HeatLooked, 'witness'>): string[] {
  const ownOf = offFiring(firings);
  const contrary = tiles.flatMap((one) => {
    const found = ownOf(one);
    return found === undefined ? [] : [{ tile: one.tile, ...found }];
  });
  if (contrary.length === 0) return [];
  const groups = [...grouped(contrary, ({ against }) => against)].map(([against, own]) => {
    const names = own.map(({ tile }) => printed(tile)).sort(byName);
    return { words: `${shortenedGroup(names)} (${against})`, by: own[0]!.by };
  });
  return [`the cone on the tile is not that of its firing: ${farthest(groups)}`];
}

/** How far the own cone of a tile is from that of its firing; undefined where that is not far. */
function offFiring(firings: readonly Firing[]) {
  const coneOf = new Map(firings.map(({ firing, cone, setCone }) => [firing, cone ?? setCone]));
  return ({ firing, heat }: Pick<Tile, 'firing' | 'heat'>) => {
    const other = coneOf.get(firing ?? '');
    if (heat?.source !== 'tile' || firing === undefined || other === undefined) return undefined;
    const by = Math.abs(heat.coneIndex - coneIndex(other));
    const against = `${heat.cone} against ${other} of load ${printed(firing)}`;
    return by > FAR_FROM_FIRING_CONES ? { against, by } : undefined;
  };
}

/**
 * Tiles on a shelf that has no witness cone, in a load in which other shelves have one: their heat is
 * that of the whole load, which is surely not that of each shelf.
 *
 * @param looked - tiles and witness cones
 * @returns one sentence, or none
 */
export function shelvesUnread({ tiles, witness }: Omit<HeatLooked, 'firings'>): string[] {
  const read = new Set(witness.map(({ firing }) => firing));
  const unread = tiles.flatMap(({ tile, firing, shelf, heat }) => {
    const ofLoad = heat?.source === 'firing' || heat?.source === 'set cone';
    if (!ofLoad || firing === undefined || shelf === undefined || !read.has(firing)) return [];
    return [{ tile, firing, shelf, heat }];
  });
  if (unread.length === 0) return [];
  const groups = [
    ...grouped(unread, ({ firing, shelf }) => JSON.stringify([firing, shelf.toLowerCase()])),
  ].map(([, own]) => {
    const inOrder = inNameOrder(own, ({ tile }) => tile);
    const { firing, shelf, heat } = inOrder[0]!;
    const names = shortenedGroup(inOrder.map(({ tile }) => printed(tile)));
    const taken = heat.source === 'firing' ? "the firing's cone" : 'the set cone';
    const place = `shelf ${printed(shelf)} of load ${printed(firing)}`;
    return { words: `${place} (${names} took ${taken} ${heat.cone})`, by: own.length };
  });
  return [
    `no witness cone was read on ${farthest(groups, SHOWN_OF_GROUP)}: a reading there, or a cone on the tile, would ` +
      'be surer',
  ];
}
