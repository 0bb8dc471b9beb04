import type { ConeAnswer, PointShift, Shift, Turn } from '../predict/answers.ts';
import { cautionSection, readingSection } from './answer-sections.ts';
import { compositionWords } from './composition-words.ts';
import { coneNotes, coneTable, nearestLines, nearTileWords } from './cone-table.ts';
import { coneTenths, percentDigits, placeRange } from './figures.ts';
import { pageOf, point, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';
import { countOf } from './sentences.ts';
import { wrapped } from './wrapped.ts';

/** Overfired tiles named; all are counted. */
const SHOWN_OVERFIRED = 3;
/** Below this share a place without a turn is not worth a word. */
const LEAST_SHARE = 0.005;

/**
 * The page of `shift`: for each glaze a row a cone, in between where it turns, and what it means.
 *
 * @param answers - how the points move
 * @param look - width and marking
 * @returns the page
 */
export function shiftPage({ model, points }: Shift, look: Look): string {
  const sections = points.map((shifted) => pointSection(shifted, look));
  return pageOf([readingSection(model, look), ...sections, cautionSection(look)], look);
}

function pointSection(shifted: PointShift, look: Look): Section {
  const { point: name, unity, cones, words } = shifted;
  return {
    heading: cutTo(printable(name), look.columns),
    lines: [
      prose(compositionWords(unity), look),
      ...tableWithTurns(shifted, look),
      prose(`In words: ${words}.`, look),
      ...noTurnWords(shifted, look),
      ...nearestLines(cones, look),
      ...coneNotes(cones, look),
      ...overfiredWords(shifted, look),
    ],
  };
}

/** The table of cones, each turn between the rows where it happens. */
function tableWithTurns({ cones, turns, lookedAt }: PointShift, look: Look): string[] {
  const { head, rows } = coneTable(cones, look);
  const between = (low: number, high: number) =>
    turns
      .filter(({ coneIndex }) => coneIndex > low && coneIndex <= high)
      .map((turn) => turnText(turn, lookedAt, look));
  const lines = cones.flatMap((answer, i) => [
    ...between(cones[i - 1]?.coneIndex ?? -Infinity, answer.coneIndex),
    rows[i]!,
  ]);
  return [head, ...lines, ...between(hottest(cones), Infinity)];
}

function hottest(cones: readonly ConeAnswer[]): number {
  return cones.at(-1)?.coneIndex ?? -Infinity;
}

function turnText(turn: Turn, lookedAt: readonly [number, number], { columns }: Look): string {
  const { from, to, coneIndex, interval90, noCrossing } = turn;
  const range = placeRange(interval90, lookedAt, coneTenths);
  const doubt = noCrossing < LEAST_SHARE ? '' : `; no such turn: ${percentDigits(noCrossing)} %`;
  const text = `turns from ${from} to ${to} at ${coneTenths(coneIndex)} (90 %: ${range}${doubt})`;
  return wrapped(text, { columns, first: ' '.repeat(8), next: ' '.repeat(10) });
}

function noTurnWords({ turns, lookedAt }: PointShift, look: Look): string[] {
  if (turns.length > 0) return [];
  const [low, high] = lookedAt.map(coneTenths);
  return [prose(`No turn between cone ${low ?? ''} and cone ${high ?? ''}.`, look)];
}

function overfiredWords({ overfiredNear }: PointShift, look: Look): string[] {
  if (overfiredNear.length === 0) return [];
  const named = overfiredNear.slice(0, SHOWN_OVERFIRED).map(nearTileWords).join(', ');
  const left = overfiredNear.length - SHOWN_OVERFIRED;
  const more = left > 0 ? ` and ${left} more` : '';
  return [
    point(`${countOf(overfiredNear.length, 'overfired tile')} near it: ${named}${more}`, look),
  ];
}
