import { coneIndex, coneText } from '../firing/cone.ts';
import { coneNearestToC, endPointC, endPointRangeC } from '../firing/end-points.ts';

/**
 * How far in degrees C a peak may lie outside the end points of the chart, from those of a slow firing
 * (15 degrees C an hour) to those of a fast one (150), and still fit the cone: a thermocouple off by some
 * degrees, a long hold, a faster firing still. Common practice, no source.
 */
const MARGIN_C = 30;
/** The chart ends at cone 14: hotter ones it does not bound from above. */
const HOTTEST_OF_CHART = 14;

/** A peak that a cone does not have. */
export interface PeakMisfit {
  /** End point of the cone as written at 60 degrees C an hour, in degrees C. */
  readonly usualC: number;
  /** The whole cone that is usually down at the peak. */
  readonly nearestCone: string;
}

/**
 * Says so where a cone was probably written with a zero that a spreadsheet dropped: 06 became 6.
 *
 * @param cone - as written: '6', '06', '6.5'
 * @param peakC - peak temperature of its firing, in degrees C
 * @returns a message where the peak fits the zero form and not the cone as written, else undefined
 */
export function lostZero(cone: string, peakC: number): string | undefined {
  const index = coneIndex(cone);
  // Cones from 1 to 22 have a zero form; 0.5 lies between 01 and 1.
  if (index < 1 || index > 22) return undefined;
  const zeroIndex = 1 - index;
  if (fits(index, peakC) || !fits(zeroIndex, peakC)) return undefined;
  const zeroForm = `${coneText(zeroIndex)} (about ${Math.round(endPointC(zeroIndex))} °C)`;
  const written = `"${cone}" (about ${Math.round(endPointC(index))} °C)`;
  return (
    `expected a cone that fits peak_c ${peakC}, got ${written}; ` +
    `${zeroForm} fits better: spreadsheets turn ${coneText(zeroIndex)} into ${cone}`
  );
}

/**
 * Whether a peak is unlike those at which a cone is down, at any rate of heating of the chart.
 *
 * @param cone - as written: '6', '06', '6.5'
 * @param peakC - peak temperature of its firing, in degrees C
 * @returns what the cone and the peak usually go with; undefined where they fit each other
 */
export function peakMisfit(cone: string, peakC: number): PeakMisfit | undefined {
  const index = coneIndex(cone);
  if (fits(index, peakC)) return undefined;
  return {
    usualC: Math.round(endPointC(index)),
    nearestCone: coneText(coneNearestToC(peakC)),
  };
}

function fits(index: number, peakC: number): boolean {
  const { slowC, fastC } = endPointRangeC(index);
  const isBounded = index <= HOTTEST_OF_CHART;
  return peakC >= slowC - MARGIN_C && (!isBounded || peakC <= fastC + MARGIN_C);
}
