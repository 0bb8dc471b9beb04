import type { Tile } from '../archive/archive.ts';
import type { Heat } from '../archive/archive.ts';
import { evidenceFit, heldFit, type EvidenceFit, type StageSds } from './evidence.ts';
import { columnValues, scaledInputs } from './inputs.ts';
import type { LoadEffect, Stage } from './model.ts';
import { GLOSS_PRIOR, groupColumns, MELT_PRIOR, priorColumns, type StagePrior } from './priors.ts';
import type { LogisticData } from './whitened.ts';

/** What the fit can take a tile for. */
export type FittedVerdict = 'underfired' | 'matte' | 'gloss' | 'melted';

/** A tile that is judged and whose heat is known. */
export interface JudgedTile extends Tile {
  readonly verdict: FittedVerdict;
  readonly heat: Heat;
}

/**
 * Whether the fit uses a tile: judged, not overfired, its heat known.
 *
 * @param tile - a tile of an archive
 * @returns true if the tile is fitted
 */
export function isJudged(tile: Tile): tile is JudgedTile {
  return tile.heat !== undefined && tile.verdict !== 'unjudged' && tile.verdict !== 'overfired';
}

/** The names of both stages. */
export type StageName = 'melt' | 'gloss';

/** Prior of each stage. */
export const STAGE_PRIOR: Readonly<Record<StageName, StagePrior>> = {
  melt: MELT_PRIOR,
  gloss: GLOSS_PRIOR,
};

/** A fit of both stages, and where to begin a fit of nearly the same tiles. */
export type StageFits = Readonly<Record<StageName, StageFit>>;

export interface StageFit {
  readonly fit: EvidenceFit;
  /** Names of the loads, in the order of the fit's load intercepts. */
  readonly loads: readonly string[];
  readonly data: LogisticData;
}

export interface FitSettings {
  /** Sds to hold instead of re-estimating them. */
  readonly heldSds?: Readonly<Record<StageName, StageSds>>;
  /** Sds at which re-estimation begins, to save time. */
  readonly startSds?: Readonly<Record<StageName, StageSds>>;
  /** How often each tile counts; 1 where absent. */
  readonly weight?: (tile: JudgedTile) => number;
}

/**
 * Fits both stages: melted or not on all tiles, gloss or matte on the melted and judged ones.
 *
 * @param tiles - judged tiles, in any order
 * @param settings - sds to hold, weights
 * @returns both fits
 */
export function fitStages(tiles: readonly JudgedTile[], settings: FitSettings = {}): StageFits {
  // One order for any order of rows: the sums, and so the bytes of the answer, stay the same.
  const sorted = [...tiles].sort((a, b) => (a.tile < b.tile ? -1 : 1));
  const melted = sorted.filter(({ verdict }) => verdict === 'matte' || verdict === 'gloss');
  return {
    melt: stageFit('melt', sorted, (tile) => tile.verdict !== 'underfired', settings),
    gloss: stageFit('gloss', melted, (tile) => tile.verdict === 'gloss', settings),
  };
}

function stageFit(
  name: StageName,
  tiles: readonly JudgedTile[],
  yes: (tile: JudgedTile) => boolean,
  { heldSds, startSds, weight }: FitSettings,
): StageFit {
  const prior = STAGE_PRIOR[name];
  const columns = priorColumns(prior);
  const loads = [...new Set(tiles.map(({ load }) => load))];
  const loadNumber = new Map(loads.map((load, l) => [load, l]));
  const data = {
    rows: tiles.map((tile) => columnValues(scaledInputs(tile.unity, tile.heat.coneIndex), columns)),
    outcome: tiles.map((tile) => (yes(tile) ? 1 : 0)),
    ...(weight && { weight: tiles.map(weight) }),
    load: tiles.map(({ load }) => loadNumber.get(load)!),
  };
  const start = startSds && { sds: startSds[name] };
  const fit = heldSds ? heldFit(data, prior, heldSds[name]) : evidenceFit(data, prior, start);
  return { fit, loads, data };
}

/**
 * The sds that a fit ended at.
 *
 * @param fits - fits of both stages
 * @returns sds of both stages
 */
export function sdsOf({ melt, gloss }: StageFits): Readonly<Record<StageName, StageSds>> {
  return { melt: melt.fit.sds, gloss: gloss.fit.sds };
}

/**
 * A fitted stage as the model keeps it.
 *
 * @param name - which stage
 * @param fit - its fit
 * @param namedLoads - loads that have a firing; those of a single unnamed tile are not listed
 * @returns the stage
 */
export function stageOf(name: StageName, fit: StageFit, namedLoads: ReadonlySet<string>): Stage {
  const prior = STAGE_PRIOR[name];
  const { posterior, sds } = fit.fit;
  const yes = fit.data.outcome.filter((outcome) => outcome === 1).length;
  return {
    columns: priorColumns(prior),
    mean: posterior.mean,
    covarianceLower: posterior.covarianceLower,
    groups: prior.groups.map((group, g) => ({
      name: group.name,
      columns: groupColumns(group),
      startSd: group.startSd,
      sd: sds.groups[g]!,
    })),
    loadSd: sds.load,
    loads: loadEffects(fit, namedLoads),
    tiles: { no: fit.data.outcome.length - yes, yes },
    logEvidence: posterior.logEvidence,
  };
}

function loadEffects({ fit, loads, data }: StageFit, named: ReadonlySet<string>): LoadEffect[] {
  const tilesOfLoad = new Array<number>(loads.length).fill(0);
  for (const l of data.load ?? []) tilesOfLoad[l]! += 1;
  return loads
    .map((load, l) => ({
      load,
      tiles: tilesOfLoad[l]!,
      mean: fit.posterior.loadMean[l]!,
      sd: Math.sqrt(fit.posterior.loadVariance[l]!),
    }))
    .filter(({ load }) => named.has(load));
}
