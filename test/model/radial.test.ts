import { Matrix, solve } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { scaledInputs } from '../../src/model/inputs.ts';
import {
  chosenCentres,
  kernel,
  NO_CENTRES,
  RADIAL_INPUTS,
  radialPlace,
  radialValues,
} from '../../src/model/radial.ts';
import { fitStages, isJudged } from '../../src/model/stages.ts';
import { dot, lowerIndex } from '../../src/numeric/linalg.ts';
import { seededGenerator } from '../../src/numeric/random.ts';
import { denseKernel } from '../support/dense.ts';
import { drawnUnity, inventedTiles } from '../support/invented-tiles.ts';

const source = seededGenerator(12);
const drawnPlaces = (count: number) =>
  Array.from({ length: count }, () =>
    radialPlace(scaledInputs(drawnUnity(source), 4 + 4 * source.uniform())),
  );
const places = drawnPlaces(60);
const others = drawnPlaces(40);

/** Variance of the departure that the centres leave over at each place, by conditioning a Gaussian. */
function denseLeftOver(
  centres: readonly (readonly number[])[],
  at: readonly (readonly number[])[],
): number[] {
  const toCentres = denseKernel(centres, at);
  const solved = solve(denseKernel(centres, centres), toCentres);
  return at.map((_, i) => 1 - dot(toCentres.getColumn(i), solved.getColumn(i)));
}

describe('the kernel', () => {
  it('is 1 at no distance, the same both ways, and exp(-1/2) a length away', () => {
    const [a, b] = places;
    expect(kernel(a, a)).toBe(1);
    expect(kernel(a, b)).toBe(kernel(b, a));
    expect(kernel(a, b)).toBeCloseTo(denseKernel([a], [b]).get(0, 0), 14);
    const origin = Array.from({ length: RADIAL_INPUTS }, () => 0);
    for (let i = 0; i < RADIAL_INPUTS; i++) {
      const away = origin.map((x, k) => (k === i ? x + 1 : x));
      expect(kernel(origin, away)).toBeCloseTo(Math.exp(-0.5), 14);
    }
  });

  it('sees each oxide of the model and the heat, nothing else', () => {
    const inputs = scaledInputs(drawnUnity(source), 6);
    const place = radialPlace(inputs);
    expect(place).toHaveLength(RADIAL_INPUTS);
    for (const input of ['SiO2', 'Al2O3', 'B2O3', 'KNaO', 'MgO', 'ZnO', 'heat'] as const) {
      const there = radialPlace({ ...inputs, [input]: inputs[input] + 1 });
      const moves = there.map((x, i) => x - place[i]).filter((move) => Math.abs(move) > 1e-12);
      expect([moves.length, moves[0] > 0.2]).toEqual([1, true]);
    }
    expect(radialPlace({ ...inputs, ratio: 9 })).toEqual(place);
  });
});

