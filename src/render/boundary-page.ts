import type { Boundaries, Boundary } from '../predict/answers.ts';
import { alignedLines, type Align } from './aligned.ts';
import { cautionSection } from './answer-sections.ts';
import { compositionWords } from './composition-words.ts';
import { AXIS_WORDS, digitsAlong, moveSection } from './boundary-moves.ts';
import { nearTileWords } from './cone-table.ts';
import { fixed, percentDigits, placeRange } from './figures.ts';
import { INDENT, pageOf, point, type Look, type Section } from './page.ts';
import { printable } from './printable.ts';
import { countOf } from './sentences.ts';
import { wrapped } from './wrapped.ts';

/** Below this share a line without a crossing is not worth a word. */
const LEAST_SHARE = 0.005;

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
      { lines: [wrapped(printable(introduction(answer)), look)] },
      ...cones.map((cone) => coneSection(boundaries.filter((boundary) => boundary.cone === cone))),
      moveSection(boundaries),
      { heading: 'Nearest tiles', lines: nearestLines(boundaries, look) },
      { heading: 'How to read it', lines: readingLines(model.tiles, look) },
      { heading: 'Notes', lines: notes.map((note) => point(note, look)) },
      cautionSection(look),
    ],
    look,
  );
}

function introduction({ throughSource, through }: Boundaries): string {
  return `Lines through ${throughSource.replace(/^asked: /, '')}: ${compositionWords(through)}.`;
}

function readingLines(tiles: number, look: Look): string[] {
  const lines = [
    `From ${countOf(tiles, 'judged tile')}. Melt: underfired and melted are as likely as each other. ` +
      'Gloss: of the melted, matte and gloss are.',
    'Near: judged tiles within 3 steps of the place (a step is a change of one oxide worth a new ' +
      'tile) and half a cone of the heat. Archive: whether the place lies inside, at the edge or ' +
      'outside what was fired.',
    'An interval that leaves the range looked at says so. "no place" counts the part of the posterior ' +
      'in which the line does not meet the boundary there.',
  ];
  return lines.map((line) => point(line, look));
}

const HEAD = ['', 'place', 'above it', '90 % interval', 'no place', 'near', 'archive'];
const ALIGN: readonly Align[] = ['left', 'right', 'left', 'left', 'right', 'right', 'left'];

function coneSection(boundaries: readonly Boundary[]): Section {
  const [head = '', ...rows] = alignedLines({
    rows: [HEAD, ...boundaries.map(boundaryCells)],
    align: ALIGN,
    indent: 2 * INDENT,
  });
  // What is held along a line stands above its first row.
  const lines = boundaries.flatMap((boundary, i) => {
    const isFirst = boundaries[i - 1]?.along !== boundary.along;
    return [...(isFirst ? [`${' '.repeat(INDENT)}${lineWords(boundary)}`] : []), rows[i]!];
  });
  return { heading: `Cone ${boundaries[0]?.cone ?? ''}`, lines: [head, ...lines] };
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
  if (value === null) return [kind, 'none', `all ${above}`, range, missing];
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
