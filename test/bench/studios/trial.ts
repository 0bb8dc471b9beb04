import type { SurfaceProbability } from '../../../src/model/model.ts';
import { boundaryPlaceError } from './boundary-place.ts';
import { ASKED_CONES } from './learner.ts';
import { LEARNERS } from './learners.ts';
import { measured, type Measured } from './measures.ts';
import { askedPoints } from './points.ts';
import { drawStudio, type Studio, type StudioAsked } from './studio.ts';
import { trueProbability } from './truths/truth.ts';

/** How one learner did on one studio, with the time it took. */
export interface LearnerTrial extends Measured {
  readonly learner: string;
  /** Mean error of the melt boundary along alumina, mol; null where the truth has none. */
  readonly placeError: number | null;
  readonly fitMs: number;
  /** Of all points at all asked cones. */
  readonly predictMs: number;
}

/** All learners on one studio. */
export interface Trial extends StudioAsked {
  readonly drawMs: number;
  readonly learners: readonly LearnerTrial[];
}

/**
 * Draws a studio and lets every learner have its archive.
 *
 * @param asked - which studio
 * @param learners - names of learners
 * @returns how each did
 */
export function trial(asked: StudioAsked, learners: readonly string[]): Trial {
  const from = performance.now();
  const studio = drawStudio(asked);
  const drawMs = performance.now() - from;
  const truths = truthsOf(studio, asked.seed);
  return {
    ...asked,
    drawMs,
    learners: learners.map((learner) => learnerTrial(learner, studio, truths, asked.seed)),
  };
}

/**
 * True probabilities at the asked points and cones.
 *
 * @param studio - with its truth
 * @param seed - of the points
 * @returns in the order of the points, then of the cones
 */
export function truthsOf({ truth }: Pick<Studio, 'truth'>, seed: number): SurfaceProbability[] {
  return askedPoints(seed).flatMap((unity) =>
    ASKED_CONES.map((cone) => trueProbability(truth, unity, cone)),
  );
}

function learnerTrial(
  learner: string,
  { truth, archive }: Studio,
  truths: readonly SurfaceProbability[],
  seed: number,
): LearnerTrial {
  if (!Object.hasOwn(LEARNERS, learner)) throw new RangeError(`no learner ${learner}`);
  const from = performance.now();
  const learned = LEARNERS[learner](archive);
  const fitted = performance.now();
  const answers = learned(askedPoints(seed), ASKED_CONES);
  const answered = performance.now();
  return {
    learner,
    ...measured(truths, answers, archive),
    placeError: boundaryPlaceError(truth, archive, learned),
    fitMs: fitted - from,
    predictMs: answered - fitted,
  };
}
