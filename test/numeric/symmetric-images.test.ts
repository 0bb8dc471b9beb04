import { describe, expect, it } from 'vitest';
import { lowerIndex, quadraticForm, symmetricTimes } from '../../src/numeric/linalg.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import {
  eachPlainImage,
  quadraticForms,
  symmetricImages,
} from '../../src/numeric/symmetric-images.ts';

function drawn(count: number, size: number) {
  const chance = seededGenerator(count + 1000 * size);
  const some = (length: number) => Float64Array.from({ length }, () => chance.normal());
  return { rows: some(count * size), lower: some(lowerIndex(size, 0)) };
}

const SHAPES = [
  [1, 1],
  [3, 2],
  [32, 4],
  [33, 7],
  [70, 171],
] as const;

describe('many rows and one symmetric matrix', () => {
  it.each(SHAPES)('of %i rows and %i columns are as one by one', (count, size) => {
    const { rows, lower } = drawn(count, size);
    const images = symmetricImages(rows, size, lower);
    const forms = quadraticForms(rows, size, lower);
    for (let i = 0; i < count; i++) {
      const row = rows.subarray(i * size, (i + 1) * size);
      // Terms of size 1 in another order: rounding of their sums.
      const near = 1e-13 * size ** 2;
      expect(Math.abs(forms[i] - quadraticForm(lower, row))).toBeLessThan(near);
      symmetricTimes(lower, row).forEach((value, j) => {
        expect(Math.abs(images[i * size + j] - value)).toBeLessThan(near);
      });
    }
  });

  it('are those of the plain loop to the last bit', () => {
    const { rows, lower } = drawn(37, 22);
    const plain = new Float64Array(rows.length);
    const values = Float64Array.from({ length: 22 * 22 }, (_, cell) => {
      const [k, j] = [Math.floor(cell / 22), cell % 22];
      return lower[k > j ? lowerIndex(k, j) : lowerIndex(j, k)];
    });
    eachPlainImage(rows, { size: 22, values, isUpper: false }, (image, _, i) => {
      plain.set(image, i * 22);
    });
    expect(symmetricImages(rows, 22, lower)).toEqual(plain);
  });

  it('are not touched by what a larger matrix left behind', () => {
    const large = drawn(40, 60);
    large.rows.fill(Number.NaN);
    quadraticForms(large.rows, 60, large.lower);
    expect([...quadraticForms(Float64Array.of(1, 2, 0, 1), 2, Float64Array.of(4, 1, 9))]).toEqual([
      44, 9,
    ]);
  });

  it('of no rows are nothing', () => {
    expect(quadraticForms(new Float64Array(0), 3, new Float64Array(6))).toHaveLength(0);
    expect(symmetricImages(new Float64Array(0), 0, new Float64Array(0))).toHaveLength(0);
  });
});
