import { mean } from '../numeric/summary.ts';
import { coneText } from '../firing/cone.ts';
import { foldsByCone, foldsByGlaze, foldsByLoad, type Fold } from './folds.ts';
import { newLoadProbability } from './log-odds.ts';
import {
  SURFACES,
  type HeldOut,
  type ReliabilityRow,
  type SurfaceProbability,
  type Validation,
} from './model.ts';
import { fittedStages, fitWithout, type JudgedTile, type StagesFit } from './stages.ts';

/** A tile predicted by a fit that did not see it. */
interface Prediction {
  readonly fold: string;
  readonly verdict: JudgedTile['verdict'];
  readonly probability: SurfaceProbability;
  readonly baseRate: SurfaceProbability;
}

/** From this probability on a tile counts as called sure. */
const SURE = 0.9;
/** A third is the least that the most probable of three surfaces can have. */
const RELIABILITY_EDGES = [1 / 3, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 1] as const;

/**
 * How the model holds on tiles that it does not see: by cone, by load, by glaze.
 *
 * Every fold is fitted anew, prior sds included, and predictions are averaged over the error of a
 * load that was not seen. The log score is the mean natural log of the probability given to what was
 * seen (Gneiting & Raftery, J. Am. Stat. Assoc. 102 (2007) 359-378).
 *
 * @param tiles - judged tiles
 * @param fit - fit on all of them: where the re-estimation of each fold begins
 * @returns the three accounts
 */
export function validation(tiles: readonly JudgedTile[], fit: StagesFit): Validation {
  const tested = thinned(tiles);
  if (tested.length < tiles.length) return thinnedValidation(tiles, tested, fit);
  const cones = foldsByCone(tiles).map((fold) => ({
    ...fold,
    leftOut: `cone ${coneText(Number(fold.leftOut))}`,
  }));
  return {
    byCone: heldOut(cones, tiles, fit),
    byLoad: heldOut(foldsByLoad(tiles), tiles, fit),
    byGlaze: heldOut(foldsByGlaze(tiles), tiles, fit),
    notes: validationNotes(tiles),
  };
}

/** More would take minutes and tell the same. */
const MOST_TESTED = 5_000;

/** Every k-th tile by name. */
function thinned(tiles: readonly JudgedTile[]): readonly JudgedTile[] {
  const every = Math.ceil(tiles.length / MOST_TESTED);
  if (every < 2) return tiles;
  const sorted = [...tiles].sort((a, b) => (a.tile < b.tile ? -1 : 1));
  return sorted.filter((_, i) => i % every === 0);
}

function thinnedValidation(
  tiles: readonly JudgedTile[],
  tested: readonly JudgedTile[],
  fit: StagesFit,
): Validation {
  const kept = new Set(tested);
  const account = validation(
    tested,
    fitWithout(fit, new Set(tiles.filter((tile) => !kept.has(tile)))),
  );
  const note =
    `how it holds was tested on ${tested.length} of the ${tiles.length} judged tiles (every ` +
    `${Math.ceil(tiles.length / MOST_TESTED)}th), fitted and left out among themselves`;
  return { ...account, notes: [note, ...account.notes] };
}

function validationNotes(tiles: readonly JudgedTile[]): string[] {
  const unblended = tiles.filter((tile) => tile.blend === undefined).length;
  if (unblended < tiles.length || tiles.length === 0) return [];
  return [
    'no tile names its blend: neighbours of one line or grid may stand on both sides, and the ' +
      'figures by glaze then flatter; fill the column "blend" of tiles.csv',
  ];
}

function heldOut(folds: readonly Fold[], tiles: readonly JudgedTile[], fit: StagesFit): HeldOut {
  if (folds.length < 2) return NOTHING_HELD_OUT;
  const predictions = folds.flatMap((fold) => foldPredictions(fold, tiles, fit));
  const parts = folds.map(({ leftOut }) => {
    const own = predictions.filter(({ fold }) => fold === leftOut);
    return { leftOut, tiles: own.length, ...scores(own) };
  });
  const judged = predictions.filter(({ verdict }) => verdict !== 'melted');
  const sure = judged.filter(({ probability }) => highest(probability) >= SURE);
  return {
    ...scores(predictions),
    folds: folds.length,
    tiles: predictions.length,
    sure: { called: sure.length, right: sure.filter(isRight).length },
    reliability: reliability(judged),
    parts,
  };
}

const NOTHING_HELD_OUT: HeldOut = {
  logScore: null,
  baseRateLogScore: null,
  folds: 0,
  tiles: 0,
  sure: { called: 0, right: 0 },
  reliability: reliability([]),
  parts: [],
};

function foldPredictions(fold: Fold, tiles: readonly JudgedTile[], fit: StagesFit): Prediction[] {
  const out = new Set(fold.tiles);
  const kept = tiles.filter((tile) => !out.has(tile));
  const refit = fittedStages(fitWithout(fit, out), new Set());
  const rates = baseRates(kept);
  return fold.tiles.map(({ unity, heat, verdict }) => ({
    fold: fold.leftOut,
    verdict,
    probability: newLoadProbability(refit, unity, heat.coneIndex),
    baseRate: rates,
  }));
}

/** Shares of the surfaces among the tiles; half a tile more on each side keeps them off 0. */
function baseRates(tiles: readonly JudgedTile[]): SurfaceProbability {
  const count = (wanted: JudgedTile['verdict']) =>
    tiles.filter(({ verdict }) => verdict === wanted).length;
  const underfired = (count('underfired') + 0.5) / (tiles.length + 1);
  const gloss = (count('gloss') + 0.5) / (count('gloss') + count('matte') + 1);
  return { underfired, matte: (1 - underfired) * (1 - gloss), gloss: (1 - underfired) * gloss };
}

function scores(predictions: readonly Prediction[]) {
  const score = (of: 'probability' | 'baseRate') =>
    mean(predictions.map((p) => Math.log(probabilityOf(p[of], p.verdict))));
  return { logScore: score('probability'), baseRateLogScore: score('baseRate') };
}

/** A tile judged melted only may be matte or gloss. Underflow is kept off the logarithm. */
function probabilityOf(given: SurfaceProbability, verdict: JudgedTile['verdict']): number {
  const probability = verdict === 'melted' ? given.matte + given.gloss : given[verdict];
  return Math.max(probability, Number.MIN_VALUE);
}

function highest(probability: SurfaceProbability): number {
  return Math.max(...SURFACES.map((surface) => probability[surface]));
}

function isRight({ probability, verdict }: Prediction): boolean {
  return verdict !== 'melted' && probability[verdict] === highest(probability);
}

function reliability(predictions: readonly Prediction[]): ReliabilityRow[] {
  return RELIABILITY_EDGES.slice(1).map((to, i) => {
    const from = RELIABILITY_EDGES[i]!;
    const last = to === 1;
    const own = predictions.filter(({ probability }) => {
      const stated = highest(probability);
      return stated >= from && (stated < to || last);
    });
    return {
      from,
      to,
      tiles: own.length,
      stated: own.length === 0 ? null : mean(own.map(({ probability }) => highest(probability))),
      right: own.length === 0 ? null : own.filter(isRight).length / own.length,
    };
  });
}