describe('radial columns', () => {
  const radial = chosenCentres(places, 12);
  const valuesAt = (place: readonly number[]) => radialValues(radial, place);

  it('have a centre for each of those asked for, and the factor of their kernel', () => {
    expect(radial.centres).toHaveLength(12);
    const size = 12;
    const factor = Matrix.zeros(size, size);
    for (let i = 0; i < size; i++) {
      for (let j = 0; j <= i; j++) factor.set(i, j, radial.factorLower[lowerIndex(i, j)]);
    }
    const product = factor.mmul(factor.transpose());
    expect(product.sub(denseKernel(radial.centres, radial.centres)).abs().max()).toBeLessThan(
      1e-13,
    );
  });

  it('reproduce the kernel between the centres and from a centre to any place', () => {
    for (const centre of radial.centres) {
      const { values, leftOver } = valuesAt(centre);
      expect(leftOver).toBeLessThan(1e-13);
      for (const place of [...radial.centres, ...others]) {
        const product = dot(values, valuesAt(place).values);
        expect(Math.abs(product - kernel(centre, place))).toBeLessThan(1e-13);
      }
    }
  });

  it('leave over elsewhere what conditioning on the centres leaves, from 0 to 1', () => {
    const exact = denseLeftOver(radial.centres, others);
    others.forEach((place, i) => {
      const { values, leftOver } = valuesAt(place);
      expect(Math.abs(leftOver - exact[i])).toBeLessThan(1e-12);
      expect(leftOver).toBeGreaterThan(0);
      expect(leftOver).toBeLessThanOrEqual(1);
      expect(dot(values, values)).toBeLessThanOrEqual(1);
    });
    const far = radialPlace(scaledInputs({ SiO2: 40, Al2O3: 5, CaO: 1 }, 6));
    expect(valuesAt(far).leftOver).toBe(1);
  });

  it('with every place a centre are the full Gaussian process', () => {
    const few = places.slice(0, 20);
    const all = chosenCentres(few, few.length);
    expect(all.centres).toHaveLength(20);
    const rows = new Matrix(few.map((place) => radialValues(all, place).values));
    const among = rows.mmul(rows.transpose());
    expect(among.sub(denseKernel(few, few)).abs().max()).toBeLessThan(1e-12);
    // A weight N(0, 1) on each column, seen with noise, against Gaussian process regression.
    const seen = few.map((_, i) => Math.sin(3 * i));
    const noise = 0.3;
    const precision = rows.transpose().mmul(rows).div(noise).add(Matrix.eye(20));
    const weights = solve(precision, rows.transpose().mmul(Matrix.columnVector(seen)).div(noise));
    const toOthers = denseKernel(others, few);
    const noisy = denseKernel(few, few).add(Matrix.eye(20).mul(noise));
    const regressed = toOthers.mmul(solve(noisy, Matrix.columnVector(seen))).to1DArray();
    const known = solve(noisy, toOthers.transpose());
    const covariance = solve(precision, Matrix.eye(20));
    others.forEach((place, i) => {
      const { values, leftOver } = radialValues(all, place);
      expect(Math.abs(dot(values, weights.to1DArray()) - regressed[i])).toBeLessThan(1e-10);
      const row = Matrix.rowVector(values);
      const variance = row.mmul(covariance).mmul(row.transpose()).get(0, 0) + leftOver;
      const exact = 1 - dot(toOthers.getRow(i), known.getColumn(i));
      expect(Math.abs(variance - exact)).toBeLessThan(1e-10);
    });
  });

  it('none at all leave everything over', () => {
    expect(radialValues(NO_CENTRES, places[0])).toEqual({ values: [], leftOver: 1 });
    expect(chosenCentres([], 5)).toEqual(NO_CENTRES);
    expect(chosenCentres(places, 0)).toEqual(NO_CENTRES);
  });
});

describe('the choice of centres', () => {
  it('takes next the place that those before explain least', () => {
    const { centres } = chosenCentres(places, 10);
    expect(centres[0]).toEqual(places[0]);
    for (let k = 1; k < centres.length; k++) {
      const left = denseLeftOver(centres.slice(0, k), places);
      const most = Math.max(...left);
      const own = denseLeftOver(centres.slice(0, k), [centres[k]])[0];
      expect(Math.abs(own - most)).toBeLessThan(2e-9);
    }
  });

  it('stops where no place is left that the others do not explain', () => {
    const repeated = [...places.slice(0, 6), ...places.slice(0, 6), ...places.slice(0, 6)];
    const { centres } = chosenCentres(repeated, 18);
    expect(centres.length).toBeLessThanOrEqual(6);
    expect(Math.max(...denseLeftOver(centres, repeated))).toBeLessThan(0.05);
    const near = places.slice(0, 4).flatMap((place) => [place, place.map((x) => x + 1e-3)]);
    expect(chosenCentres(near, 8).centres.length).toBeLessThanOrEqual(4);
  });

  it('is the same for any order of the rows of an archive', () => {
    const tiles = inventedTiles({ tiles: 130, seed: 14 }).filter(isJudged);
    const shuffled = tiles.map((_, i) => tiles[(7 * i + 3) % tiles.length]);
    const [plain, ...turned] = [tiles, [...tiles].reverse(), shuffled].map((order) =>
      fitStages(order).design.stages.map(({ radial }) => radial),
    );
    expect(plain[0].centres.length).toBeGreaterThan(3);
    for (const other of turned) expect(other).toEqual(plain);
  });
});
