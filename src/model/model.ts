import type { Archive } from '../archive/archive.ts';
import type { Radial } from './radial.ts';

/** The surfaces that the model tells apart, from least to most melted and smooth. */
export const SURFACES = ['underfired', 'matte', 'gloss'] as const;
export type Surface = (typeof SURFACES)[number];
export type SurfaceProbability = Readonly<Record<Surface, number>>;

/** A group of columns that share one prior sd, re-estimated from the tiles. */
export interface PriorGroup {
  readonly name: string;
  readonly columns: readonly string[];
  /** Prior sd before any tile, and as re-estimated. */
  readonly startSd: number;
  readonly sd: number;
}

/** A number known up to a Gaussian error. */
export interface MeanAndSd {
  readonly mean: number;
  readonly sd: number;
}

/** What the tiles say of one load: how far it stands from the archive's other loads. */
export interface LoadEffect {
  readonly load: string;
  readonly tiles: number;
  /** Heat of the load less its cone on paper, in cones. */
  readonly offsetCones: MeanAndSd;
  /** What its cooling and atmosphere did to gloss beyond `firingEffects`, log-odds. */
  readonly glossLogOdds: MeanAndSd;
}

/** How much loads differ, re-estimated from the tiles. */
export interface LoadSpread {
  /** Spread of a load's heat about the cone on paper, in cones: the scale of a Student's t with 5 degrees. */
  readonly offsetScaleCones: number;
  /** Sd of a load's own intercept of gloss, log-odds. */
  readonly glossSd: number;
}

/** What cooling or atmosphere does to the log-odds of gloss; answers are for the usual one. */
export type FiringEffect = CoolingEffect | AtmosphereEffect;

interface FiringEffectKnown {
  /** Of cooling twice as fast, or of the other atmosphere. */
  readonly gloss: MeanAndSd;
  /** Matte and gloss tiles of which it is recorded, and of which it is not: these count as usual. */
  readonly known: number;
  readonly unknown: number;
}

export interface CoolingEffect extends FiringEffectKnown {
  readonly column: 'cooling';
  readonly usualCPerH: number;
}

export interface AtmosphereEffect extends FiringEffectKnown {
  readonly column: 'atmosphere';
  readonly usual: 'oxidation' | 'reduction';
}

/** One fitted stage: a Gaussian posterior over the weights of its columns. */
export interface Stage {
  readonly columns: readonly string[];
  /** Radial columns, after the others: a smooth departure from them, seen through centres. */
  readonly radial: Radial;
  /** Posterior mean of each weight, log-odds per unit of the column; the radial ones last. */
  readonly mean: readonly number[];
  /** Posterior covariance of the weights: lower triangle, row by row. */
  readonly covarianceLower: readonly number[];
  readonly groups: readonly PriorGroup[];
  /** Sd of the smooth departure, log-odds: before any tile, and as re-estimated. */
  readonly residual: { readonly startSd: number; readonly sd: number };
  /** Share of verdicts taken to be the wrong way round, re-estimated. */
  readonly wrongVerdicts: number;
  readonly tiles: { readonly no: number; readonly yes: number };
}

/** How predictions held on tiles that the fit did not see. */
export interface HeldOut {
  /** Mean natural log of the probability given to what was seen: 0 is perfect. Null without folds. */
  readonly logScore: number | null;
  /** The same for the shares of the surfaces among the fitted tiles. */
  readonly baseRateLogScore: number | null;
  readonly folds: number;
  /** Tiles predicted. */
  readonly tiles: number;
  /** Tiles whose most probable surface was given at least 0.9, and how many of them were right. */
  readonly sure: { readonly called: number; readonly right: number };
  /** By the probability of the most probable surface: mean stated and share right. */
  readonly reliability: readonly ReliabilityRow[];
  /** One row a fold: what was left out and how it went. */
  readonly parts: readonly HeldOutPart[];
}

export interface ReliabilityRow {
  readonly from: number;
  readonly to: number;
  readonly tiles: number;
  readonly stated: number | null;
  readonly right: number | null;
}

export interface HeldOutPart {
  readonly leftOut: string;
  readonly tiles: number;
  readonly logScore: number;
  readonly baseRateLogScore: number;
}

export interface Validation {
  /** Each fired cone predicted from the other cones: the question the tool is for. */
  readonly byCone: HeldOut;
  readonly byLoad: HeldOut;
  /** No recipe, formula or blend on both sides. */
  readonly byGlaze: HeldOut;
  readonly notes: readonly string[];
}

/** Something that puts a fit in doubt. */
export interface Diagnostic {
  readonly kind: DiagnosticKind;
  /** The side, stage, cone, oxide or column that it is about. */
  readonly about: string;
  /** What was measured, and the bound that it does not keep. */
  readonly value: number;
  readonly threshold: number;
  /** The same in words, with what to do. */
  readonly text: string;
}

export type DiagnosticKind = (typeof DIAGNOSTIC_KINDS)[number];
export const DIAGNOSTIC_KINDS = [
  'heat hardly shows',
  'few tiles',
  'separated',
  'approximation doubtful',
  'cone without tiles',
  'one cone',
  'one load',
  'oxide without a column',
  'firing not recorded',
] as const;

/** A fitted model, with all that was read: commands on it need nothing else. */
export interface Model {
  readonly schema: 'coneshift.model/1';
  readonly madeBy: string;
  readonly archive: Archive;
  readonly melt: Stage;
  readonly gloss: Stage;
  readonly loadSpread: LoadSpread;
  /** The named loads. */
  readonly loads: readonly LoadEffect[];
  /** Absent where no firing records them, or all record the same. */
  readonly firingEffects?: readonly FiringEffect[];
  /** Laplace estimate of the log evidence at the re-estimated sds. */
  readonly logEvidence: number;
  readonly validation: Validation;
  readonly diagnostics: readonly Diagnostic[];
  /** The diagnostics in words, and what else is to be minded. */
  readonly notes: readonly string[];
}
