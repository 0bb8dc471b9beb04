import type { Firing } from '../archive/archive.ts';
import { lowerIndex } from '../numeric/linalg.ts';
import { isGlossOrMatte, type JudgedTile } from './judged.ts';
import type { FiringEffect } from './model.ts';
import type { StagesFit } from './stages.ts';

/** What a firing is known by beside its heat. It acts on gloss alone, by a column of its own. */
export interface FiringColumn {
  readonly name: 'cooling' | 'atmosphere';
  /** The archive's middle cooling in °C per hour, or its commonest atmosphere: there the column is 0. */
  readonly usual: number | Atmosphere;
  /** Value of the column for a firing; undefined where it is not known. */
  readonly valueOf: (firing: Firing) => number | undefined;
  /** Judged matte or gloss tiles of which it is known, and of which it is not. */
  readonly known: number;
  readonly unknown: number;
}

type Atmosphere = NonNullable<Firing['atmosphere']>;

/**
 * Prior sd of the effect of cooling twice as fast, and of the other atmosphere, log-odds of gloss. Slow cooling
 * dulls many glazes and reduction changes some (common practice, no source); the mean is 0, since not all do.
 */
export const FIRING_EFFECT_SD = 0.6;
/** Coolings nearer to each other than this tell nothing. */
const LEAST_RATIO = 1.2;

/**
 * The columns that an archive's firings allow: cooling and atmosphere, each where it is recorded and differs
 * between the loads of judged tiles.
 *
 * @param tiles - judged tiles
 * @param firings - their firings
 * @returns none, one or two columns
 */
export function firingColumns(
  tiles: readonly JudgedTile[],
  firings: readonly Firing[],
): FiringColumn[] {
  const byName = new Map(firings.map((firing) => [firing.firing, firing]));
  const own = tiles.filter(isGlossOrMatte).map(({ firing }) => byName.get(firing ?? ''));
  const counted = (isKnown: (firing: Firing) => boolean) => {
    const known = own.filter((firing) => firing !== undefined && isKnown(firing)).length;
    return { known, unknown: own.length - known };
  };
  return [
    ...coolingColumn(own).map((column) => ({
      ...column,
      ...counted(({ coolingCPerH }) => coolingCPerH !== undefined),
    })),
    ...atmosphereColumn(own).map((column) => ({
      ...column,
      ...counted(({ atmosphere }) => atmosphere !== undefined),
    })),
  ];
}

type PlainColumn = Omit<FiringColumn, 'known' | 'unknown'>;

function coolingColumn(own: readonly (Firing | undefined)[]): PlainColumn[] {
  const rates = own.flatMap((firing) => firing?.coolingCPerH ?? []).sort((a, b) => a - b);
  const [slowest, usual, fastest] = [rates[0], rates[rates.length >> 1], rates.at(-1)];
  if (slowest === undefined || usual === undefined || fastest === undefined) return [];
  if (fastest < LEAST_RATIO * slowest) return [];
  return [
    {
      name: 'cooling',
      usual,
      valueOf: ({ coolingCPerH: rate }) =>
        rate === undefined ? undefined : Math.log2(rate / usual),
    },
  ];
}

function atmosphereColumn(own: readonly (Firing | undefined)[]): PlainColumn[] {
  const tilesIn = (wanted: Atmosphere) =>
    own.filter((firing) => firing?.atmosphere === wanted).length;
  const [oxidation, reduction] = [tilesIn('oxidation'), tilesIn('reduction')];
  if (oxidation === 0 || reduction === 0) return [];
  const usual = reduction > oxidation ? 'reduction' : 'oxidation';
  return [
    {
      name: 'atmosphere',
      usual,
      valueOf: ({ atmosphere }) => {
        if (atmosphere === undefined) return undefined;
        return atmosphere === usual ? 0 : 1;
      },
    },
  ];
}

/**
 * Values of the columns for the tiles of the gloss stage, in units of the prior sd of their effects: what is not
 * known counts as usual.
 *
 * @param columns - from `firingColumns`
 * @param firings - firings of the archive
 * @returns values of a tile, one a column
 */
export function firingValues(
  columns: readonly FiringColumn[],
  firings: readonly Firing[],
): (tile: JudgedTile) => number[] {
  const byFiring = new Map(
    firings.map((firing) => [
      firing.firing,
      columns.map(({ valueOf }) => FIRING_EFFECT_SD * (valueOf(firing) ?? 0)),
    ]),
  );
  const usual = columns.map(() => 0);
  return ({ firing }) => byFiring.get(firing ?? '') ?? usual;
}

/**
 * What the tiles say of the columns.
 *
 * @param columns - from `firingColumns`
 * @param fit - the fit that was made with them
 * @returns effect of each on the log-odds of gloss, and where the answers stand
 */
export function firingEffects(
  columns: readonly FiringColumn[],
  { fit, design }: StagesFit,
): FiringEffect[] {
  const { size } = design.stages[1]!;
  return columns.map(({ usual, known, unknown }, k) => {
    const at = size - columns.length + k;
    const variance = fit.covariances[1]![lowerIndex(at, at)]!;
    const gloss = {
      mean: FIRING_EFFECT_SD * fit.weights[1]![at]!,
      sd: FIRING_EFFECT_SD * Math.sqrt(variance),
    };
    return typeof usual === 'number'
      ? { column: 'cooling', usualCPerH: usual, gloss, known, unknown }
      : { column: 'atmosphere', usual, gloss, known, unknown };
  });
}
