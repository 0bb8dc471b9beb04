import type { UnvalidatedModel } from '../model/fit.ts';
import { hazardNotes } from '../chemistry/hazards.ts';
import { OXIDE_STEP } from '../chemistry/oxide-steps.ts';
import { OXIDES } from '../chemistry/oxides.ts';
import type { Unity } from '../chemistry/unity.ts';
import { coneText } from '../firing/cone.ts';
import { hasColumn } from '../model/inputs.ts';
import { stageLogOdds, surfaceProbability } from '../model/log-odds.ts';
import { SURFACES, type Surface, type SurfaceProbability } from '../model/model.ts';
import { isJudged } from '../model/stages.ts';
import {
  probabilityQuantile,
  productQuantile,
  type GaussianLogOdds,
} from '../numeric/logistic-normal.ts';
import type {
  ConeAnswer,
  Interval90,
  ModelStamp,
  Point,
  Prediction,
  Predictions,
  SurfaceInterval90,
  UsualFiring,
} from './answers.ts';
import {
  EDGE_STEPS,
  experienceOf,
  judgedCones,
  placeInSteps,
  surroundings,
  type Experience,
  type JudgedCones,
  type Surroundings,
} from './experience.ts';

/**
 * Surface probabilities of each point at each cone.
 *
 * For a load that truly reaches the cone: a load's own error is not in it. Each answer depends on
 * its own point and cone only.
 *
 * @param model - fitted model
 * @param points - compositions
 * @param coneIndexes - cones as numbers
 * @returns answers in the order of the points, then of the cones
 */
export function predict(
  model: UnvalidatedModel,
  points: readonly Point[],
  coneIndexes: readonly number[],
): Predictions {
  const { schema, model: stamp, predictions } = predictEach(model, points, coneIndexes);
  return { schema, model: stamp, predictions: [...predictions] };
}

/** As Predictions, but each answer is made when it is read; to be read once. */
export interface PredictionsOneByOne extends Omit<Predictions, 'predictions'> {
  readonly predictions: Iterable<Prediction>;
}

/**
 * The same answers, each made when it is read: a hundred thousand need not be held at a time.
 *
 * @param model - fitted model
 * @param points - compositions, in a list of any kind
 * @param coneIndexes - cones as numbers
 * @returns answers in the order of the points, then of the cones
 */
export function predictEach(
  model: UnvalidatedModel,
  points: Iterable<Point>,
  coneIndexes: readonly number[],
): PredictionsOneByOne {
  return {
    schema: 'coneshift.predictions/1',
    model: modelStamp(model),
    predictions: eachPrediction(model, points, coneIndexes),
  };
}

function* eachPrediction(
  model: UnvalidatedModel,
  points: Iterable<Point>,
  coneIndexes: readonly number[],
): Generator<Prediction> {
  const experience = judgedExperience(model);
  for (const point of points) {
    for (const answer of coneAnswers(model, experience, point, coneIndexes)) {
      yield { point: point.point, ...answer };
    }
  }
}

/**
 * The judged tiles of a model, ready to be compared with points.
 *
 * @param model - fitted model
 * @returns its experience
 */
export function judgedExperience(model: UnvalidatedModel): Experience {
  return experienceOf(model.archive.tiles.filter(isJudged));
}

/**
 * What every answer says of the model it comes from.
 *
 * @param model - fitted model
 * @returns tiles fitted, the archive's fingerprint and the firing that answers are for
 */
export function modelStamp({ archive, firingEffects = [] }: UnvalidatedModel): ModelStamp {
  const usual = firingEffects.map((effect) =>
    effect.column === 'cooling'
      ? { coolingCPerH: effect.usualCPerH }
      : { atmosphere: effect.usual },
  );
  return {
    tiles: archive.counts.fitted,
    archive: archive.fingerprint,
    ...(usual.length > 0 && { usualFiring: Object.assign({}, ...usual) as UsualFiring }),
  };
}

/**
 * Answers for one point.
 *
 * @param model - fitted model
 * @param experience - its judged tiles
 * @param point - composition
 * @param coneIndexes - cones as numbers
 * @returns one answer a cone
 */
