import type { Inventory, LoadTiles } from '../archive/inventory.ts';
import type { KilnAccount, KilnFiring, KilnReading, KilnTrend } from '../archive/kiln-account.ts';
import { alignedLines, type Align } from './aligned.ts';
import { fixed, signed } from './figures.ts';
import { INDENT, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { countOf } from './sentences.ts';
import { VERDICT_HEADINGS, verdictCells } from './verdict-cells.ts';

/** So that the row of a load fits 80 columns. */
const WIDEST_NAME = 13;

/**
 * The loads of an archive, kiln by kiln, with what the witness cones say of each kiln.
 *
 * @param held - inventory of the archive
 * @param look - width and marking
 * @returns a section for each kiln, one for loads that firings.csv does not know
 */
export function kilnSections(
  { kilns, loads, tilesWithoutFiring }: Inventory,
  look: Look,
): Section[] {
  const tiles = new Map(loads.map((load) => [load.load, load]));
  const known = new Set(kilns.flatMap(({ firings }) => firings.map(({ firing }) => firing)));
  const others = loads.filter(({ load }) => !known.has(load));
  const apart = `${countOf(tilesWithoutFiring, 'tile')} without a firing: each a load of its own.`;
  return [
    ...kilns.map((kiln) => kilnSection(kiln, tiles, look)),
    {
      heading: kilns.length === 0 ? 'Loads' : 'Other loads',
      lines: [
        ...otherLines(others, look),
        ...(tilesWithoutFiring === 0 ? [] : [prose(apart, look)]),
      ],
    },
  ];
}

function kilnSection(
  account: KilnAccount,
  tiles: ReadonlyMap<string, LoadTiles>,
  look: Look,
): Section {
  const { kiln, firings } = account;
  const head = ['load', 'date', 'set', 'read', 'off', ...VERDICT_HEADINGS];
  const align: Align[] = ['left', 'left', 'right', 'left', 'right', ...rightOf(VERDICT_HEADINGS)];
  const rows = firings.map((firing) => [...firingCells(firing), ...tileCells(tiles, firing)]);
  const name = kiln === null ? 'Loads without a kiln' : `Kiln ${printable(kiln)}`;
  return {
    heading: `${name}: ${countOf(firings.length, 'load')}`,
    lines: [
      ...alignedLines({ rows: [head, ...rows], align, indent: INDENT, columns: look.columns }),
      ...kilnWords(account).map((words) => prose(words, look)),
    ],
  };
}

function firingCells({ firing, date, setCone, readings, lessSet }: KilnFiring): string[] {
  const name = cutTo(printable(firing), WIDEST_NAME);
  return [name, date ?? '', setCone ?? '-', readRange(readings), signed(lessSet, 2)];
}

/** The coolest and the hottest witness cone of the load. */
function readRange(readings: readonly KilnReading[]): string {
  if (readings.length === 0) return '-';
  const byHeat = [...readings].sort((a, b) => a.coneIndex - b.coneIndex);
  const [coolest, hottest] = [byHeat[0]!.cone, byHeat.at(-1)!.cone];
  return coolest === hottest ? coolest : `${coolest}-${hottest}`;
}

function tileCells(tiles: ReadonlyMap<string, LoadTiles>, { firing }: KilnFiring): string[] {
  const own = tiles.get(firing);
  return own === undefined ? VERDICT_HEADINGS.map(() => '.') : verdictCells(own.tiles);
}

function kilnWords({ kiln, lessSet, shelves, trend, firings, isDated }: KilnAccount): string[] {
  if (kiln === null) return [];
  const read = firings.filter(({ readings }) => readings.length > 0).length;
  const standing =
    lessSet === null
      ? ['No witness cone beside a set cone: what the kiln reaches is not known.']
      : [
          `In the middle of its loads it reads ${offWords(lessSet)} (witness cones in ` +
            `${read} of ${countOf(firings.length, 'load')}; off: middle reading less set cone).`,
        ];
  const moves = trend === null ? [] : [trendWords(trend, isDated)];
  return [...standing, ...shelfWords(shelves), ...moves];
}

function offWords(cones: number): string {
  if (Math.abs(cones) < 0.005) return 'as set';
  return `${fixed(Math.abs(cones), 2)} cone ${cones < 0 ? 'below' : 'above'} what it was set to`;
}

function shelfWords(shelves: KilnAccount['shelves']): string[] {
  if (shelves.length === 0) return [];
  const each = shelves.map(({ shelf, lessLoad, readings }) => {
    return `${printable(shelf)} ${signed(lessLoad, 2)} (${countOf(readings, 'reading')})`;
  });
  return [`Shelves against the middle of their load, in cones: ${each.join(', ')}.`];
}

/** Below this a firing moves less than a hundredth of a cone: even. */
const EVEN_CONES = 0.005;

function trendWords({ conesPerFiring, firings, readings }: KilnTrend, isDated: boolean): string {
  const order = isDated ? '' : ', taken by name: not all have a date';
  const read = `${countOf(readings, 'reading')} in ${countOf(firings, 'load')}`;
  const basis = `(Theil-Sen slope of ${read}${order})`;
  if (Math.abs(conesPerFiring) < EVEN_CONES)
    return `It reads the same from firing to firing ${basis}.`;
  const side = conesPerFiring < 0 ? 'cooler' : 'warmer';
  return `It reads ${fixed(Math.abs(conesPerFiring), 2)} cone ${side} with each firing ${basis}.`;
}

function otherLines(loads: readonly LoadTiles[], { columns }: Look): string[] {
  if (loads.length === 0) return [];
  const rows = loads.map(({ load, tiles }) => {
    return [cutTo(printable(load), 2 * WIDEST_NAME), ...verdictCells(tiles)];
  });
  return alignedLines({
    rows: [['load', ...VERDICT_HEADINGS], ...rows],
    align: ['left', ...rightOf(VERDICT_HEADINGS)],
    indent: INDENT,
    columns,
  });
}

function rightOf(cells: readonly string[]): Align[] {
  return cells.map(() => 'right');
}
