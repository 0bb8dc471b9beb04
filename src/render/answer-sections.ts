import { GENERAL_CAUTIONS } from '../chemistry/hazards.ts';
import type { ModelStamp, UsualFiring } from '../predict/answers.ts';
import { fixed } from './figures.ts';
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
export function readingSection({ tiles, usualFiring }: ModelStamp, look: Look): Section {
  const text =
    `From ${countOf(tiles, 'judged tile')}: the chance of each surface, in brackets its 90 % interval, ` +
    `for a load that truly reaches the cone${firingWords(usualFiring)}. Distances of tiles are in steps: a step is a change of ` +
    'one oxide worth a new tile, or half a cone.';
  return { lines: [wrapped(text, look)] };
}

/**
 * The firing that answers are for, as the end of a sentence.
 *
 * @param usual - where the model knows that it matters
 * @returns words, or nothing
 * @example
 * firingWords({ coolingCPerH: 90, atmosphere: 'oxidation' }); // ', cools at about 90 °C/h, fired in oxidation'
 */
export function firingWords({ coolingCPerH, atmosphere }: UsualFiring = {}): string {
  const cooling =
    coolingCPerH === undefined ? '' : `, cools at about ${fixed(coolingCPerH, 0)} °C/h`;
  return cooling + (atmosphere === undefined ? '' : `, fired in ${atmosphere}`);
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
