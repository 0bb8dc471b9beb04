import { lowerIndex } from '../numeric/linalg.ts';
import { keptRows, STAGE_PRIOR, STAGES, stageDesign, type Design } from './design.ts';
import { evidenceFit, type EvidenceFit, type EvidenceStart } from './evidence.ts';
import type { JudgedTile } from './judged.ts';
import type { LoadEffect, LoadSpread, Stage } from './model.ts';
import { groupColumns, priorColumns } from './priors.ts';
import { heatCheck, type HeatCheck } from './heat-check.ts';
import { moreSteps, settledSteps, withRising, type RisingStep } from './rising.ts';
import { startingScales, type Scales } from './scales.ts';

export { isJudged, type FittedVerdict, type JudgedTile } from './judged.ts';
export { STAGE_PRIOR, type StageName } from './design.ts';

/** A fit of both stages, with the numbers it was made from. */
export interface StagesFit {
  readonly fit: EvidenceFit;
  readonly design: Design;
  /** Names of the loads, in the order of the fit's. */
  readonly loads: readonly string[];
  /** Tiles of each load. */
  readonly loadTiles: readonly number[];
}

export interface FitSettings {
  /** Scales to hold instead of re-estimating them. */
  readonly heldScales?: Scales;
  /** How often each tile counts; 1 where absent. */
  readonly weight?: (tile: JudgedTile) => number;
  /** What is known of a tile's firing beside its heat: see `firingValues`. */
  readonly firingValues?: ((tile: JudgedTile) => readonly number[]) | undefined;
}

/**
 * Fits both stages: melted or not on all tiles, gloss or matte on the melted and judged ones.
 *
 * @param tiles - judged tiles, in any order
 * @param settings - scales to hold, weights
 * @returns the fit, and how the chance to melt moves with heat
 */
export function fitStages(
  tiles: readonly JudgedTile[],
  { heldScales, ...settings }: FitSettings = {},
): RisingFit {
  // One order for any order of rows: the sums, and so the bytes of the answer, stay the same.
  const sorted = [...tiles].sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const { loads, loadNumber } = numberedLoads(sorted);
  const stages = STAGES.map((name) => stageDesign(name, sorted, { loadNumber, ...settings }));
  const design = { stages, loadCount: loads.length };
  const start = heldScales ? { scales: heldScales } : thinnedStart(design);
  const isHeld = heldScales !== undefined;
  return risingFit(sorted, fitOf(design, loads, start, isHeld), isHeld);
}

/** A fit under which more heat does not melt less. */
export interface RisingFit extends StagesFit {
  /** The tiles alone. */
  readonly heatBefore: HeatCheck;
  /** Once it is known that more heat does not melt less. */
  readonly heatAfter: HeatCheck;
}

/** Two are usual, and most archives need none. */
const MOST_RISING_ROUNDS = 20;

/** The fit under which the chance to melt does not fall with heat at any fitted glaze. */
function risingFit(tiles: readonly JudgedTile[], first: StagesFit, isHeld: boolean): RisingFit {
  const [plainMelt, gloss] = first.design.stages;
  const heatBefore = heatCheck(stageOf(first, 0), tiles);
  let [fit, heatAfter] = [first, heatBefore];
  let held: readonly RisingStep[] = [];
  for (let round = 0; round < MOST_RISING_ROUNDS && heatAfter.falling > 0; round++) {
    const melt = stageOf(fit, 0);
    const atScales = { ...melt, covarianceLower: Array.from(fit.fit.covariancesAtScales[0]!) };
    held = settledSteps(atScales, moreSteps(held, heatAfter.falls));
    const design = { ...first.design, stages: [withRising(plainMelt!, melt, held), gloss!] };
    fit = fitOf(design, fit.loads, fit.fit, isHeld);
    heatAfter = heatCheck(stageOf(fit, 0), tiles);
  }
  return { ...fit, heatBefore, heatAfter };
}

/** Of more tiles a fifth tells nearly where the fit of all will end. */
const MANY_TILES = 8000;
const EVERY = 5;
const THINNED_TOLERANCE = 0.05;

/** Where to begin with very many tiles: at the fit of every fifth of them, with the same centres. */
function thinnedStart(design: Design): EvidenceStart | undefined {
  if (design.stages[0]!.count < MANY_TILES) return undefined;
  const stages = design.stages.map((stage) => {
    const kept = Array.from({ length: Math.ceil(stage.count / EVERY) }, (_, i) => i * EVERY);
    return keptRows(
      stage,
      kept,
      Int32Array.from(kept, (i) => stage.load[i]!),
    );
  });
  const part = { stages, loadCount: design.loadCount };
  const begun = thinnedStart(part) ?? { scales: startingScales(STAGE_PRIOR) };
  const { scales, weights, loads, stretch } = evidenceFit(part, {
    ...begun,
    tolerance: THINNED_TOLERANCE,
  });
  return { scales, weights, loads, stretch };
}

