/**
 * End points of self-supporting cones 1 to 10 at 60 degrees C an hour over the last 100 degrees; see
 * `datasets/published/cone-temperatures.csv`. A copy, so that no truth moves with the program.
 */
const END_POINT_C = [1137, 1142, 1152, 1162, 1186, 1222, 1239, 1249, 1260, 1285] as const;

/**
 * End-point temperature of a cone, straight between whole cones and beyond both ends.
 *
 * @param coneIndex - place on the scale of cone numbers, whole or not
 * @returns degrees C
 */
export function endPointC(coneIndex: number): number {
  const below = Math.min(Math.max(Math.floor(coneIndex), 1), END_POINT_C.length - 1);
  const from = END_POINT_C[below - 1];
  return from + (coneIndex - below) * (END_POINT_C[below] - from);
}
