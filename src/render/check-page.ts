import type { ArchiveReading } from '../archive/archive.ts';
import type { ConeTiles, Inventory, MeasureRange } from '../archive/inventory.ts';
import type { Measure } from '../archive/measures.ts';
import { faultLine, type Fault } from '../errors.ts';
import { alignedLines } from './aligned.ts';
import { countsLine } from './counts-line.ts';
import { fixed } from './figures.ts';
import { kilnSections } from './kiln-sections.ts';
import { INDENT, pageOf, point, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { countOf, grouped, listOf } from './sentences.ts';
import { countCell } from './verdict-cells.ts';
import { wrapped } from './wrapped.ts';

/** Recipes named in the page; all are in the JSON. */
const SHOWN_RECIPES = 5;
const WIDEST_NAME = 24;

/**
 * The page of `check`: what was read, what is in it, what looks odd, what is wrong.
 *
 * Faults come last, where a terminal stops scrolling; the first line counts them.
 *
 * @param reading - archive and faults
 * @param held - its inventory
 * @param look - width and marking
 * @returns the page
 */
export function checkPage(reading: ArchiveReading, held: Inventory, look: Look): string {
  const { archive, faults } = reading;
  const sections: Section[] = [
    { lines: [wrapped(countsLine(archive.counts), look), ...verdictOnFaults(reading)] },
    { heading: 'Files', lines: fileLines(reading) },
    { heading: 'As it was understood', lines: archive.notes.map((note) => point(note, look)) },
    { heading: 'Tiles by cone and surface', lines: coneLines(held.byCone, look) },
    ...kilnSections(held, look),
    { heading: 'Composition of the tiles', lines: compositionLines(held, look) },
    { heading: 'Recipes', lines: recipeLines(held, look) },
    { heading: 'Worth a second look', lines: oddLines(held, look) },
    { heading: `Faults: ${grouped(faults.length)}`, lines: faults.map((f) => faultText(f, look)) },
  ];
  return pageOf(sections, look);
}

/**
 * A fault on as few lines as the page allows.
 *
 * @param fault - the fault
 * @param look - width of the page
 * @returns its text, set in, further lines further in
 * @example
 * faultText({ file: 'tiles.csv', line: 3, column: 'cone', message: 'expected a cone' }, PLAIN_LOOK);
 * // '  tiles.csv:3 cone: expected a cone'
 */
export function faultText(fault: Fault, { columns }: Look): string {
  const first = ' '.repeat(INDENT);
  return wrapped(printable(faultLine(fault)), { columns, first, next: first.repeat(2) });
}

function verdictOnFaults({ archive, faults }: ArchiveReading): string[] {
  if (faults.length > 0) {
    return [`${countOf(faults.length, 'fault')}, listed at the end; mend them, then fit.`];
  }
  if (archive.counts.fitted > 0) return ['No faults: the archive can be fitted.'];
  return [
    'No faults, but no judged tile: fit will answer from the prior alone, from what is',
    'usual elsewhere; nothing is learnt yet.',
  ];
}

function fileLines({ archive }: ArchiveReading): string[] {
  const rows = archive.files.map(({ file, rows: count }) => {
    return [printable(file), grouped(count), count === 1 ? 'row' : 'rows'];
  });
  return alignedLines({ rows, align: ['left', 'right'], indent: INDENT, gap: 1 });
}

function coneLines(byCone: readonly ConeTiles[], look: Look): string[] {
  if (byCone.length === 0) return [];
  const head = ['cone', 'all', 'underfired', 'matte', 'gloss', 'melted', 'overfired', 'unjudged'];
  const cells = ({ tiles: t }: ConeTiles) =>
    [t.all, t.underfired, t.matte, t.gloss, t.melted, t.overfired, t.unjudged].map(countCell);
  const rows = byCone.map((row) => [row.cone ?? 'unknown', ...cells(row)]);
  const table = alignedLines({
    rows: [head, ...rows],
    align: ['left', ...head.slice(1).map(() => 'right' as const)],
    indent: INDENT,
    columns: look.columns,
  });
  const note =
    'Loads between two cones count to the nearer, half way (6.5) to the hotter. "melted" is known to have melted and no more.';
  return [...table, prose(note, look)];
}

const MEASURE_WORDS: Readonly<Record<Measure, string>> = {
  SiO2: 'silica',
  Al2O3: 'alumina',
  B2O3: 'boric oxide',
  alkaliShare: 'alkali share',
  'SiO2:Al2O3': 'SiO2:Al2O3',
};

function compositionLines({ ranges, otherOxides }: Inventory, look: Look): string[] {
  if (ranges.length === 0) return [];
  const head = ['mol per mol flux', 'lowest', '5 %', 'middle', '95 %', 'highest'];
  const cells = (range: MeasureRange) => {
    const digits = range.measure === 'SiO2:Al2O3' ? 1 : 2;
    const { lowest, quantile05, median, quantile95, highest } = range;
    return [lowest, quantile05, median, quantile95, highest].map((value) => fixed(value, digits));
  };
  const rows = ranges.map((range) => [MEASURE_WORDS[range.measure], ...cells(range)]);
  const table = alignedLines({
    rows: [head, ...rows],
    align: ['left', ...head.slice(1).map(() => 'right' as const)],
    indent: INDENT,
    columns: look.columns,
  });
  const others = otherOxides.map(({ oxide, tiles, highest }) => {
    return `${oxide} up to ${fixed(highest, 2)} (${countOf(tiles, 'tile')})`;
  });
  return others.length === 0 ? table : [...table, prose(`Also ${others.join(', ')}.`, look)];
}

function recipeLines({ recipes }: Inventory, look: Look): string[] {
  if (recipes.length === 0) return [];
  const fired = recipes.filter(({ tiles }) => tiles > 0);
  const named = fired.slice(0, SHOWN_RECIPES).map(({ recipe, tiles, loads }) => {
    const name = cutTo(printable(recipe), WIDEST_NAME);
    return `${name} (${countOf(tiles, 'tile')} in ${countOf(loads, 'load')})`;
  });
  const unfired = recipes.length - fired.length;
  const never = unfired === 0 ? 'each on some tile' : `${grouped(unfired)} on no tile`;
  const most = named.length === 0 ? '' : `; most fired: ${listOf(named)}`;
  return [prose(`${countOf(recipes.length, 'recipe')}, ${never}${most}.`, look)];
}

function oddLines({ odd }: Inventory, look: Look): string[] {
  return odd.length === 0
    ? [prose('Nothing stands out.', look)]
    : odd.map((one) => point(one, look));
}
