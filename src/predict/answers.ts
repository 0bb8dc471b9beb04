import type { Surface, SurfaceProbability } from '../model/model.ts';
import type { Unity } from '../chemistry/unity.ts';

/** 5 to 95 % quantile. */
export type Interval90 = readonly [number, number];
/** As Interval90; null where that end leaves the range looked at. */
export type PlaceInterval90 = readonly [number | null, number | null];
export type SurfaceInterval90 = Readonly<Record<Surface, Interval90>>;
/** How far inside the archive's experience a point at a cone is. */
export type Support = 'inside' | 'edge' | 'outside';

/** A composition that is asked about. */
export interface Point {
  readonly point: string;
  readonly unity: Unity;
}

export interface NearTile {
  readonly tile: string;
  readonly surface: string;
  readonly cone: string;
  /** Steps of the support measure. */
  readonly distance: number;
}

export interface ModelStamp {
  /** Tiles fitted. */
  readonly tiles: number;
  readonly archive: string;
  /** What firing the answers are for, where the model knows that it matters. */
  readonly usualFiring?: UsualFiring;
}

/** The middle cooling and the commonest atmosphere of the fitted tiles. */
export interface UsualFiring {
  readonly coolingCPerH?: number;
  readonly atmosphere?: 'oxidation' | 'reduction';
}

/** The answer for one point at one cone. */
export interface ConeAnswer {
  readonly cone: string;
  readonly coneIndex: number;
  readonly surface: Surface;
  readonly probability: SurfaceProbability;
  readonly interval90: SurfaceInterval90;
  readonly support: Support;
  readonly nearest: readonly NearTile[];
  readonly notes: readonly string[];
}

export interface Prediction extends ConeAnswer {
  readonly point: string;
}

export interface Predictions {
  readonly schema: 'coneshift.predictions/1';
  readonly model: ModelStamp;
  readonly predictions: readonly Prediction[];
}

/** A cone at which the most probable surface changes. */
export interface Turn {
  readonly from: Surface;
  readonly to: Surface;
  readonly coneIndex: number;
  readonly cone: string;
  readonly interval90: PlaceInterval90;
  /** Share of the posterior without this turn in the range looked at. */
  readonly noCrossing: number;
}

export interface PointShift {
  readonly point: string;
  readonly unity: Unity;
  readonly cones: readonly ConeAnswer[];
  readonly turns: readonly Turn[];
  /** Cones between which turns were looked for. */
  readonly lookedAt: readonly [number, number];
  /** What happens, in a sentence or two. */
  readonly words: string;
  /** Overfired tiles within the edge radius of this glaze at one of the cones. */
  readonly overfiredNear: readonly NearTile[];
}

export interface Shift {
  readonly schema: 'coneshift.shift/1';
  readonly model: ModelStamp;
  readonly points: readonly PointShift[];
}

export type BoundaryAxis = 'Al2O3' | 'SiO2' | 'SiO2:Al2O3';

/** One crossing of one boundary with one line through the composition. */
export interface Boundary {
  readonly cone: string;
  readonly coneIndex: number;
  readonly kind: 'melt' | 'gloss';
  readonly along: BoundaryAxis;
  /** What is held along the line. */
  readonly at: Readonly<Record<string, number>>;
  /** Place of the boundary, mol per mol flux or a ratio; null where the line does not meet it. */
  readonly value: number | null;
  readonly interval90: PlaceInterval90;
  readonly noCrossing: number;
  /** Range looked at. */
  readonly lookedAt: readonly [number, number];
  /** Tiles judged near this boundary: within the edge radius in composition, half a cone in heat. */
  readonly tilesNear: number;
  /** How far inside the archive the place lies at this cone; null without a place. */
  readonly support: Support | null;
  readonly nearest: readonly NearTile[];
  /** How far the place moves for one cone more heat, with its interval; null where unknown. */
  readonly perCone: number | null;
  readonly perConeInterval90: PlaceInterval90;
  /** Surface below the place and above it, along the axis. */
  readonly below: string;
  readonly above: string;
}

export interface Boundaries {
  readonly schema: 'coneshift.boundaries/1';
  readonly model: ModelStamp;
  /** Composition through which the lines run, and where it comes from. */
  readonly through: Unity;
  readonly throughSource: string;
  readonly boundaries: readonly Boundary[];
  readonly notes: readonly string[];
}
