import type { Archive } from '../archive/archive.ts';
import { diagnostics } from './diagnostics.ts';
import { firingColumns, firingEffects, firingValues, type FiringColumn } from './firing-columns.ts';
import type { Model } from './model.ts';
import { fitStages, fittedStages, isJudged, type JudgedTile, type RisingFit } from './stages.ts';
import { validation } from './validation.ts';

export interface FitOptions {
  /** Version of coneshift, kept in the model. */
  readonly madeBy?: string;
}

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
  const { firingEffects: effects = [] } = model;
  const found = diagnostics({ tiles, fit, firingEffects: effects, validation: account });
  return {
    ...model,
    validation: account,
    diagnostics: found,
    notes: [
      ...found.map(({ text }) => text),
      ...account.notes,
      ...(tiles.length === 0 ? [] : [SHARED_ERROR]),
    ],
  };
}

/** A model of which is not known how it holds on tiles left out. */
export type UnvalidatedModel = Omit<Model, 'validation' | 'diagnostics' | 'notes'>;

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

const SHARED_ERROR =
  'an error that all loads share (a kiln that always fires cool) cannot be seen in the tiles';
