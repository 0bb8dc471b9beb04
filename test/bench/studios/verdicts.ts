import type { Surface } from '../../../src/model/model.ts';
import { chanceOf, happens, oneOf } from './chance.ts';

type Confusion = readonly [truly: Surface, word: Surface];

const MATTE_AND_UNDERFIRED: readonly Confusion[] = [
  ['matte', 'underfired'],
  ['underfired', 'matte'],
];
const OTHER_CONFUSIONS: readonly Confusion[] = [
  ['gloss', 'matte'],
  ['matte', 'gloss'],
  ['gloss', 'underfired'],
  ['underfired', 'gloss'],
];

/**
 * What the studio writes down: a share of the verdicts is wrong, half of these confuse matte and
 * underfired as long as there are such tiles.
 *
 * @param surfaces - as the tiles truly are
 * @param wrongShare - of all verdicts
 * @param seed - which studio
 * @returns the words written, in the same order
 */
export function writtenVerdicts(
  surfaces: readonly Surface[],
  wrongShare: number,
  seed: number,
): Surface[] {
  const chance = chanceOf(seed, 'labels', surfaces.length);
  const written = [...surfaces];
  const wrong = new Set<number>();
  // Rounded by chance, so that a small archive has its share of wrong labels on average.
  const count = Math.floor(wrongShare * surfaces.length + chance.uniform());
  for (let tries = 0; wrong.size < count && tries < 20 * count; tries++) {
    const confusions = happens(chance, 0.5) ? MATTE_AND_UNDERFIRED : OTHER_CONFUSIONS;
    const [truly, word] = oneOf(chance, confusions);
    const open = surfaces.flatMap((surface, i) => (surface === truly && !wrong.has(i) ? [i] : []));
    if (open.length === 0) continue;
    const chosen = oneOf(chance, open);
    wrong.add(chosen);
    written[chosen] = word;
  }
  return written;
}
