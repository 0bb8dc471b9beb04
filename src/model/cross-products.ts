import { lowerIndex } from '../numeric/linalg.ts';

/**
 * Adds the rows' weighted cross products: the inner loop of the fit, which takes most of its time. Four
 * rows and two columns at once, so that numbers are read and written less often than they are used.
 *
 * @param rows - [rows][size]
 * @param size - columns
 * @param curvatures - weight of each row
 * @param products - lower triangle, changed
 */
export function addCrossProducts(
  rows: Float64Array,
  size: number,
  curvatures: Float64Array,
  products: Float64Array,
): void {
  const count = curvatures.length;
  let i = 0;
  for (; i + 4 <= count; i += 4) addFourRows(rows, i, size, curvatures, products);
  for (; i < count; i++) {
    const a = i * size;
    for (let j = 0; j < size; j++) {
      const p = curvatures[i]! * rows[a + j]!;
      const cell = lowerIndex(j, 0);
      for (let k = 0; k <= j; k++) products[cell + k]! += p * rows[a + k]!;
    }
  }
}

function addFourRows(
  rows: Float64Array,
  i: number,
  size: number,
  curvatures: Float64Array,
  products: Float64Array,
): void {
  const [a, b, c, d] = [i * size, (i + 1) * size, (i + 2) * size, (i + 3) * size];
  const [va, vb, vc, vd] = [
    curvatures[i]!,
    curvatures[i + 1]!,
    curvatures[i + 2]!,
    curvatures[i + 3]!,
  ];
  let j = 0;
  for (; j + 2 <= size; j += 2) {
    const [pa, pb, pc, pd] = [
      va * rows[a + j]!,
      vb * rows[b + j]!,
      vc * rows[c + j]!,
      vd * rows[d + j]!,
    ];
    const [qa, qb, qc, qd] = [
      va * rows[a + j + 1]!,
      vb * rows[b + j + 1]!,
      vc * rows[c + j + 1]!,
      vd * rows[d + j + 1]!,
    ];
    const upper = lowerIndex(j, 0);
    const lower = lowerIndex(j + 1, 0);
    for (let k = 0; k <= j; k++) {
      const xa = rows[a + k]!;
      const xb = rows[b + k]!;
      const xc = rows[c + k]!;
      const xd = rows[d + k]!;
      products[upper + k]! += pa * xa + pb * xb + (pc * xc + pd * xd);
      products[lower + k]! += qa * xa + qb * xb + (qc * xc + qd * xd);
    }
    products[lower + j + 1]! +=
      qa * rows[a + j + 1]! +
      qb * rows[b + j + 1]! +
      (qc * rows[c + j + 1]! + qd * rows[d + j + 1]!);
  }
  for (; j < size; j++) {
    const [pa, pb, pc, pd] = [
      va * rows[a + j]!,
      vb * rows[b + j]!,
      vc * rows[c + j]!,
      vd * rows[d + j]!,
    ];
    const cell = lowerIndex(j, 0);
    for (let k = 0; k <= j; k++) {
      products[cell + k]! +=
        pa * rows[a + k]! + pb * rows[b + k]! + (pc * rows[c + k]! + pd * rows[d + k]!);
    }
  }
}
