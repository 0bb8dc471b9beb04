import type { Boundaries, Boundary, ModelStamp } from '../predict/answers.ts';
import { alignedLines, type Align } from './aligned.ts';
import { cautionSection, firingWords } from './answer-sections.ts';
import { compositionWords } from './composition-words.ts';
import { AXIS_WORDS, digitsAlong, moveSection } from './boundary-moves.ts';
import { nearTileWords } from './cone-table.ts';
import { fixed, percentDigits, placeRange } from './figures.ts';
import { INDENT, pageOf, point, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { countOf } from './sentences.ts';
import { wrapped } from './wrapped.ts';

/** Below this share a line without a crossing is not worth a word. */
const LEAST_SHARE = 0.005;
const WIDEST_NAME = 60;

/**
 * The page of `boundaries`: at each cone, where both boundaries cross each line, and how surely.
 *
 * @param answer - the boundaries
 * @param look - width and marking
 * @returns the page
 */
export function boundaryPage(answer: Boundaries, look: Look): string {
  const { boundaries, notes, model } = answer;
  const cones = [...new Set(boundaries.map(({ cone }) => cone))];
  return pageOf(
    [
      { lines: [wrapped(introduction(answer), look)] },
      ...cones.map((cone) =>
        coneSection(
          boundaries.filter((boundary) => boundary.cone === cone),
          look,
        ),
      ),
      moveSection(boundaries, look),
      { heading: 'Nearest tiles', lines: nearestLines(boundaries, look) },
      { heading: 'How to read it', lines: readingLines(model, look) },
      { heading: 'Notes', lines: notes.map((note) => point(note, look)) },
      cautionSection(look),
    ],
    look,
  );
}

function introduction({ throughSource, through }: Boundaries): string {
  const name = cutTo(printable(throughSource.replace(/^asked: /, '')), WIDEST_NAME);
  return `Lines through ${name}: ${compositionWords(through)}.`;
}

function readingLines({ tiles, usualFiring }: ModelStamp, look: Look): string[] {
  const firing = firingWords(usualFiring);
  const lines = [
    `From ${countOf(tiles, 'judged tile')}. Melt: underfired and melted are as likely as each other. ` +
      `Gloss: of the melted, matte and gloss are.${firing && ` For a load that truly reaches the cone${firing}.`}`,
    'Near: judged tiles within 3 steps of the place (a step is a change of one oxide worth a new ' +
      'tile) and half a cone of the heat. Archive: whether the place lies inside, at the edge or ' +
      'outside what was fired.',
    'An interval that leaves the range looked at says so. "no place": the chance, as the tiles leave ' +
      'it open, that the line does not meet the boundary there.',
  ];
  return lines.map((line) => point(line, look));
}

const HEAD = ['', 'place', 'above it', '90 % interval', 'no place', 'near', 'archive'];
/** The word for the boundary and the gap to what is said of it. */
const KIND_COLUMNS = 7;
const ALIGN: readonly Align[] = ['left', 'right', 'left', 'left', 'right', 'right', 'left'];

function coneSection(boundaries: readonly Boundary[], look: Look): Section {
  const placed = boundaries.filter(({ value }) => value !== null);
  const [head = '', ...rows] = alignedLines({
    rows: [HEAD, ...placed.map(boundaryCells)],
    align: ALIGN,
    indent: 2 * INDENT,
    columns: look.columns,
  });
  // What is held along a line stands above its first row.
  const lines = boundaries.flatMap((boundary, i) => {
    const isFirst = boundaries[i - 1]?.along !== boundary.along;
    const row = boundary.value === null ? noPlace(boundary, look) : rows[placed.indexOf(boundary)]!;
    return [...(isFirst ? [prose(lineWords(boundary), look)] : []), row];
  });
  const shown = placed.length === 0 ? lines : [head, ...lines];
  return { heading: `Cone ${boundaries[0]?.cone ?? ''}`, lines: shown };
}

/** A line that does not meet the boundary, in words. */
function noPlace(boundary: Boundary, { columns }: Look): string {
  const { kind, along, above, interval90, lookedAt, noCrossing } = boundary;
  const show = (place: number) => place.toFixed(digitsAlong(along));
  const [from, to] = lookedAt;
  const isKnown = interval90.some((end) => end !== null);
  const place = isKnown ? `; if there is one, 90 %: ${placeRange(interval90, lookedAt, show)}` : '';
  const text =
    `none from ${show(from)} to ${show(to)}, ${above} all along (chance of none ` +
    `${percentDigits(noCrossing)} %${place})`;
  const first = `${' '.repeat(2 * INDENT)}${kind.padEnd(KIND_COLUMNS)}`;
  return wrapped(text, { columns, first, next: ' '.repeat(first.length) });
}

function lineWords({ along, at }: Boundary): string {
  const held = Object.entries(at).map(([what, value]) => `${heldWord(what)} ${fixed(value, 2)}`);
  return `along ${AXIS_WORDS[along]}, at ${held.join(', ')}`;
}

function heldWord(held: string): string {
  return { SiO2: 'silica', Al2O3: 'alumina' }[held] ?? printable(held);
}

function boundaryCells(boundary: Boundary): string[] {
  const { kind, along, value, interval90, lookedAt, tilesNear, noCrossing } = boundary;
  const { above, support } = boundary;
  const digits = digitsAlong(along);
  const range = placeRange(interval90, lookedAt, (place) => place.toFixed(digits));
  const missing = noCrossing < LEAST_SHARE ? '.' : `${percentDigits(noCrossing)} %`;
  const place = fixed(value, digits);
  return [kind, place, above, range, missing, String(tilesNear), support ?? '-'];
}

/** Nearest tiles named for each place; the JSON has more. */
const SHOWN_NEAREST = 2;

function nearestLines(boundaries: readonly Boundary[], { columns }: Look): string[] {
  return boundaries.flatMap(({ cone, kind, along, value, nearest }) => {
    if (value === null) return [];
    const place = `${AXIS_WORDS[along]} ${fixed(value, digitsAlong(along))}`;
    const tiles = nearest.slice(0, SHOWN_NEAREST).map(nearTileWords);
    const text = `${kind} at ${cone}, ${place}: ${tiles.join(', ') || 'none'}`;
    const first = ' '.repeat(INDENT);
    return [wrapped(text, { columns, first, next: first.repeat(2) })];
  });
}