/** The scores of tiles left out stand to two digits: their fits need no more than that. */
const WITHOUT_TOLERANCE = 0.06;

/**
 * The fit without some of its tiles: sds re-estimated, centres kept, begun where the whole fit ended.
 *
 * @param whole - fit of all tiles
 * @param without - tiles to leave out
 * @returns the fit of the others
 */
export function fitWithout(whole: StagesFit, without: ReadonlySet<JudgedTile>): StagesFit {
  const [melt] = whole.design.stages;
  const { loads, loadNumber } = numberedLoads(melt!.tiles.filter((tile) => !without.has(tile)));
  const stages = whole.design.stages.map((stage) => {
    const kept = stage.tiles.flatMap((tile, i) => (without.has(tile) ? [] : [i]));
    const load = Int32Array.from(kept, (i) => loadNumber.get(stage.tiles[i]!.load)!);
    return keptRows(stage, kept, load);
  });
  const start = { ...whole.fit, ...loadsOf(whole, loads), tolerance: WITHOUT_TOLERANCE };
  return fitOf({ stages, loadCount: loads.length }, loads, start, false);
}

/** What a fit says of some of its loads. */
function loadsOf({ fit, loads }: StagesFit, some: readonly string[]) {
  const numberOf = new Map(loads.map((load, l) => [load, l]));
  const from = some.map((load) => numberOf.get(load)!);
  return {
    loads: Float64Array.from(from.flatMap((l) => [fit.loads[2 * l]!, fit.loads[2 * l + 1]!])),
    stretch: Float64Array.from(from, (l) => fit.stretch[l]!),
  };
}

function numberedLoads(tiles: readonly JudgedTile[]) {
  const loads = [...new Set(tiles.map(({ load }) => load))];
  return { loads, loadNumber: new Map(loads.map((load, l) => [load, l])) };
}

function fitOf(
  design: Design,
  loads: readonly string[],
  start: EvidenceStart | undefined,
  isHeld: boolean,
): StagesFit {
  const loadTiles = new Array<number>(loads.length).fill(0);
  // The first stage asks about every tile.
  const [melt] = design.stages;
  melt!.tiles.forEach((_, i) => (loadTiles[melt!.load[i]!]! += 1));
  return { fit: evidenceFit(design, start, isHeld), design, loads, loadTiles };
}

/** What a fit gives to a model. */
export interface FittedStages {
  readonly melt: Stage;
  readonly gloss: Stage;
  readonly loadSpread: LoadSpread;
  readonly loads: readonly LoadEffect[];
  readonly logEvidence: number;
}

/**
 * Fitted stages as the model keeps them.
 *
 * @param fit - fit of both stages
 * @param namedLoads - loads that have a firing; those of a single unnamed tile are not listed
 * @returns stages, loads and their spread
 */
export function fittedStages(fit: StagesFit, namedLoads: ReadonlySet<string>): FittedStages {
  const { scales, logEvidence } = fit.fit;
  const [melt, gloss] = STAGES.map((_, s) => stageOf(fit, s)) as [Stage, Stage];
  return {
    melt,
    gloss,
    loadSpread: { offsetScaleCones: scales.loads.offsetCones, glossSd: scales.loads.gloss },
    loads: loadEffects(fit, namedLoads),
    logEvidence,
  };
}

function stageOf({ fit, design }: StagesFit, s: number): Stage {
  const { name, tiles, outcome, radial, size, firingColumns } = design.stages[s]!;
  // Answers are for the usual firing, where those columns are 0.
  const asked = size - firingColumns;
  const prior = STAGE_PRIOR[name];
  const scales = fit.scales[name];
  const yes = tiles.reduce((sum, _, i) => sum + outcome[i]!, 0);
  return {
    columns: priorColumns(prior),
    radial,
    mean: Array.from(fit.weights[s]!.subarray(0, asked)),
    covarianceLower: Array.from(fit.covariances[s]!.subarray(0, lowerIndex(asked, 0))),
    groups: prior.groups.map((group, g) => ({
      name: group.name,
      columns: groupColumns(group),
      startSd: group.startSd,
      sd: scales.groups[g]!,
    })),
    residual: { startSd: prior.startResidualSd, sd: scales.residual },
    wrongVerdicts: scales.flipped,
    tiles: { no: tiles.length - yes, yes },
  };
}

function loadEffects(
  { fit, loads, loadTiles }: StagesFit,
  named: ReadonlySet<string>,
): LoadEffect[] {
  const at = (k: number) => ({ mean: fit.loads[k]!, sd: Math.sqrt(fit.loadVariance[k]!) });
  return loads
    .map((load, l) => ({
      load,
      tiles: loadTiles[l]!,
      offsetCones: at(2 * l),
      glossLogOdds: at(2 * l + 1),
    }))
    .filter(({ load }) => named.has(load));
}
