// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
import type { Archive, Tile } from '../../../src/archive/archive.ts';
import type { Unity } from '../../../src/chemistry/unity.ts';
import { dot, quadraticForm } from '../../../src/numeric/linalg.ts';
import {
  averagedProbability,
  probabilityQuantile,
  productQuantile,
  type GaussianLogOdds,
} from '../../../src/numeric/logistic-normal.ts';
import type { Interval90, Learned, PointAnswer } from '../studios/learner.ts';
import { evidenceFit } from './evidence.ts';
import { columnValues, scaledInputs } from './inputs.ts';
import { GLOSS_PRIOR, MELT_PRIOR, priorColumns, type StagePrior } from './priors.ts';

/** A Gaussian posterior over the weights of a stage's columns. */
interface FittedStage {
  readonly columns: readonly string[];
  readonly mean: readonly number[];
  readonly covarianceLower: readonly number[];
}

/**
 * The model as it was at the start: two logistic stages with fixed columns, one free intercept per load
 * and stage, sds re-estimated, Laplace's approximation.
 *
 * @param archive - archive as read
 * @returns answers for points at cones
 */
export function startingPoint(archive: Archive): Learned {
  const tiles = archive.tiles
    .filter(({ heat, verdict }) => heat && verdict !== 'unjudged' && verdict !== 'overfired')
    .sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const melted = tiles.filter(({ verdict }) => verdict === 'matte' || verdict === 'gloss');
  const melt = fittedStage(MELT_PRIOR, tiles, ({ verdict }) => verdict !== 'underfired');
  const gloss = fittedStage(GLOSS_PRIOR, melted, ({ verdict }) => verdict === 'gloss');
  return (points, coneIndexes) =>
    points.flatMap((unity) =>
      coneIndexes.map((coneIndex) =>
        answerOf(logOdds(melt, unity, coneIndex), logOdds(gloss, unity, coneIndex)),
      ),
    );
}

function fittedStage(
  prior: StagePrior,
  tiles: readonly Tile[],
  yes: (tile: Tile) => boolean,
): FittedStage {
  const columns = priorColumns(prior);
  const loads = [...new Set(tiles.map(({ load }) => load))];
  const loadNumber = new Map(loads.map((load, l) => [load, l]));
  const data = {
    rows: tiles.map(({ unity, heat }) =>
      columnValues(scaledInputs(unity, heat!.coneIndex), columns),
    ),
    outcome: tiles.map((tile) => (yes(tile) ? 1 : 0)),
    load: tiles.map(({ load }) => loadNumber.get(load)!),
  };
  const { mean, covarianceLower } = evidenceFit(data, prior).posterior;
  return { columns, mean, covarianceLower };
}

function logOdds(stage: FittedStage, unity: Unity, coneIndex: number): GaussianLogOdds {
  const row = columnValues(scaledInputs(unity, coneIndex), stage.columns);
  const variance = quadraticForm(stage.covarianceLower, row);
  return { mean: dot(stage.mean, row), sd: Math.sqrt(Math.max(0, variance)) };
}

function answerOf(melt: GaussianLogOdds, gloss: GaussianLogOdds): PointAnswer {
  const turned = ({ mean, sd }: GaussianLogOdds) => ({ mean: -mean, sd });
  const both = (quantile: (p: number) => number): Interval90 => [quantile(0.05), quantile(0.95)];
  const average = ({ mean, sd }: GaussianLogOdds) => averagedProbability(mean, sd);
  const melted = average(melt);
  return {
    probability: {
      underfired: average(turned(melt)),
      matte: melted * average(turned(gloss)),
      gloss: melted * average(gloss),
    },
    interval90: {
      underfired: both((p) => probabilityQuantile(turned(melt), p)),
      matte: both((p) => productQuantile(melt, turned(gloss), p)),
      gloss: both((p) => productQuantile(melt, gloss, p)),
    },
  };
}