export function coneAnswers(
  model: UnvalidatedModel,
  experience: Experience,
  { unity }: Point,
  coneIndexes: readonly number[],
): ConeAnswer[] {
  const place = placeInSteps(experience, unity);
  const hazards = [...unmodelledNotes(unity), ...hazardNotes(unity)];
  return coneIndexes.map((coneIndex) => {
    const melt = stageLogOdds(model.melt, unity, coneIndex);
    const gloss = stageLogOdds(model.gloss, unity, coneIndex);
    const probability = surfaceProbability(melt, gloss);
    const interval90 = surfaceIntervals(melt, gloss);
    const around = surroundings(experience, place, coneIndex);
    return {
      cone: coneText(coneIndex),
      coneIndex,
      surface: mostProbable(probability),
      probability,
      interval90,
      support: around.support,
      nearest: around.nearest,
      notes: [
        ...supportNotes(around),
        ...(around.hasSuchHere ? [] : heatNotes(judgedCones(experience, place), coneIndex)),
        ...tailNotes(probability, interval90),
        ...hazards,
      ],
    };
  });
}

/**
 * The most probable surface.
 *
 * @param probability - of each surface
 * @returns the surface; of equal ones the less melted
 * @example
 * mostProbable({ underfired: 0.2, matte: 0.3, gloss: 0.5 }); // 'gloss'
 */
export function mostProbable(probability: SurfaceProbability): Surface {
  return SURFACES.reduce((best, next) => (probability[next] > probability[best] ? next : best));
}

/**
 * 90 % interval of the probability of each surface under the posterior.
 *
 * For matte and gloss it is the quantile of the product of the two stages.
 *
 * @param melt - log-odds of melted
 * @param gloss - log-odds of gloss given melted
 * @returns 5 and 95 % quantiles
 * @example
 * surfaceIntervals({ mean: 0, sd: 1 }, { mean: 40, sd: 0 }).underfired[1]; // ~0.8382
 */
export function surfaceIntervals(melt: GaussianLogOdds, gloss: GaussianLogOdds): SurfaceInterval90 {
  const turned = ({ mean, sd }: GaussianLogOdds) => ({ mean: -mean, sd });
  const both = (quantile: (p: number) => number): Interval90 => [quantile(0.05), quantile(0.95)];
  return {
    underfired: both((p) => probabilityQuantile(turned(melt), p)),
    matte: both((p) => productQuantile(melt, turned(gloss), p)),
    gloss: both((p) => productQuantile(melt, gloss, p)),
  };
}

function supportNotes({ support, tilesWithinEdge }: Surroundings): string[] {
  if (support === 'inside') return [];
  const count = tilesWithinEdge();
  const tiles = count === 1 ? '1 judged tile' : `${count} judged tiles`;
  const within = `${tiles} within ${EDGE_STEPS} steps`;
  return support === 'edge'
    ? [`at the edge of the archive (${within}, too few of them close): fire a tile first`]
    : [`outside the archive (${within}): carried over from tiles farther off`];
}

/** Oxides of the glaze asked about that matter by a step or more, and that no column stands for. */
function unmodelledNotes(unity: Unity): string[] {
  const held = OXIDES.filter(
    (oxide) => !hasColumn(oxide) && (unity[oxide] ?? 0) >= OXIDE_STEP[oxide],
  );
  if (held.length === 0) return [];
  return [
    `holds ${held.join(', ')}: what ${held.length === 1 ? 'it does' : 'they do'} is not in these chances`,
  ];
}

/** Half a per cent: less is not seen on a page. */
const SEEN_OFF = 0.005;

/** A mean can lie off its own interval where the log-odds are far from 0 and hardly known. */
function tailNotes(probability: SurfaceProbability, interval90: SurfaceInterval90): string[] {
  const off = SURFACES.filter(
    (s) =>
      probability[s] < interval90[s][0] - SEEN_OFF || probability[s] > interval90[s][1] + SEEN_OFF,
  );
  if (off.length === 0) return [];
  return [
    `the chance of ${off.join(' and that of ')} lies off its interval: it is a mean of many small chances ` +
      'and a few large ones, so far is this from any tile',
  ];
}

/** Heat beyond the tiles of glazes like this one: what is not modelled there. */
function heatNotes(judged: JudgedCones | undefined, coneIndex: number): string[] {
  if (judged === undefined) return ['no judged tile at all: this is what is usual elsewhere'];
  const { coolest, hottest, ofSuch } = judged;
  if (coneIndex >= coolest && coneIndex <= hottest) return [];
  const like = ofSuch ? 'tile of such a glaze' : 'tile';
  if (coneIndex < coolest)
    return [`cooler than the coolest judged ${like} (cone ${coneText(coolest)})`];
  return [
    `hotter than the hottest judged ${like} (cone ${coneText(hottest)}): running and blistering ` +
      'are not modelled; fire on a catcher',
  ];
}
