/**
 * Temperatures at which self-supporting cones are bent to their end point, in degrees C, when heated
 * at 60 degrees C an hour over the last 100 degrees: cone index (06 is -5), temperature.
 *
 * Source: Edward Orton Jr. Ceramic Foundation, chart of temperature equivalents for self-supporting
 * cones; verified in two transcriptions of it and a third in degrees F, the half cones in two. The
 * rows with their status stand in `datasets/published/cone-temperatures.csv`.
 */
const END_POINT_C: readonly (readonly [coneIndex: number, endPointC: number])[] = [
  [-21, 586],
  [-20, 600],
  [-19, 626],
  [-18, 678],
  [-17, 715],
  [-16, 738],
  [-15, 772],
  [-14, 791],
  [-13, 807],
  [-12, 837],
  [-11, 861],
  [-10, 875],
  [-9, 903],
  [-8, 920],
  [-7, 942],
  [-6, 976],
  [-5, 998],
  [-4.5, 1015],
  [-4, 1031],
  [-3, 1063],
  [-2, 1086],
  [-1, 1102],
  [0, 1119],
  [1, 1137],
  [2, 1142],
  [3, 1152],
  [4, 1162],
  [5, 1186],
  [5.5, 1203],
  [6, 1222],
  [7, 1239],
  [8, 1249],
  [9, 1260],
  [10, 1285],
  [11, 1294],
  [12, 1306],
  [13, 1331],
  [14, 1365],
];

/**
 * Temperature at which a cone is bent to its end point at 60 degrees C an hour.
 *
 * Between the cones of the chart on a straight line; beyond its ends (022 and 14) the end's value,
 * since the chart says no more. Another rate or a hold moves it by tens of degrees: good for telling
 * 6 from 06, not for measuring heat work.
 *
 * @param coneIndex - place on the scale of `coneIndex`: 06 is -5
 * @returns degrees C, to the degree at the cones of the chart
 * @throws {RangeError} if the index is no number
 * @example
 * endPointC(6); // 1222
 * endPointC(-5); // 998
 * endPointC(6.5); // 1230.5
 *
 * Source: see the table above, self-supporting cones at 60 degrees C an hour.
 */
export function endPointC(coneIndex: number): number {
  if (Number.isNaN(coneIndex)) throw new RangeError('coneIndex must be a number, got NaN');
  const above = END_POINT_C.findIndex(([index]) => index >= coneIndex);
  const [upperIndex, upperC] = END_POINT_C.at(above)!;
  // Beyond the hottest cone `above` is -1 and `at` gives the last row.
  const [lowerIndex, lowerC] = END_POINT_C[Math.max(above - 1, 0)]!;
  if (above <= 0 || upperIndex === lowerIndex) return upperC;
  return lowerC + ((upperC - lowerC) * (coneIndex - lowerIndex)) / (upperIndex - lowerIndex);
}
