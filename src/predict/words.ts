import type { Surface, SurfaceProbability } from '../model/model.ts';
import type { ConeAnswer } from './answers.ts';
import { SURFACES } from '../model/model.ts';

/** From these probabilities on the words are surer. */
const SURE = 0.9;
const LIKELY = 0.7;
/** Two surfaces this close are called as likely as each other. */
const EQUAL = 0.1;

/**
 * What happens to a glaze from cone to cone, in a sentence.
 *
 * @param answers - one a cone, from cool to hot
 * @returns words such as 'gloss at 6 and 7; at 5 as likely underfired as gloss'
 */
export function shiftInWords(answers: readonly ConeAnswer[]): string {
  const groups: { cones: string[]; words: string }[] = [];
  for (const { cone, probability, support } of answers) {
    const words =
      surfaceInWords(probability) + (support === 'outside' ? ' (outside the archive)' : '');
    const last = groups.at(-1);
    if (last?.words === words) last.cones.push(cone);
    else groups.push({ cones: [cone], words });
  }
  return groups.map(({ cones, words }) => `at ${listed(cones)} ${words}`).join('; ');
}

/**
 * A glaze's surface in words, as sure as the probabilities are.
 *
 * @param probability - of each surface
 * @returns a few words without the cone
 * @example
 * surfaceInWords({ underfired: 0.02, matte: 0.03, gloss: 0.95 }); // 'almost surely gloss'
 * surfaceInWords({ underfired: 0.47, matte: 0.06, gloss: 0.47 });
 * // 'as likely underfired as gloss'
 */
export function surfaceInWords(probability: SurfaceProbability): string {
  const [first, second, third] = [...SURFACES].sort((a, b) => probability[b] - probability[a]) as [
    Surface,
    Surface,
    Surface,
  ];
  const lead = probability[first] - probability[second];
  if (probability[first] >= SURE) return `almost surely ${first}`;
  if (probability[first] >= LIKELY) return `most likely ${first}`;
  if (probability[first] - probability[third] <= EQUAL)
    return 'any surface about as likely as another';
  if (lead <= EQUAL) return `as likely ${inOrder(first, second).join(' as ')}`;
  return `rather ${first} than ${second}, but far from sure`;
}

function inOrder(...surfaces: Surface[]): Surface[] {
  return SURFACES.filter((surface) => surfaces.includes(surface));
}

function listed(words: readonly string[]): string {
  const last = words.at(-1) ?? '';
  return words.length < 2 ? last : `${words.slice(0, -1).join(', ')} and ${last}`;
}
