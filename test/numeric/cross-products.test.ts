import { describe, expect, it } from 'vitest';
import { addCrossProducts, addPlainly } from '../../src/numeric/cross-products.ts';
import { lowerIndex } from '../../src/numeric/linalg.ts';
import { seededGenerator } from '../../src/numeric/random.ts';

function drawn(count: number, size: number) {
  const chance = seededGenerator(count + 1000 * size);
  const some = (length: number) => Float64Array.from({ length }, () => chance.normal());
  return { rows: some(count * size), weights: some(count) };
}

const SHAPES = [
  [1, 1],
  [2, 3],
  [31, 4],
  [32, 5],
  [33, 8],
  [100, 21],
  [65, 90],
  // More than the memory it begins with.
  [40, 301],
] as const;

describe('weighted cross products', () => {
  it.each(SHAPES)(
    'of %i rows and %i columns are those of the plain loop to the last bit',
    (...shape) => {
      const { rows, weights } = drawn(...shape);
      const fast = new Float64Array(lowerIndex(shape[1], 0)).fill(0.5);
      const plain = fast.slice();
      addCrossProducts(rows, shape[1], weights, fast);
      addPlainly({ rows, size: shape[1], count: shape[0] }, plain, (row, i, left) => {
        row.forEach((value, j) => (left[j] = weights[i] * value));
      });
      expect(fast).toEqual(plain);
      expect(fast.some((value) => value !== 0.5)).toBe(true);
    },
  );

  it('are sums of weight times both columns', () => {
    const products = Float64Array.of(100, 0, 0);
    addCrossProducts(Float64Array.of(1, 2, 3, 5), 2, Float64Array.of(2, -1), products);
    // 2 (1 1) - (3 3), 2 (2 1) - (5 3), 2 (2 2) - (5 5)
    expect([...products]).toEqual([100 - 7, -11, -17]);
  });

  it('of a small set are not touched by what a larger one left behind', () => {
    const large = drawn(64, 40);
    addCrossProducts(large.rows, 40, large.weights, new Float64Array(lowerIndex(40, 0)));
    const products = new Float64Array(3);
    addCrossProducts(Float64Array.of(1, 2), 2, Float64Array.of(1), products);
    expect([...products]).toEqual([1, 2, 4]);
  });

  it('of no rows or no columns are nothing', () => {
    const products = Float64Array.of(7);
    addCrossProducts(new Float64Array(0), 1, new Float64Array(0), products);
    addCrossProducts(new Float64Array(0), 0, Float64Array.of(1, 1), new Float64Array(0));
    expect([...products]).toEqual([7]);
  });
});
