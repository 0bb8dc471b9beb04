import type { Tile } from '../archive/archive.ts';
import { ModelFileError } from '../errors.ts';
import { coneIndex } from '../firing/cone.ts';
import { choleskyFactor } from '../numeric/linalg.ts';
import { MODEL_SCHEMA, modelShape } from './model-shape.ts';
import type { Model } from './model.ts';
import { priorColumns } from './priors.ts';
import { isJudged, STAGE_PRIOR, type StageName } from './stages.ts';

/** Faults named in a message; a damaged file may have thousands. */
const SHOWN_FAULTS = 8;
/** Cones are written in hundredths. */
const ROUNDED_CONE = 0.0051;

/**
 * A model as text: one line of JSON.
 *
 * @param model - fitted model
 * @returns the text of the model file, the same for the same model
 * @throws {RangeError} if a number of the model is not finite: JSON would turn it into null in silence
 */
export function modelText(model: Model): string {
  const text = JSON.stringify(model, (key, value: unknown) => {
    if (typeof value === 'number' && !Number.isFinite(value)) {
      throw new RangeError(`model must hold finite numbers only, ${key} is ${value}`);
    }
    return value;
  });
  return `${text}\n`;
}

/**
 * Reads a model file. Nothing in it is run; everything in it is checked.
 *
 * @param text - text of the file
 * @returns the model
 * @throws {ModelFileError} if the text is no model of this version, or is damaged
 */
export function parseModel(text: string): Model {
  const value = parseJson(text);
  const schema = typeof value === 'object' && value !== null ? Object.entries(value) : [];
  const found = schema.find(([key]) => key === 'schema')?.[1] as unknown;
  if (found !== MODEL_SCHEMA) throw foreign(found);
  const read = modelShape.safeParse(value);
  if (!read.success) {
    const lines = read.error.issues.map((i) => `  ${i.path.join('.') || 'file'}: ${i.message}`);
    throw damaged(lines);
  }
  const model = read.data as Model;
  const wrong = (['melt', 'gloss'] as const).flatMap((name) => stageFaults(name, model));
  wrong.push(...archiveFaults(model.archive));
  if (wrong.length > 0) throw damaged(wrong);
  return model;
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new ModelFileError(
      'expected a model file, got text that is no JSON or was cut off',
      'Make the model anew with: coneshift fit ARCHIVE --out model.json',
    );
  }
}

function foreign(found: unknown): ModelFileError {
  const given = typeof found === 'string' ? `"${found.slice(0, 60)}"` : 'none';
  return new ModelFileError(
    `expected a model file with schema "${MODEL_SCHEMA}", found schema ${given}`,
    'Make the model anew with: coneshift fit ARCHIVE --out model.json',
  );
}

function damaged(lines: readonly string[]): ModelFileError {
  const more = lines.length - SHOWN_FAULTS;
  const shown = [...lines.slice(0, SHOWN_FAULTS), ...(more > 0 ? [`  and ${more} more`] : [])];
  return new ModelFileError(
    `the model file is damaged\n${shown.join('\n')}`,
    'Make the model anew with: coneshift fit ARCHIVE --out model.json',
  );
}

/** What the fit and the answers rely on, beyond the shape of each record. */
function archiveFaults({ counts, tiles }: Model['archive']): string[] {
  const tally = (is: (tile: Tile) => boolean) => tiles.filter(is).length;
  const unjudged = tally(({ verdict }) => verdict === 'unjudged');
  const setAside = tally(({ verdict }) => verdict === 'overfired');
  const isWhole =
    counts.fitted === tally(isJudged) &&
    counts.unjudged === unjudged &&
    counts.setAside === setAside &&
    counts.fitted + unjudged + setAside === tiles.length &&
    counts.read === tiles.length + counts.refused;
  const names = new Set(tiles.map(({ tile }) => tile));
  return [
    ...(isWhole ? [] : ['  archive.counts: expected counts that add up to the tiles held']),
    ...(names.size === tiles.length ? [] : ['  archive.tiles: expected every name once']),
    ...tiles.flatMap(({ heat }, i) =>
      heat === undefined || Math.abs(coneIndex(heat.cone) - heat.coneIndex) <= ROUNDED_CONE
        ? []
        : [`  archive.tiles.${i}.heat: expected coneIndex of cone ${heat.cone}`],
    ),
  ];
}

/** The weights must belong to the columns this version computes, and the covariance be one. */
function stageFaults(name: StageName, model: Model): string[] {
  const { columns, mean, covarianceLower } = model[name];
  const expected = priorColumns(STAGE_PRIOR[name]);
  if (columns.join() !== expected.join())
    return [`  ${name}.columns: expected ${expected.join(' ')}`];
  const size = columns.length;
  if (mean.length !== size) return [`  ${name}.mean: expected ${size} numbers, got ${mean.length}`];
  const cells = (size * (size + 1)) / 2;
  if (covarianceLower.length !== cells) {
    return [`  ${name}.covarianceLower: expected ${cells} numbers, got ${covarianceLower.length}`];
  }
  try {
    choleskyFactor(Float64Array.from(covarianceLower), size);
    return [];
  } catch {
    return [
      `  ${name}.covarianceLower: expected a covariance, got one that is not positive definite`,
    ];
  }
}
