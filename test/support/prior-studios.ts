import type { Tile, Verdict } from '../../src/archive/archive.ts';
import type { Unity } from '../../src/chemistry/unity.ts';
import type { UnvalidatedModel } from '../../src/model/fit.ts';
import { columnValues, scaledInputs } from '../../src/model/inputs.ts';
import { LOAD_PRIOR, priorColumns, WRONG_VERDICTS } from '../../src/model/priors.ts';
import { RADIAL_INPUTS, radialPlace } from '../../src/model/radial.ts';
import { startingScales } from '../../src/model/scales.ts';
import {
  fitStages,
  fittedStages,
  isJudged,
  STAGE_PRIOR,
  type StageName,
} from '../../src/model/stages.ts';
import { sigmoid } from '../../src/numeric/logistic.ts';
import type { Generator } from '../../src/numeric/random.ts';
import { aHeat, anArchive, aTile } from './builders.ts';
import { drawnUnity } from './invented-tiles.ts';

/** An invented studio whose truth is drawn from the model's own prior, and the model it leads to. */
export interface PriorStudio {
  readonly model: UnvalidatedModel;
  readonly tiles: readonly Tile[];
  /** True log-odds of a load that truly reaches the cone. */
  readonly truth: (stage: StageName, unity: Unity, cone: number) => number;
  /** True heat of each load less its cone, in cones. */
  readonly offsets: readonly number[];
}

/**
 * If the answers mean what they say, a 90 % interval holds the truth of such studios 90 times in 100:
 * truth and tiles are drawn from the very distribution that the fit assumes, and its scales are held.
 */
export function priorStudio(source: Generator, tileCount: number): PriorStudio {
  const stages = { melt: drawnStage('melt', source), gloss: drawnStage('gloss', source) };
  const truth = (stage: StageName, unity: Unity, cone: number) => stages[stage](unity, cone);
  const loads = drawnLoads(source);
  const tiles = drawnTiles(truth, loads, source, tileCount);
  const fit = fitStages(tiles.filter(isJudged), { heldScales: startingScales(STAGE_PRIOR) });
  const model: UnvalidatedModel = {
    schema: 'coneshift.model/1',
    madeBy: 'test',
    archive: anArchive(tiles),
    ...fittedStages(fit, new Set(loads.map(({ firing }) => firing))),
  };
  return { model, tiles, truth, offsets: loads.map(({ offset }) => offset) };
}

type LogOdds = (unity: Unity, cone: number) => number;

function drawnStage(stage: StageName, source: Generator): LogOdds {
  const { groups, startResidualSd } = STAGE_PRIOR[stage];
  const columns = priorColumns(STAGE_PRIOR[stage]);
  const weights = groups.flatMap(({ means, startSd }) =>
    Object.values(means).map((mean) => mean + startSd * source.normal()),
  );
  const departure = drawnDeparture(source);
  return (unity, cone) => {
    const inputs = scaledInputs(unity, cone);
    const columnwise = columnValues(inputs, columns).reduce((sum, x, j) => sum + x * weights[j], 0);
    return columnwise + startResidualSd * departure(radialPlace(inputs));
  };
}

/** So many waves that the kernel of one studio's departure errs by 0.04 at most places. */
const WAVES = 300;

/**
 * A smooth function drawn from the Gaussian process of the departure, in units of its sd, known at every
 * place: waves whose frequencies have the spectrum of the kernel exp(-distance^2 / 2), each with a normal
 * sine and cosine. Over the frequencies its covariance is the kernel exactly.
 *
 * Source: A. Rahimi and B. Recht, Random features for large-scale kernel machines, Advances in Neural
 * Information Processing Systems 20 (2007).
 */
function drawnDeparture({ normal }: Generator): (place: readonly number[]) => number {
  const scale = Math.sqrt(1 / WAVES);
  const frequencies = Float64Array.from({ length: WAVES * RADIAL_INPUTS }, () => normal());
  const sines = Float64Array.from({ length: WAVES }, () => scale * normal());
  const cosines = Float64Array.from({ length: WAVES }, () => scale * normal());
  return (place) => {
    let sum = 0;
    for (let wave = 0; wave < WAVES; wave++) {
      let phase = 0;
      for (let i = 0; i < RADIAL_INPUTS; i++) {
        phase += frequencies[wave * RADIAL_INPUTS + i] * place[i];
      }
      sum += sines[wave] * Math.sin(phase) + cosines[wave] * Math.cos(phase);
    }
    return sum;
  };
}

const CONE_OF_LOAD = ['5', '6', '6', '7', '5', '6', '6', '7'];

/** A load's heat is off, and its cooling does something to gloss. */
interface DrawnLoad {
  readonly firing: string;
  readonly cone: string;
  readonly offset: number;
  readonly gloss: number;
}

function drawnLoads({ normal }: Generator): DrawnLoad[] {
  return CONE_OF_LOAD.map((cone, l) => ({
    firing: `L${l}`,
    cone,
    offset: LOAD_PRIOR.startOffsetCones * normal(),
    gloss: LOAD_PRIOR.startGlossSd * normal(),
  }));
}

function drawnTiles(
  truth: PriorStudio['truth'],
  loads: readonly DrawnLoad[],
  source: Generator,
  count: number,
): Tile[] {
  const { uniform } = source;
  return Array.from({ length: count }, (_, i) => {
    const { firing, cone, offset, gloss } = loads[i % loads.length];
    const heat = aHeat(cone, 'firing');
    const unity = drawnUnity(source);
    /** What is written down: the other way round now and then. */
    const isYes = (stage: StageName) => {
      const logOdds = truth(stage, unity, heat.coneIndex + offset);
      const seen = uniform() < sigmoid(logOdds + (stage === 'gloss' ? gloss : 0));
      return seen !== uniform() < WRONG_VERDICTS.startShare;
    };
    const verdict: Verdict = isYes('melt') ? (isYes('gloss') ? 'gloss' : 'matte') : 'underfired';
    const tile = `T${String(i).padStart(4, '0')}`;
    return aTile({ tile, line: i + 2, unity, firing, load: firing, heat, verdict });
  });
}
