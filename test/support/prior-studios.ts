import type { Tile, Verdict } from '../../src/archive/archive.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import { startingSds } from '../../src/model/evidence.ts';
import type { UnvalidatedModel } from '../../src/model/fit.ts';
import { columnValues, scaledInputs } from '../../src/model/inputs.ts';
import { priorColumns, type StagePrior } from '../../src/model/priors.ts';
import {
  fitStages,
  isJudged,
  STAGE_PRIOR,
  stageOf,
  type StageName,
} from '../../src/model/stages.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import type { Generator } from '../../src/numeric/random.ts';
import { aHeat, anArchive, aTile } from './builders.ts';
import { drawnUnity } from './invented-tiles.ts';

/** Sds of the prior, held: truth and fit then agree on them. */
const START_SDS = {
  melt: startingSds(STAGE_PRIOR.melt),
  gloss: startingSds(STAGE_PRIOR.gloss),
};

/** An invented studio whose truth is drawn from the model's own prior, and the model it leads to. */
export interface PriorStudio {
  readonly model: UnvalidatedModel;
  readonly tiles: readonly Tile[];
  /** True log-odds of a load that truly reaches the cone. */
  readonly truth: (stage: StageName, unity: Unity, cone: number) => number;
}

/**
 * If the answers mean what they say, a 90 % interval holds the truth of such studios 90 times in 100:
 * truth and tiles are drawn from the very distribution that the fit assumes.
 */
export function priorStudio(source: Generator, tileCount: number): PriorStudio {
  const weights = { melt: drawnWeights('melt', source), gloss: drawnWeights('gloss', source) };
  const columns = { melt: priorColumns(STAGE_PRIOR.melt), gloss: priorColumns(STAGE_PRIOR.gloss) };
  const truth = (stage: StageName, unity: Unity, cone: number) =>
    columnValues(scaledInputs(unity, cone), columns[stage]).reduce(
      (sum, value, j) => sum + value * weights[stage][j],
      0,
    );
  const tiles = drawnTiles(truth, source, tileCount);
  const fits = fitStages(tiles.filter(isJudged), { heldSds: START_SDS });
  const none = new Set<string>();
  const model: UnvalidatedModel = {
    schema: 'coneshift.model/1',
    madeBy: 'test',
    archive: anArchive(tiles),
    melt: stageOf('melt', fits.melt, none),
    gloss: stageOf('gloss', fits.gloss, none),
  };
  return { model, tiles, truth };
}

function drawnWeights(stage: StageName, { normal }: Generator): number[] {
  const prior: StagePrior = STAGE_PRIOR[stage];
  return prior.groups.flatMap(({ means, startSd }) =>
    Object.values(means).map((mean) => mean + startSd * normal()),
  );
}

const CONE_OF_LOAD = ['5', '6', '6', '7', '5', '6', '6', '7'];

function drawnTiles(truth: PriorStudio['truth'], source: Generator, count: number): Tile[] {
  const { normal, uniform } = source;
  const errors = CONE_OF_LOAD.map((_, l) => ({
    melt: STAGE_PRIOR.melt.startLoadSd * normal(),
    gloss: STAGE_PRIOR.gloss.startLoadSd * normal(),
    firing: `L${l}`,
  }));
  return Array.from({ length: count }, (_, i) => {
    const l = i % errors.length;
    const heat = aHeat(CONE_OF_LOAD[l], 'firing');
    const unity = drawnUnity(source);
    const isYes = (stage: StageName) =>
      uniform() < sigmoid(truth(stage, unity, heat.coneIndex) + errors[l][stage]);
    const verdict: Verdict = isYes('melt') ? (isYes('gloss') ? 'gloss' : 'matte') : 'underfired';
    const { firing } = errors[l];
    const tile = `T${String(i).padStart(4, '0')}`;
    return aTile({ tile, line: i + 2, unity, firing, load: firing, heat, verdict });
  });
}
