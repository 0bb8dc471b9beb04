import * as z from 'zod';
import { OXIDES, isOxide, type Oxide } from '../chemistry/oxides.ts';
import { coneIndex } from '../firing/cone.ts';
import { DIAGNOSTIC_KINDS } from './model.ts';

/** Name and version of the model file. */
export const MODEL_SCHEMA = 'coneshift.model/1';

const text = z.string();
const number = z.number();
const positive = number.positive();
const count = z.number().int().nonnegative();
const share = z.number().min(0).max(1);
const coneName = text.refine(isCone, 'expected a cone');
const amounts = z
  .record(text, number.nonnegative())
  .refine((record) => Object.keys(record).every(isOxide), `expected oxides (${OXIDES.join(', ')})`)
  .transform((record) => record as Partial<Record<Oxide, number>>);
const unity = amounts.refine((record) => (record.SiO2 ?? 0) > 0, 'expected SiO2');
/** Kept as parsed: a record would lose a column named `__proto__`. */
const other = z.custom<Readonly<Record<string, string>>>(isTexts, 'expected texts').exactOptional();

function isTexts(value: unknown): boolean {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return false;
  return Object.values(value).every((cell) => typeof cell === 'string');
}

function isCone(name: string): boolean {
  try {
    coneIndex(name);
    return true;
  } catch {
    return false;
  }
}

const tile = z.strictObject({
  tile: text,
  line: count,
  unity,
  recipe: text.exactOptional(),
  blend: text.exactOptional(),
  firing: text.exactOptional(),
  heat: z
    .strictObject({
      cone: coneName,
      coneIndex: number,
      source: z.enum(['tile', 'witness cone', 'firing', 'set cone']),
    })
    .exactOptional(),
  load: text,
  surfaceWritten: text,
  verdict: z.enum(['underfired', 'matte', 'gloss', 'melted', 'overfired', 'unjudged']),
  drip: z.enum(['melted', 'unmelted']).exactOptional(),
  crazing: z.enum(['none', 'wide', 'fine']).exactOptional(),
  shivering: z.boolean().exactOptional(),
  body: text.exactOptional(),
  shelf: text.exactOptional(),
  thicknessMm: number.exactOptional(),
  glossUnits: number.exactOptional(),
  judgedBy: text.exactOptional(),
  note: text.exactOptional(),
  other,
});

const firing = z.strictObject({
  firing: text,
  line: count,
  date: text.exactOptional(),
  kiln: text.exactOptional(),
  setCone: coneName.exactOptional(),
  cone: coneName.exactOptional(),
  peakC: number.exactOptional(),
  holdMin: number.exactOptional(),
  coolingCPerH: number.exactOptional(),
  atmosphere: z.enum(['oxidation', 'reduction']).exactOptional(),
  log: text.exactOptional(),
  other,
});

const archive = z.strictObject({
  fingerprint: text.regex(/^sha256:[0-9a-f]{64}$/, 'expected sha256: and 64 hex digits'),
  files: z.array(z.strictObject({ file: text, rows: count })),
  tiles: z.array(tile),
  firings: z.array(firing),
  witness: z.array(
    z.strictObject({
      firing: text,
      line: count,
      shelf: text,
      cone: coneName,
      coneIndex: number,
      other,
    }),
  ),
  recipes: z.array(
    z.strictObject({
      recipe: text,
      lines: z.array(
        z.strictObject({
          material: text,
          parts: positive,
          over100: z.boolean(),
          line: count,
          other,
        }),
      ),
      unity: amounts,
    }),
  ),
  materials: z.array(
    z.strictObject({
      material: text,
      line: count,
      analysis: amounts.exactOptional(),
      basis: z.enum(['raw', 'fired']).exactOptional(),
      formula: text.exactOptional(),
      loiPercent: number,
      molesPer100g: amounts,
      soluble: z.boolean(),
      other,
    }),
  ),
  bodies: z.array(
    z.strictObject({
      body: text,
      line: count,
      maturesAtCone: coneName.exactOptional(),
      absorptionPercent: number.exactOptional(),
      expansionPerK: number.exactOptional(),
      other,
    }),
  ),
  counts: z.strictObject({
    read: count,
    fitted: count,
    unjudged: count,
    setAside: count,
    refused: count,
  }),
  notes: z.array(text),
});

const meanAndSd = z.strictObject({ mean: number, sd: positive });

const firingEffect = z.discriminatedUnion('column', [
  z.strictObject({
    column: z.literal('cooling'),
    usualCPerH: positive,
    gloss: meanAndSd,
    known: count,
    unknown: count,
  }),
  z.strictObject({
    column: z.literal('atmosphere'),
    usual: z.enum(['oxidation', 'reduction']),
    gloss: meanAndSd,
    known: count,
    unknown: count,
  }),
]);

const stage = z.strictObject({
  columns: z.array(text),
  radial: z.strictObject({ centres: z.array(z.array(number)), factorLower: z.array(number) }),
  mean: z.array(number),
  covarianceLower: z.array(number),
  groups: z.array(
    z.strictObject({ name: text, columns: z.array(text), startSd: positive, sd: positive }),
  ),
  residual: z.strictObject({ startSd: positive, sd: positive }),
  wrongVerdicts: share,
  tiles: z.strictObject({ no: count, yes: count }),
});

const heldOut = z.strictObject({
  logScore: number.nullable(),
  baseRateLogScore: number.nullable(),
  folds: count,
  tiles: count,
  sure: z.strictObject({ called: count, right: count }),
  reliability: z.array(
    z.strictObject({
      from: share,
      to: share,
      tiles: count,
      stated: share.nullable(),
      right: share.nullable(),
    }),
  ),
  parts: z.array(
    z.strictObject({ leftOut: text, tiles: count, logScore: number, baseRateLogScore: number }),
  ),
});

/** What a model file must hold, to the last key. */
export const modelShape = z.strictObject({
  schema: z.literal(MODEL_SCHEMA),
  madeBy: text,
  archive,
  melt: stage,
  gloss: stage,
  loadSpread: z.strictObject({ offsetScaleCones: positive, glossSd: positive }),
  loads: z.array(
    z.strictObject({ load: text, tiles: count, offsetCones: meanAndSd, glossLogOdds: meanAndSd }),
  ),
  firingEffects: z.array(firingEffect).exactOptional(),
  logEvidence: number,
  validation: z.strictObject({
    byCone: heldOut,
    byLoad: heldOut,
    byGlaze: heldOut,
    notes: z.array(text),
  }),
  diagnostics: z.array(
    z.strictObject({
      kind: z.enum(DIAGNOSTIC_KINDS),
      about: text,
      value: number,
      threshold: number,
      text,
    }),
  ),
  notes: z.array(text),
});
