import type { Firing, Tile } from './archive.ts';
import { grouped } from './grouped.ts';
import { peakMisfit } from './lost-zero.ts';
import { byName } from './name-order.ts';
import { farthest, printed, shortenedGroup, type OddThing } from './odd-words.ts';
import { ownPeakC } from './own-peak.ts';

/**
 * Firings, and tiles that tell the peak of theirs, whose peak does not go with their cone.
 *
 * Peaks that fit the zero form of the cone are faults and not looked for here.
 *
 * @param looked - tiles and firings
 * @returns one sentence, or none
 */
export function peaksAgainstCones(looked: {
  readonly tiles: readonly Tile[];
  readonly firings: readonly Firing[];
}): string[] {
  const odd = [...looked.firings.flatMap(firingMisfit), ...tileMisfits(looked.tiles)];
  if (odd.length === 0) return [];
  return [
    `peaks that do not fit the cone: ${farthest(odd)}; look at cone, peak_c and thermocouple`,
  ];
}

/** Of the cone reached, and of the one set where the first fits or is not known. */
function firingMisfit({ firing, cone, setCone, peakC }: Firing): OddThing[] {
  if (peakC === undefined) return [];
  const reached = misfit(cone, peakC, (words) => `${printed(firing)} (cone ${words})`);
  if (reached.length > 0) return reached;
  return misfit(setCone, peakC, (words) => `${printed(firing)} (set to cone ${words})`);
}

function tileMisfits(tiles: readonly Tile[]): OddThing[] {
  const placed = tiles.flatMap(({ tile, heat, other }) => {
    const peakC = ownPeakC(other);
    if (heat?.source !== 'tile' || peakC === undefined) return [];
    return [{ tile, cone: heat.cone, peakC }];
  });
  const groups = grouped(placed, ({ cone, peakC }) => JSON.stringify([cone, peakC]));
  return [...groups.values()].flatMap((own) => {
    const { cone, peakC } = own[0]!;
    const names = own.map(({ tile }) => printed(tile)).sort(byName);
    return misfit(cone, peakC, (words) => `${shortenedGroup(names)} (cone ${words})`);
  });
}

function misfit(
  cone: string | undefined,
  peakC: number,
  inWords: (words: string) => string,
): OddThing[] {
  const found = cone === undefined ? undefined : peakMisfit(cone, peakC);
  if (cone === undefined || found === undefined) return [];
  const { usualC, nearestCone } = found;
  const words = `${cone}, usually near ${usualC} °C; ${peakC} °C suits ${nearestCone}`;
  return [{ words: inWords(words), by: Math.abs(peakC - usualC) }];
}
