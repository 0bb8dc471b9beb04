/** One cone of the chart: its index, then its end point in degrees C at 15, 60 and 150 degrees an hour. */
type ChartRow = readonly [
  coneIndex: number,
  slowC: number | null,
  endPointC: number,
  fastC: number,
];

/**
 * Temperatures at which self-supporting cones are bent to their end point, in degrees C, when heated
 * at 15, 60 and 150 degrees C an hour over the last 100 degrees; cone index (06 is -5) first, null where
 * the chart gives none.
 *
 * Source: Edward Orton Jr. Ceramic Foundation, chart of temperature equivalents for self-supporting
 * cones; verified in two copies of it (15 degrees an hour) and a third in degrees F (60 and
 * 150), the half cones in two. The rows with their status stand in
 * `datasets/published/cone-temperatures.csv`.
 */
const CHART: readonly ChartRow[] = [
  [-21, null, 586, 590],
  [-20, null, 600, 617],
  [-19, null, 626, 638],
  [-18, 656, 678, 695],
  [-17, 686, 715, 734],
  [-16, 705, 738, 763],
  [-15, 742, 772, 796],
  [-14, 750, 791, 818],
  [-13, 757, 807, 838],
  [-12, 807, 837, 861],
  [-11, 843, 861, 882],
  [-10, 857, 875, 894],
  [-9, 891, 903, 915],
  [-8, 907, 920, 930],
  [-7, 922, 942, 956],
  [-6, 962, 976, 987],
  [-5, 981, 998, 1013],
  [-4.5, 1004, 1015, 1025],
  [-4, 1021, 1031, 1044],
  [-3, 1046, 1063, 1077],
  [-2, 1071, 1086, 1104],
  [-1, 1078, 1102, 1122],
  [0, 1093, 1119, 1138],
  [1, 1109, 1137, 1154],
  [2, 1112, 1142, 1164],
  [3, 1115, 1152, 1170],
  [4, 1141, 1162, 1183],
  [5, 1159, 1186, 1207],
  [5.5, 1167, 1203, 1225],
  [6, 1185, 1222, 1243],
  [7, 1201, 1239, 1257],
  [8, 1211, 1249, 1271],
  [9, 1224, 1260, 1280],
  [10, 1251, 1285, 1305],
  [11, 1272, 1294, 1315],
  [12, 1285, 1306, 1326],
  [13, 1310, 1331, 1348],
  [14, 1351, 1365, 1384],
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
  return between(coneIndex, ([, , usualC]) => usualC);
}

/** Where the end point of a cone lies over the heating rates of the chart, in degrees C. */
export interface EndPointRange {
  /** At 15 degrees C an hour; cones 022 to 020 at 60, where the chart begins for them. */
  readonly slowC: number;
  /** At 150 degrees C an hour. */
  readonly fastC: number;
}

/**
 * Temperatures at which a cone is bent to its end point, heated slowly and fast.
 *
 * @param coneIndex - place on the scale of `coneIndex`: 06 is -5
 * @returns end points at 15 and at 150 degrees C an hour; beyond the chart's ends those of the end
 * @throws {RangeError} if the index is no number
 * @example
 * endPointRangeC(6); // { slowC: 1185, fastC: 1243 }
 *
 * Source: see the table above, self-supporting cones.
 */
export function endPointRangeC(coneIndex: number): EndPointRange {
  return {
    slowC: between(coneIndex, ([, slowC, usualC]) => slowC ?? usualC),
    fastC: between(coneIndex, ([, , , fastC]) => fastC),
  };
}

/**
 * The whole cone whose end point at 60 degrees C an hour is nearest to a temperature.
 *
 * @param celsius - degrees C
 * @returns its index, from -21 (022) to 14; the cooler of two equally near
 * @throws {RangeError} if the temperature is no number
 * @example
 * coneNearestToC(1150); // 3
 *
 * Source: see the table above, self-supporting cones at 60 degrees C an hour.
 */
export function coneNearestToC(celsius: number): number {
  if (Number.isNaN(celsius)) throw new RangeError('celsius must be a number, got NaN');
  const whole = CHART.filter(([index]) => Number.isInteger(index));
  const apart = ([, , usualC]: ChartRow) => Math.abs(usualC - celsius);
  return whole.reduce((best, row) => (apart(row) < apart(best) ? row : best))[0];
}

/** The value of a column at a cone: between two cones of the chart on a straight line. */
function between(coneIndex: number, columnOf: (row: ChartRow) => number): number {
  if (Number.isNaN(coneIndex)) throw new RangeError('coneIndex must be a number, got NaN');
  const above = CHART.findIndex(([index]) => index >= coneIndex);
  // Beyond the hottest cone `above` is -1 and `at` gives the last row.
  const upper = CHART.at(above)!;
  const lower = CHART[Math.max(above - 1, 0)]!;
  const [upperC, lowerC] = [columnOf(upper), columnOf(lower)];
  if (above <= 0 || upper === lower) return upperC;
  return lowerC + ((upperC - lowerC) * (coneIndex - lower[0])) / (upper[0] - lower[0]);
}
