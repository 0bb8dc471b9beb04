import type { Archive } from '../../../src/archive/archive.ts';
import type { Unity } from '../../../src/chemistry/unity.ts';
import type { Surface, SurfaceProbability } from '../../../src/model/model.ts';

/** 5 to 95 % quantile of a probability. */
export type Interval90 = readonly [number, number];

/** What a learner says of one point at one cone. */
export interface PointAnswer {
  readonly probability: SurfaceProbability;
  /** Absent where a learner knows no interval. */
  readonly interval90?: Readonly<Record<Surface, Interval90>>;
}

/** Answers of a fitted learner, in the order of the points, then of the cones. */
export type Learned = (points: readonly Unity[], coneIndexes: readonly number[]) => PointAnswer[];

/** Learns an archive; all of them are compared on the same ones. */
export type Learner = (archive: Archive) => Learned;

/** The surfaces, in the order in which they are printed. */
export const SURFACES = ['underfired', 'matte', 'gloss'] as const satisfies readonly Surface[];

/** The cones that all learners are asked about. */
export const ASKED_CONES: readonly number[] = [5, 6, 7];
