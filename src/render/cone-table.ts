import type { ConeAnswer, NearTile } from '../predict/answers.ts';
import { alignedLines, type Align } from './aligned.ts';
import { fixed, probabilityCell } from './figures.ts';
import { INDENT, point, type Look } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { wrapped } from './wrapped.ts';

const HEAD = ['cone', ' underfired', ' matte', ' gloss', 'likeliest', 'archive'];
const ALIGN: readonly Align[] = ['right', 'left', 'left', 'left', 'left', 'left'];
const WIDEST_NAME = 20;

/**
 * The answers for one glaze as a table: a row a cone.
 *
 * @param answers - of one glaze, in the order of the rows
 * @param look - width of the page
 * @returns the headings and one text a cone, of two lines where the page is narrow
 */
export function coneTable(
  answers: readonly ConeAnswer[],
  { columns }: Look,
): { head: string; rows: string[] } {
  const rows = answers.map(({ cone, probability, interval90, surface, support }) => [
    cone,
    probabilityCell(probability.underfired, interval90.underfired),
    probabilityCell(probability.matte, interval90.matte),
    probabilityCell(probability.gloss, interval90.gloss),
    surface,
    support,
  ]);
  const [head = '', ...lines] = alignedLines({
    rows: [HEAD, ...rows],
    align: ALIGN,
    indent: INDENT,
    columns,
  });
  return { head, rows: lines };
}

/**
 * What has to be said about the answers for one glaze: first by cone, then what holds at every cone.
 *
 * @param answers - of one glaze
 * @param look - width of the page
 * @returns list points
 */
export function coneNotes(answers: readonly ConeAnswer[], look: Look): string[] {
  const notes = [...new Set(answers.flatMap((answer) => answer.notes))];
  const conesOf = (note: string) =>
    answers.filter((answer) => answer.notes.includes(note)).map(({ cone }) => cone);
  const general = notes.filter((note) => conesOf(note).length === answers.length);
  const some = notes.filter((note) => !general.includes(note));
  return [
    ...some.map((note) => point(`cone ${conesOf(note).join(', ')}: ${note}`, look)),
    ...general.map((note) => point(note, look)),
  ];
}

/**
 * The nearest tiles, cone by cone.
 *
 * @param answers - of one glaze
 * @param look - width of the page
 * @returns a paragraph a cone
 */
export function nearestLines(answers: readonly ConeAnswer[], look: Look): string[] {
  return answers.map(({ cone, nearest }) => {
    const tiles = nearest.length === 0 ? 'none' : nearest.map(nearTileWords).join(', ');
    const first = `${' '.repeat(INDENT)}nearest at ${cone}: `;
    return wrapped(tiles, {
      columns: look.columns,
      first,
      next: ' '.repeat(2 * INDENT),
    });
  });
}

/**
 * A tile near a glaze: its name, what it was, at which cone, how far off.
 *
 * @param near - the tile
 * @returns such as `H06-19 gloss at 5 (0.4)`
 * @example
 * nearTileWords({ tile: 'H06-19', surface: 'gloss', cone: '5', distance: 0.42 });
 * // 'H06-19 gloss at 5 (0.4)'
 */
export function nearTileWords({ tile, surface, cone, distance }: NearTile): string {
  const name = cutTo(printable(tile), WIDEST_NAME);
  return `${name} ${printable(surface)} at ${cone} (${fixed(distance, 1)})`;
}
