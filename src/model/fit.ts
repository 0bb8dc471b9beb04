import type { Archive } from '../archive/archive.ts';
import { coneText } from '../firing/cone.ts';
import { firingColumns, firingEffects, firingValues, type FiringColumn } from './firing-columns.ts';
import { foldsByCone } from './folds.ts';
import type { HeatCheck } from './heat-check.ts';
import type { FiringEffect, Model, Validation } from './model.ts';
import { fitStages, fittedStages, isJudged, type JudgedTile, type RisingFit } from './stages.ts';
import { validation } from './validation.ts';

export interface FitOptions {
  /** Version of coneshift, kept in the model. */
  readonly madeBy?: string;
}

/** Fewer tiles than this on one side of a boundary leave it mostly to the prior. */
const FEW_TILES = 10;
const NOTHING_LEARNT =
  'no judged tile: every answer is what is usual elsewhere, and nothing in it comes from this studio';
/** Cones that the tool is asked about first. */
const MAIN_CONES = [5, 6, 7];

/**
 * Learns from an archive where the surfaces lie.
 *
 * Works with any number of judged tiles, none included: the answer is then the prior's.
 * The same archive gives the same model to the last bit, in any order of its rows.
 *
 * @param archive - archive as read
 * @param options - version to note
 * @returns the model, with how it holds on tiles that were left out
 */
export function fitModel(archive: Archive, options: FitOptions = {}): Model {
  const tiles = archive.tiles.filter(isJudged);
  const fit = fitOf(archive, tiles);
  const account = validation(tiles, fit);
  const model = modelOf(archive, fit, options);
  return {
    ...model,
    validation: account,
    notes: [
      ...heatNotes(fit),
      ...firingNotes(model.firingEffects ?? []),
      ...fitNotes(tiles, account),
    ],
  };
}

/** A model of which is not known how it holds on tiles left out. */
export type UnvalidatedModel = Omit<Model, 'validation' | 'notes'>;

/**
 * The model alone, without its validation: for many fits in a row.
 *
 * @param archive - archive as read
 * @param options - version to note
 * @returns the same weights as `fitModel`
 */
export function fitUnvalidated(archive: Archive, options: FitOptions = {}): UnvalidatedModel {
  return modelOf(archive, fitOf(archive, archive.tiles.filter(isJudged)), options);
}

/** A fit, and the columns of the firings that it was made with. */
type FiringsFit = RisingFit & { readonly columns: readonly FiringColumn[] };

function fitOf({ firings }: Archive, tiles: readonly JudgedTile[]): FiringsFit {
  const columns = firingColumns(tiles, firings);
  const settings = columns.length === 0 ? {} : { firingValues: firingValues(columns, firings) };
  return { ...fitStages(tiles, settings), columns };
}

function modelOf(
  archive: Archive,
  fit: FiringsFit,
  { madeBy = 'coneshift' }: FitOptions,
): UnvalidatedModel {
  const loads = archive.tiles.flatMap(({ firing, load }) => (firing === undefined ? [] : [load]));
  const named = new Set(loads);
  return {
    schema: 'coneshift.model/1',
    madeBy,
    archive,
    ...fittedStages(fit, named),
    ...(fit.columns.length > 0 && { firingEffects: firingEffects(fit.columns, fit) }),
  };
}

/** A smaller fall is not seen on any page. */
const SEEN_FALL = 0.001;

function heatNotes({ heatBefore, heatAfter }: RisingFit): string[] {
  const said = (check: HeatCheck) =>
    `for ${check.falling} of ${check.glazes} fitted glazes, by up to ${check.worst.toFixed(3)} over a quarter of a cone`;
  const advice = 'heat hardly shows in these tiles; fire some of these glazes at another cone';
  if (heatAfter.worst >= SEEN_FALL) {
    return [`the chance to melt falls with more heat ${said(heatAfter)}: ${advice}`];
  }
  if (heatBefore.worst < SEEN_FALL) return [];
  return [
    `by the tiles alone the chance to melt would fall with more heat ${said(heatBefore)}; it is held not to: ${advice}`,
  ];
}

function firingNotes(effects: readonly FiringEffect[]): string[] {
  return effects.flatMap(({ column, known, unknown }) =>
    unknown === 0
      ? []
      : [
          `${column} is recorded for ${known} of ${known + unknown} matte and gloss tiles; the others count as ` +
            'usual: write it into firings.csv where it is known',
        ],
  );
}

function fitNotes(tiles: readonly JudgedTile[], { byCone, notes }: Validation): string[] {
  if (tiles.length === 0) return [NOTHING_LEARNT];
  const count = (...wanted: JudgedTile['verdict'][]) =>
    tiles.filter(({ verdict }) => wanted.includes(verdict)).length;
  const sides = [
    ['underfired', count('underfired'), 'melt'],
    ['melted', count('matte', 'gloss', 'melted'), 'melt'],
    ['matte', count('matte'), 'gloss'],
    ['gloss', count('gloss'), 'gloss'],
  ] as const;
  const few = sides
    .filter(([, tilesOnSide]) => tilesOnSide < FEW_TILES)
    .map(
      ([side, tilesOnSide, boundary]) =>
        `${tilesOnSide} ${tilesOnSide === 1 ? 'tile' : 'tiles'} judged ${side} (fewer than ` +
        `${FEW_TILES}): the ${boundary} boundary ` +
        'rests mostly on what is usual elsewhere; fire and judge more of that side',
    );
  const unseen = MAIN_CONES.filter(
    (cone) => !tiles.some(({ heat }) => Math.abs(heat.coneIndex - cone) <= 0.5),
  ).map(
    (cone) =>
      `no judged tile at cone ${coneText(cone)}: answers there are carried over from other cones`,
  );
  const oneCone = byCone.folds === 0;
  const oneLoad = oneCone ? [] : conesOfOneLoad(tiles);
  return [
    ...few,
    ...unseen,
    ...(oneCone ? ['all tiles are of one cone: how the model holds by cone cannot be tested'] : []),
    ...oneLoad,
    ...notes,
    'an error that all loads share (a kiln that always fires cool) cannot be seen in the tiles',
  ];
}

/** Where a cone was fired once, an error of that load and what the cone does look the same. */
function conesOfOneLoad(tiles: readonly JudgedTile[]): string[] {
  return foldsByCone(tiles).flatMap(({ leftOut, tiles: own }) => {
    const loads = new Set(own.map(({ load }) => load));
    const [first] = own;
    if (loads.size > 1 || first?.firing === undefined) return [];
    return [
      `all judged tiles of cone ${coneText(Number(leftOut))} are of one load (${first.firing}): its own error ` +
        'and what the cone does cannot be told apart; fire another load there',
    ];
  });
}
