import { coneIndex, coneText } from '../firing/cone.ts';
import { endPointC } from '../firing/end-points.ts';

/**
 * Least distance in degrees C between the end points of a cone and its zero form at which a peak can
 * tell them apart: a slow firing or a hold lowers the peak that a cone needs by more than the 18
 * degrees between 01 and 1. Chosen here from the chart's columns for 15 and 60 degrees C an hour.
 */
const LEAST_GAP_C = 30;

/**
 * Says so where a cone was probably written with a zero that a spreadsheet dropped: 06 became 6.
 *
 * @param cone - as written: '6', '06', '6.5'
 * @param peakC - peak temperature of its firing, in degrees C
 * @returns a message, or undefined where the cone as written fits the peak at least as well
 */
export function lostZero(cone: string, peakC: number): string | undefined {
  const index = coneIndex(cone);
  // Cones from 1 to 22 have a zero form; 0.5 lies between 01 and 1.
  if (index < 1 || index > 22) return undefined;
  const zeroIndex = 1 - index;
  const writtenC = endPointC(index);
  const zeroC = endPointC(zeroIndex);
  const fitsZeroForm = Math.abs(peakC - zeroC) < Math.abs(peakC - writtenC);
  if (!fitsZeroForm || writtenC - zeroC < LEAST_GAP_C) return undefined;
  const zeroForm = `${coneText(zeroIndex)} (about ${Math.round(zeroC)} °C)`;
  return (
    `expected a cone that fits peak_c ${peakC}, got "${cone}" (about ${Math.round(writtenC)} °C); ` +
    `${zeroForm} fits better: spreadsheets turn ${coneText(zeroIndex)} into ${cone}`
  );
}
