import { coneIndex } from '../firing/cone.ts';
import type { Firing, Heat, HeatSource, WitnessReading } from './archive.ts';
import { quoted } from './found-text.ts';
import { lostZero } from './lost-zero.ts';
import type { Register } from './register.ts';
import { shelfKey } from './witness-rows.ts';

/** What a tile's row says of its heat. */
export interface HeatCells {
  readonly cone?: string | undefined;
  readonly firing?: string | undefined;
  readonly shelf?: string | undefined;
  /** Peak of its firing in degrees C, where its own row tells it. */
  readonly peakC?: number | undefined;
}

/** The heat of a tile, or the column at fault and why. */
export type HeatRead =
  | { readonly heat: Heat }
  | {
      readonly column: string;
      readonly problem: string;
      /** No heat is known; no fault on a tile that is not judged yet. */
      readonly isMissing: boolean;
    };

/**
 * The heat of a tile: its own cone, else the witness cone of its shelf, else the cone that its firing
 * reached, else the one it was set to.
 *
 * @param cells - what its row says
 * @param firing - its firing, where there is a firings.csv that holds it
 * @param witness - the witness cones, where there is a witness.csv
 * @returns the heat and where it was read, or what is wrong
 */
export function tileHeat(
  cells: HeatCells,
  firing: Firing | undefined,
  witness: Register<WitnessReading> | undefined,
): HeatRead {
  const { cone, shelf } = cells;
  if (cone !== undefined) {
    const peakC = cells.peakC ?? firing?.peakC;
    const problem = peakC === undefined ? undefined : lostZero(cone, peakC);
    if (problem !== undefined) return { column: 'cone', problem, isMissing: false };
    return { heat: heatOf(cone, 'tile') };
  }
  if (cells.firing === undefined) {
    const problem = 'expected a cone or a firing, got neither';
    return { column: 'cone', problem, isMissing: true };
  }
  const onShelf =
    witness === undefined || shelf === undefined
      ? undefined
      : shelfHeat(cells.firing, shelf, witness);
  return onShelf ?? firingHeat(cells.firing, firing);
}

function shelfHeat(
  firing: string,
  shelf: string,
  witness: Register<WitnessReading>,
): HeatRead | undefined {
  const key = shelfKey(firing, shelf);
  const reading = witness.sound.get(key);
  if (reading !== undefined) return { heat: heatOf(reading.cone, 'witness cone') };
  const line = witness.faulty.get(key);
  // A shelf without a witness cone has the heat of its firing.
  if (line === undefined && !witness.unreadable) return undefined;
  const place = line === undefined ? witness.file : `${witness.file}:${line}`;
  const problem = `expected a witness cone without faults for shelf ${quoted(shelf)}; see ${place}`;
  return { column: 'shelf', problem, isMissing: false };
}

function firingHeat(name: string, firing: Firing | undefined): HeatRead {
  if (firing?.cone !== undefined) return { heat: heatOf(firing.cone, 'firing') };
  if (firing?.setCone !== undefined) return { heat: heatOf(firing.setCone, 'set cone') };
  const problem = `expected a cone, since no firings.csv tells that of firing ${quoted(name)}`;
  return { column: 'cone', problem, isMissing: true };
}

function heatOf(cone: string, source: HeatSource): Heat {
  return { cone, coneIndex: coneIndex(cone), source };
}
