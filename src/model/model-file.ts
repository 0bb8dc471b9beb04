import type { Tile } from '../archive/archive.ts';
import { fingerprint } from '../archive/fingerprint.ts';
import { ModelFileError } from '../errors.ts';
import { coneIndex } from '../firing/cone.ts';
import { choleskyFactor, lowerIndex } from '../numeric/linalg.ts';
import { MODEL_SCHEMA, modelShape } from './model-shape.ts';
import type { Model } from './model.ts';
import { priorColumns } from './priors.ts';
import { RADIAL_INPUTS } from './radial.ts';
import { isJudged, STAGE_PRIOR, type StageName } from './stages.ts';

/** Faults named in a message; a damaged file may have thousands. */
const SHOWN_FAULTS = 8;
/** Cones are written in hundredths. */
const ROUNDED_CONE = 0.0051;

/**
 * A model as text: one line of JSON, with a checksum over all of it.
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
  return `${text.slice(0, -1)},"checksum":"${checksumOf(model)}"}\n`;
}

/**
 * Over the content in one order of keys. It tells a slip of an editor from what was written; it is no
 * seal against intent.
 */
function checksumOf(content: object): string {
  const text = JSON.stringify(content, (_, value: unknown) =>
    typeof value === 'object' && value !== null && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
      : value,
  );
  return fingerprint(new Map([['model', new TextEncoder().encode(text)]]));
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
  const { checksum, ...content } = value as Record<string, unknown>;
  const read = modelShape.safeParse(content);
  if (!read.success) {
    const lines = read.error.issues.map((i) => `  ${i.path.join('.') || 'file'}: ${i.message}`);
    throw damaged(lines);
  }
  const model = read.data as Model;
  const wrong = (['melt', 'gloss'] as const).flatMap((name) => stageFaults(name, model));
  wrong.push(...archiveFaults(model.archive));
  if (wrong.length > 0) throw damaged(wrong);
  if (checksum !== checksumOf(content)) {
    throw damaged([
      '  checksum: expected that of the content; it was changed after it was written',
    ]);
  }
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
  const { columns, mean, covarianceLower, radial } = model[name];
  const expected = priorColumns(STAGE_PRIOR[name]);
  if (columns.join() !== expected.join())
    return [`  ${name}.columns: expected ${expected.join(' ')}`];
  const size = columns.length + radial.centres.length;
  const lengths = [
    ['mean', mean.length, size],
    ['covarianceLower', covarianceLower.length, lowerIndex(size, 0)],
    ['radial.factorLower', radial.factorLower.length, lowerIndex(radial.centres.length, 0)],
    ...radial.centres.map(
      (centre, i) => [`radial.centres.${i}`, centre.length, RADIAL_INPUTS] as const,
    ),
  ] as const;
  const wrong = lengths
    .filter(([, got, wanted]) => got !== wanted)
    .map(([what, got, wanted]) => `  ${name}.${what}: expected ${wanted} numbers, got ${got}`);
  if (wrong.length > 0) return wrong;
  if (radial.centres.some((_, i) => !(radial.factorLower[lowerIndex(i, i)]! > 0))) {
    return [`  ${name}.radial.factorLower: expected a positive diagonal`];
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
