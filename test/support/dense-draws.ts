import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import type { Unity } from '../../src/chemistry/unity.ts';
import { columnValues, scaledInputs, type Inputs } from '../../src/model/inputs.ts';
import type { StageWeights } from '../../src/model/log-odds.ts';
import { seededGenerator } from '../../src/numeric/random.ts';

/** A composition at a cone. */
export interface Asked {
  readonly unity: Unity;
  readonly coneIndex: number;
}

/** Lengths of the kernel, typed here a second time. */
const LENGTHS: Readonly<Partial<Record<keyof Inputs, number>>> = {
  SiO2: 1.1,
  Al2O3: 1.1,
  B2O3: 1.3,
  KNaO: 1.7,
  MgO: 2,
  ZnO: 2,
  heat: 2,
};

function placeOf({ unity, coneIndex }: Asked): number[] {
  const inputs = scaledInputs(unity, coneIndex);
  return Object.entries(LENGTHS).map(([input, length]) => inputs[input as keyof Inputs] / length);
}

function kernelOf(a: readonly number[], b: readonly number[]): number {
  return Math.exp(-0.5 * a.reduce((sum, x, i) => sum + (x - b[i]) ** 2, 0));
}

function symmetric(lower: readonly number[], size: number): Matrix {
  const full = Matrix.zeros(size, size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      const value = lower[(i * (i + 1)) / 2 + j];
      full.set(i, j, value);
      full.set(j, i, value);
    }
  }
  return full;
}

function lowerTriangular(lower: readonly number[], size: number): Matrix {
  const full = Matrix.zeros(size, size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) full.set(i, j, lower[(i * (i + 1)) / 2 + j]);
  }
  return full;
}

/**
 * Mean and covariance of a stage's log-odds over points, dense and by another library: rows of columns
 * and radial columns, and beside them what the centres leave over of the Gaussian process.
 */
export function denseLogOdds(stage: StageWeights, asked: readonly Asked[]) {
  const { columns, radial, mean, covarianceLower, residual } = stage;
  const places = asked.map(placeOf);
  const toCentres = new Matrix(places.length, radial.centres.length);
  places.forEach((place, i) => {
    radial.centres.forEach((centre, j) => toCentres.set(i, j, kernelOf(place, centre)));
  });
  const factor = lowerTriangular(radial.factorLower, radial.centres.length);
  // L f = k, by the inverse: small, and not the way of the code under test.
  const features =
    radial.centres.length === 0
      ? new Matrix(places.length, 0)
      : toCentres.mmul(inverseOf(factor).transpose());
  const size = columns.length + radial.centres.length;
  const rows = new Matrix(asked.length, size);
  asked.forEach(({ unity, coneIndex }, i) => {
    columnValues(scaledInputs(unity, coneIndex), columns).forEach((x, j) => rows.set(i, j, x));
    radial.centres.forEach((_, j) => rows.set(i, columns.length + j, features.get(i, j)));
  });
  const covariance = rows.mmul(symmetric(covarianceLower, size)).mmul(rows.transpose());
  const explained = features.mmul(features.transpose());
  asked.forEach((_, i) => {
    asked.forEach((__, j) => {
      const left = kernelOf(places[i], places[j]) - explained.get(i, j);
      covariance.set(i, j, covariance.get(i, j) + residual.sd ** 2 * left);
    });
  });
  return { mean: rows.mmul(Matrix.columnVector([...mean])).to1DArray(), covariance };
}

function inverseOf(factor: Matrix): Matrix {
  const size = factor.rows;
  const inverse = Matrix.zeros(size, size);
  for (let column = 0; column < size; column++) {
    for (let i = column; i < size; i++) {
      let sum = i === column ? 1 : 0;
      for (let k = column; k < i; k++) sum -= factor.get(i, k) * inverse.get(k, column);
      inverse.set(i, column, sum / factor.get(i, i));
    }
  }
  return inverse;
}

/** Draws of a stage's log-odds over points, [draws][points], by another library. */
export function denseDraws(
  stage: StageWeights,
  asked: readonly Asked[],
  count: number,
  seed: number,
): number[][] {
  const { mean, covariance } = denseLogOdds(stage, asked);
  const largest = Math.max(...covariance.diag());
  asked.forEach((_, i) => {
    // Smooth paths have a covariance that is singular up to rounding; mirrored, since the library asks it.
    covariance.set(i, i, covariance.get(i, i) + 1e-9 * largest);
    for (let j = 0; j < i; j++) covariance.set(i, j, covariance.get(j, i));
  });
  const factor = new CholeskyDecomposition(covariance).lowerTriangularMatrix;
  const { normal } = seededGenerator(seed);
  const z = new Matrix(asked.length, count);
  for (let i = 0; i < asked.length; i++) for (let d = 0; d < count; d++) z.set(i, d, normal());
  const drawn = factor.mmul(z);
  return Array.from({ length: count }, (_, d) => mean.map((m, i) => m + drawn.get(i, d)));
}
