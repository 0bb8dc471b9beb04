import { GENERAL_CAUTIONS } from '../chemistry/hazards.ts';
import type { ModelStamp } from '../predict/answers.ts';
import { point, type Look, type Section } from './page.ts';
import { countOf } from './sentences.ts';
import { wrapped } from './wrapped.ts';

/**
 * How to read the tables of answers; stands above them.
 *
 * @param model - what the answers come from
 * @param look - width of the page
 * @returns the section
 */
export function readingSection({ tiles }: ModelStamp, look: Look): Section {
  const text =
    `From ${countOf(tiles, 'judged tile')}: the chance of each surface, in brackets its 90 % interval, ` +
    'for a load that truly reaches the cone. Distances of tiles are in steps: a step is a change of ' +
    'one oxide worth a new tile, or half a cone.';
  return { lines: [wrapped(text, look)] };
}

/**
 * What holds for every answer; stands below them.
 *
 * @param look - width of the page
 * @returns the section
 */
export function cautionSection(look: Look): Section {
  return { heading: 'Mind', lines: GENERAL_CAUTIONS.map((caution) => point(caution, look)) };
}
