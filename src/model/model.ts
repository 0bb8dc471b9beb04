import type { Archive } from '../archive/archive.ts';

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

/** What the tiles say of one load: how far it stands from the archive's other loads. */
export interface LoadEffect {
  readonly load: string;
  readonly tiles: number;
  /** Log-odds; 0 is the middle of all loads. */
  readonly mean: number;
  readonly sd: number;
}

/** One fitted stage: a Gaussian posterior over the weights of its columns. */
export interface Stage {
  readonly columns: readonly string[];
  /** Posterior mean of each weight, log-odds per unit of the column. */
  readonly mean: readonly number[];
  /** Posterior covariance of the weights: lower triangle, row by row. */
  readonly covarianceLower: readonly number[];
  readonly groups: readonly PriorGroup[];
  /** Sd of the loads' own intercepts, re-estimated. */
  readonly loadSd: number;
  readonly loads: readonly LoadEffect[];
  readonly tiles: { readonly no: number; readonly yes: number };
  /** Laplace estimate of the log evidence at the re-estimated sds. */
  readonly logEvidence: number;
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

/** A fitted model, with all that was read: commands on it need nothing else. */
export interface Model {
  readonly schema: 'coneshift.model/1';
  readonly madeBy: string;
  readonly archive: Archive;
  readonly melt: Stage;
  readonly gloss: Stage;
  readonly validation: Validation;
  readonly notes: readonly string[];
}
