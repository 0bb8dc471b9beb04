import type { Point, Prediction, Predictions } from '../predict/answers.ts';
import { cautionSection, readingSection } from './answer-sections.ts';
import { compositionWords } from './composition-words.ts';
import { coneNotes, coneTable, nearestLines } from './cone-table.ts';
import { pageOf, prose, type Look, type Section } from './page.ts';
import { cutTo, printable } from './printable.ts';

/**
 * The page of `predict`: a table for each glaze.
 *
 * @param answers - predictions, in the order of the points, then of the cones
 * @param points - the points that were asked about, in the same order
 * @param look - width and marking
 * @returns the page
 */
export function predictionPage(
  { model, predictions }: Predictions,
  points: readonly Point[],
  look: Look,
): string {
  const cones = points.length === 0 ? 0 : predictions.length / points.length;
  const sections = points.map((point, i) =>
    pointSection(point, predictions.slice(i * cones, (i + 1) * cones), look),
  );
  return pageOf([readingSection(model, look), ...sections, cautionSection(look)], look);
}

function pointSection(
  { point, unity }: Point,
  answers: readonly Prediction[],
  look: Look,
): Section {
  const { head, rows } = coneTable(answers, look);
  return {
    heading: cutTo(printable(point), look.columns),
    lines: [
      prose(compositionWords(unity), look),
      head,
      ...rows,
      ...nearestLines(answers, look),
      ...coneNotes(answers, look),
    ],
  };
}
