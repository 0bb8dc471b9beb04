import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { tileTree } from '../../src/predict/tile-tree.ts';
import { heatsInRadius, nearestTiles, tilesInRadius } from '../../src/predict/tree-search.ts';

/** Places on a coarse net, so that many are equally near or the same. */
const SIDES = 4;
const row = fc.array(fc.integer({ min: 0, max: 12 }), { minLength: SIDES, maxLength: SIDES });
const rows = fc.array(row, { maxLength: 120 });
const asked = fc.record({
  steps: fc.array(fc.double({ min: -3, max: 15, noNaN: true }), {
    minLength: SIDES,
    maxLength: SIDES,
  }),
  onNet: row,
  isOnNet: fc.boolean(),
  apart: fc.constantFrom(0, 0.25, 9),
  radius: fc.constantFrom(0, 1, 3, 8),
});

/** Distances of all rows, by the plain formula. */
function distances(places: number[][], steps: readonly number[], apart: number, sides: number) {
  return places.map((place) => {
    let square = apart;
    for (let side = 0; side < sides; side++) square += (place[side] - steps[side]) ** 2;
    return Math.sqrt(square);
  });
}

describe('a search in boxes finds what a look at every tile finds', () => {
  const check = (
    look: (places: number[][], place: { steps: number[]; apart: number }, radius: number) => void,
  ) => {
    fc.assert(
      fc.property(rows, asked, (places, { steps, onNet, isOnNet, apart, radius }) => {
        look(places, { steps: isOnNet ? onNet : steps, apart }, radius);
      }),
      { seed: 7, numRuns: 400 },
    );
  };
  const treeOf = (places: number[][]) => tileTree(Float64Array.from(places.flat()), SIDES);

  it('the nearest, equally near ones in the order of the list', () => {
    check((places, place) => {
      const all = distances(places, place.steps, place.apart, SIDES);
      const order = all.map((_, i) => i).sort((a, b) => all[a] - all[b] || a - b);
      const found = nearestTiles(treeOf(places), place, 5);
      expect(found.map(({ tile }) => tile)).toEqual(order.slice(0, 5));
      for (const { tile, distance, heat } of found) {
        expect(distance).toBeCloseTo(all[tile], 12);
        expect(heat).toBe(places[tile][SIDES - 1]);
      }
    });
  });

  it('how many lie within a radius', () => {
    check((places, place, radius) => {
      const all = distances(places, place.steps, place.apart, SIDES);
      const count = all.filter((distance) => distance <= radius).length;
      expect(tilesInRadius(treeOf(places), place, radius)).toBe(count);
    });
  });

  it('the heats of those whose composition lies within a radius', () => {
    check((places, place, radius) => {
      const all = distances(places, place.steps, place.apart, SIDES - 1);
      const heats = places.filter((_, i) => all[i] <= radius).map((each) => each[SIDES - 1]);
      const expected = heats.length === 0 ? undefined : [Math.min(...heats), Math.max(...heats)];
      expect(heatsInRadius(treeOf(places), place, radius)).toEqual(expected);
    });
  });
});
