import type { SurfaceProbability } from '../../../src/model/model.ts';
import { chanceOf } from '../studios/chance.ts';
import { FAMILIES } from '../studios/families.ts';
import { ASKED_CONES, SURFACES } from '../studios/learner.ts';
import { askedPoints } from '../studios/points.ts';
import type { Studio, StudioAsked } from '../studios/studio.ts';
import { glazeOf } from '../studios/truths/truth.ts';
import { walk, type ChainLength } from './chain.ts';
import { tilesOf } from './likelihood.ts';
import { scoresOf, walkChance } from './scripted-chance.ts';

/** What the best learner says, and how it came to it. */
export interface BestAnswers {
  /** In the order of the points, then of the cones. */
  readonly probability: readonly SurfaceProbability[];
  readonly accepted: { readonly joint: number; readonly loads: number };
}

const SPARE_SCORES = 8;

/**
 * Answers of a learner that knows the family of the truth, how its parameters are drawn and how studios keep
 * archives, but not what was drawn: the posterior mean of each probability. None can be expected to do better. It
 * takes the compositions as meant for those as weighed.
 *
 * @param asked - which studio
 * @param studio - its archive
 * @param chain - number of the chain: another one walks elsewhere
 * @param length - how long it walks
 * @returns the answers at the asked points and cones
 */
export function bestAnswers(
  { family, seed }: StudioAsked,
  { archive }: Pick<Studio, 'archive'>,
  chain: number,
  length: ChainLength,
): BestAnswers {
  const tiles = tilesOf(archive);
  const chance = walkChance(seed, chain);
  const drawn = scoresOf(chanceOf(seed, 'truth'), FAMILIES[family]);
  // A family that decides between two forms takes more numbers for one of them.
  const spare = Array.from({ length: SPARE_SCORES }, () => chance.normal());
  const start = {
    truth: Float64Array.from([...drawn, ...spare]),
    habits: new Float64Array(3),
    loads: new Float64Array(2 * tiles.ofLoad.length),
  };
  const glazes = askedPoints(seed).map(glazeOf);
  const sums = glazes.flatMap(() => ASKED_CONES.map(() => ({ underfired: 0, matte: 0, gloss: 0 })));
  let kept = 0;
  const accepted = walk(FAMILIES[family], tiles, start, chance, length, ({ truth }) => {
    kept++;
    glazes.forEach((glaze, i) => {
      ASKED_CONES.forEach((cone, c) => {
        const melted = truth.melted(glaze, cone);
        const glossy = truth.glossy(glaze, cone, 0);
        const sum = sums[i * ASKED_CONES.length + c];
        sum.underfired += 1 - melted;
        sum.matte += melted * (1 - glossy);
        sum.gloss += melted * glossy;
      });
    });
  });
  const probability = sums.map((sum) => {
    const mean = { ...sum };
    for (const surface of SURFACES) mean[surface] /= kept;
    return mean;
  });
  return { probability, accepted };
}
