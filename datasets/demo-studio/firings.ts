import type { Chance } from './chance.ts';
import { LOADS, type PlannedLoad } from './plan.ts';
import { endPointC } from './surfaces.ts';

/** One load as it went: what the studio wrote down, and how far the paper is from the truth. */
export interface DrawnFiring extends PlannedLoad {
  /** Cone read on the middle shelf, as a number; absent without a witness cone. */
  readonly cone?: number;
  /** Cones read on every shelf, as numbers; empty without witness cones on the shelves. */
  readonly shelves: ReadonlyMap<string, number>;
  readonly peakC: number;
  readonly holdMin: number;
  readonly coolingCPerH: number;
  /** True heat less the heat on paper, in cones: the load's error. */
  readonly loadErrorCones: number;
}

/** Cones by which a load's heat differs from what its paper says. */
const LOAD_ERROR_SD_CONES = 0.18;
/** Cones by which a load differs from what it was set to, read and written down. */
const FIRING_SD_CONES = 0.08;
/** The elements of Dabchick wear: cones lost from one firing to the next. */
const DRIFT_CONES_PER_FIRING = -0.08;
/** Dabchick's bottom shelf runs cooler than its top; Heron is even. */
const SHELF_CONES = {
  Heron: { top: 0.05, middle: 0, bottom: -0.05 },
  Dabchick: { top: 0.12, middle: 0, bottom: -0.22 },
} as const;
const SHELF_SD_CONES = 0.05;
/** What a thermocouple says beside the cone. */
const PEAK_SD_C = 3;
/** A bent witness cone is read to a quarter. */
const readCone = (cone: number) => Math.round(cone * 4) / 4;

/**
 * All loads, in the order in which they were fired.
 *
 * @param chance - decides how each load went
 * @returns loads with readings and true errors
 */
export function drawFirings(chance: Chance): readonly DrawnFiring[] {
  return LOADS.map((planned) => drawFiring(planned, chance));
}

function drawFiring(planned: PlannedLoad, chance: Chance): DrawnFiring {
  const { kiln, setCone, witness } = planned;
  const before = LOADS.filter((other) => other.kiln === kiln && other.date < planned.date).length;
  const worn = kiln === 'Dabchick' ? before * DRIFT_CONES_PER_FIRING : 0;
  const reached = setCone + worn + FIRING_SD_CONES * chance.normal();
  const shelves = readShelves(SHELF_CONES[kiln], reached, chance);
  const byChance = LOAD_ERROR_SD_CONES * chance.normal();
  const missed = planned.errorCones ?? byChance;
  const middle = witness === 'one' ? readCone(reached) : shelves.get('middle');
  return {
    ...planned,
    ...(witness === 'none' || middle === undefined ? {} : { cone: middle }),
    shelves: witness === 'shelves' ? shelves : new Map(),
    peakC: Math.round(endPointC(reached) + PEAK_SD_C * chance.normal()),
    holdMin: chance.uniform() < 0.7 ? 10 : 15,
    coolingCPerH: 5 * Math.round((kiln === 'Heron' ? 19 : 27) + chance.normal()),
    // Without a witness cone the paper is what was set, and knows nothing of worn elements.
    loadErrorCones: missed + (witness === 'none' ? worn : 0),
  };
}

function readShelves(
  offsets: Readonly<Record<string, number>>,
  reached: number,
  chance: Chance,
): ReadonlyMap<string, number> {
  const read = (offset: number) => readCone(reached + offset + SHELF_SD_CONES * chance.normal());
  return new Map(Object.entries(offsets).map(([shelf, offset]) => [shelf, read(offset)]));
}

/**
 * The heat that the archive gives for a place in a load: the shelf's witness cone, else the
 * firing's, else what was set.
 *
 * @param firing - a load
 * @param shelf - shelf of the tile
 * @returns cone as a number
 */
export function heatOnPaper(firing: DrawnFiring, shelf: string): number {
  return firing.shelves.get(shelf) ?? firing.cone ?? firing.setCone;
}
