import { dot } from '../numeric/linalg.ts';
import { fillColumnValues, heatSlopes, scaledInputs, type Inputs } from './inputs.ts';
import type { Block, LatentProblem } from './latent.ts';
import { GLOSS_PRIOR, MELT_PRIOR, priorColumns, type StagePrior } from './priors.ts';
import { centresAndValues, radialPlace, type Radial } from './radial.ts';
import { sdOfGroup, type Scales } from './scales.ts';
import { isGlossOrMatte, type JudgedTile } from './judged.ts';

/** The two questions, in the order of the blocks. */
export const STAGES = ['melt', 'gloss'] as const;
export type StageName = (typeof STAGES)[number];

/** Prior of each stage. */
export const STAGE_PRIOR: Readonly<Record<StageName, StagePrior>> = {
  melt: MELT_PRIOR,
  gloss: GLOSS_PRIOR,
};

/** The tiles of one stage as numbers. */
export interface StageDesign {
  readonly name: StageName;
  readonly tiles: readonly JudgedTile[];
  readonly count: number;
  readonly size: number;
  /** Prior mean of each weight; those of the radial columns come last and are 0. */
  readonly priorMean: readonly number[];
  /** Which sd each weight has: the group's number; radial columns come after all groups, firing columns last. */
  readonly groupOf: readonly number[];
  readonly radial: Radial;
  /** So many columns at the end are of the firing, with an sd of 1 that is held. */
  readonly firingColumns: number;
  /** [tiles][weights] */
  readonly values: Float64Array;
  /** [tiles][columns]: growth of each column per cone; the radial columns' is left out. */
  readonly slopes: Float64Array;
  readonly columnCount: number;
  /** Per tile: log-odds at the prior means. */
  readonly priorLogOdds: Float64Array;
  readonly outcome: Float64Array;
  readonly weight: Float64Array;
  readonly load: Int32Array;
  /** So many rows at the end are no tiles: see `withRising`. */
  readonly assumed: number;
}

export interface DesignOptions {
  readonly loadNumber: ReadonlyMap<string, number>;
  /** How often each tile counts; 1 where absent. */
  readonly weight?: ((tile: JudgedTile) => number) | undefined;
  /** What is known of a tile's firing beside its heat, in units of the prior; as many numbers for every tile. */
  readonly firingValues?: ((tile: JudgedTile) => readonly number[]) | undefined;
}

/** One centre for so many tiles, and no more than the time of a fit allows. */
const TILES_PER_CENTRE = 20;
const MOST_CENTRES = 64;

/**
 * The tiles that a stage asks about, and what it asks of each.
 *
 * @param name - stage
 * @param tiles - judged tiles, sorted by name
 * @param options - loads, centres, weights
 * @returns the design
 */
export function stageDesign(
  name: StageName,
  tiles: readonly JudgedTile[],
  { loadNumber, weight, firingValues }: DesignOptions,
): StageDesign {
  const own = name === 'melt' ? tiles : tiles.filter(isGlossOrMatte);
  const prior = STAGE_PRIOR[name];
  const columns = priorColumns(prior);
  const inputs = own.map(({ unity, heat }) => scaledInputs(unity, heat.coneIndex));
  const most = Math.min(MOST_CENTRES, Math.floor(own.length / TILES_PER_CENTRE));
  const { radial, values: radialPart } = centresAndValues(inputs.map(radialPlace), most);
  const firingPart = name === 'gloss' && firingValues ? own.map(firingValues) : [];
  const firingColumns = (firingPart[0] ?? []).map(() => 0);
  const priorMean = prior.groups.flatMap(({ means }) => Object.values(means));
  const radialColumns = radial.centres.map(() => 0);
  return {
    name,
    tiles: own,
    count: own.length,
    size: columns.length + radialColumns.length + firingColumns.length,
    priorMean: [...priorMean, ...radialColumns, ...firingColumns],
    groupOf: [
      ...prior.groups.flatMap(({ means }, g) => Object.keys(means).map(() => g)),
      ...radialColumns.map(() => prior.groups.length),
      ...firingColumns.map(() => prior.groups.length + 1),
    ],
    radial,
    firingColumns: firingColumns.length,
    ...designNumbers(inputs, columns, priorMean, radialPart, firingPart),
    columnCount: columns.length,
    outcome: Float64Array.from(own, (tile) => (isYes(name, tile) ? 1 : 0)),
    weight: Float64Array.from(own, weight ?? (() => 1)),
    load: Int32Array.from(own, ({ load }) => loadNumber.get(load)!),
    assumed: 0,
  };
}

/** The rows of a design, their growth with heat, and their log-odds at the prior means. */
function designNumbers(
  inputs: readonly Inputs[],
  columns: readonly string[],
  priorMean: readonly number[],
  radialPart: Float64Array,
  firingPart: readonly (readonly number[])[],
): Pick<StageDesign, 'values' | 'slopes' | 'priorLogOdds'> {
  const centres = inputs.length === 0 ? 0 : radialPart.length / inputs.length;
  const size = columns.length + centres + (firingPart[0] ?? []).length;
  const values = new Float64Array(inputs.length * size);
  const slopes = new Float64Array(inputs.length * columns.length);
  const priorLogOdds = new Float64Array(inputs.length);
  const row: number[] = [];
  inputs.forEach((own, i) => {
    fillColumnValues(own, columns, row);
    values.set(row, i * size);
    values.set(radialPart.subarray(i * centres, (i + 1) * centres), i * size + columns.length);
    values.set(firingPart[i] ?? [], i * size + columns.length + centres);
    slopes.set(heatSlopes(own, columns), i * columns.length);
    priorLogOdds[i] = dot(priorMean, row);
  });
  return { values, slopes, priorLogOdds };
}

function isYes(name: StageName, { verdict }: JudgedTile): boolean {
  return name === 'melt' ? verdict !== 'underfired' : verdict === 'gloss';
}

/**
 * The design of some of the tiles, with the same centres.
 *
 * @param stage - design of all tiles
 * @param kept - which tiles, ascending
 * @param load - load of each tile kept
 * @returns the design of the rows kept
 */
export function keptRows(
  stage: StageDesign,
  kept: readonly number[],
  load: Int32Array,
): StageDesign {
  const { size, columnCount, assumed } = stage;
  const rows = [...kept, ...Array.from({ length: assumed }, (_, i) => stage.tiles.length + i)];
  const values = new Float64Array(rows.length * size);
  const slopes = new Float64Array(rows.length * columnCount);
  rows.forEach((from, to) => {
    values.set(stage.values.subarray(from * size, (from + 1) * size), to * size);
    const row = stage.slopes.subarray(from * columnCount, (from + 1) * columnCount);
    slopes.set(row, to * columnCount);
  });
  return {
    ...stage,
    tiles: kept.map((i) => stage.tiles[i]!),
    count: rows.length,
    priorLogOdds: Float64Array.from(rows, (i) => stage.priorLogOdds[i]!),
    values,
    slopes,
    outcome: Float64Array.from(rows, (i) => stage.outcome[i]!),
    weight: Float64Array.from(rows, (i) => stage.weight[i]!),
    load: Int32Array.from({ length: rows.length }, (_, i) => load[i] ?? 0),
  };
}

/** Both stages' tiles, and how many loads they come from. */
export interface Design {
  readonly stages: readonly StageDesign[];
  readonly loadCount: number;
}

/**
 * The problem of both stages at given scales, in units of the prior.
 *
 * A load's first unknown is its heat less the cone on paper: it moves each of its tiles by what a cone
 * does there, in both stages. What a cone does is taken at the given weights.
 *
 * @param design - both stages
 * @param scales - sds and shares
 * @param weights - of both stages
 * @param stretch - how much wider than usual each load's heat is taken to spread; 1 where absent
 * @returns the problem
 */
export function problemAt(
  design: Design,
  scales: Scales,
  weights: readonly Float64Array[],
  stretch?: Float64Array,
): LatentProblem {
  return {
    blocks: design.stages.map((stage, s) => blockAt(stage, scales, weights[s]!, stretch)),
    loadCount: design.loadCount,
  };
}

function blockAt(
  stage: StageDesign,
  scales: Scales,
  weights: Float64Array,
  stretch?: Float64Array,
): Block {
  const { count, size, values, slopes, columnCount, priorLogOdds, groupOf } = stage;
  const own = scales[stage.name];
  const effects = new Float64Array(2 * count);
  const glossSd = stage.name === 'gloss' ? scales.loads.gloss : 0;
  for (let i = 0; i < count; i++) {
    let slope = 0;
    for (let j = 0; j < columnCount; j++) slope += slopes[i * columnCount + j]! * weights[j]!;
    effects[2 * i] = slope * scales.loads.offsetCones * (stretch?.[stage.load[i]!] ?? 1);
    effects[2 * i + 1] = glossSd;
  }
  const { outcome, weight, load, assumed } = stage;
  return {
    count,
    size,
    rows: values,
    scale: Float64Array.from(groupOf, (g) => sdOfGroup(own, g)),
    offset: priorLogOdds,
    outcome,
    weight,
    load,
    effects,
    flipped: own.flipped,
    assumed,
  };
}
