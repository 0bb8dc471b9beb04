import { CholeskyDecomposition, Matrix } from 'ml-matrix';
import type { Unity } from '../../src/chemistry/unity.ts';
import { columnValues, scaledInputs } from '../../src/model/inputs.ts';
import type { StageWeights } from '../../src/model/log-odds.ts';
import { radialPlace } from '../../src/model/radial.ts';
import type { Generator } from '../../src/numeric/random.ts';

/** A symmetric matrix from its lower triangle, row by row. */
export function symmetricMatrix(lower: ArrayLike<number>, size: number): Matrix {
  const matrix = Matrix.zeros(size, size);
  for (let i = 0, at = 0; i < size; i++) {
    for (let j = 0; j <= i; j++, at++) {
      matrix.set(i, j, lower[at]);
      matrix.set(j, i, lower[at]);
    }
  }
  return matrix;
}

/** Cholesky factor by another library. */
export function denseFactor(matrix: Matrix): Matrix {
  const decomposition = new CholeskyDecomposition(matrix);
  if (!decomposition.isPositiveDefinite()) throw new RangeError('matrix is no covariance');
  return decomposition.lowerTriangularMatrix;
}

/** x of L x = b for every column of b. */
export function forwardSolved(factor: Matrix, rightSide: Matrix): Matrix {
  const solution = rightSide.clone();
  for (let i = 0; i < factor.rows; i++) {
    for (let column = 0; column < solution.columns; column++) {
      let sum = solution.get(i, column);
      for (let k = 0; k < i; k++) sum -= factor.get(i, k) * solution.get(k, column);
      solution.set(i, column, sum / factor.get(i, i));
    }
  }
  return solution;
}

/** The kernel as its definition has it: exp(-distance^2 / 2). */
export function denseKernel(
  a: readonly (readonly number[])[],
  b: readonly (readonly number[])[],
): Matrix {
  return new Matrix(
    a.map((p) => b.map((q) => Math.exp(-p.reduce((sum, x, i) => sum + (x - q[i]) ** 2, 0) / 2))),
  );
}

export interface PathPosterior {
  readonly mean: readonly number[];
  readonly covariance: Matrix;
}

/**
 * Posterior of a stage's log-odds at all points together, from its weights and centres alone: the
 * columns, the radial columns by a factor of the kernel made here, and the rest of the departure.
 */
export function pathPosterior(
  { columns, radial, mean, covarianceLower, residual }: StageWeights,
  path: readonly { readonly unity: Unity; readonly coneIndex: number }[],
): PathPosterior {
  const inputs = path.map(({ unity, coneIndex }) => scaledInputs(unity, coneIndex));
  const places = inputs.map(radialPlace);
  const { centres } = radial;
  const among = denseKernel(places, places);
  const radialRows =
    centres.length === 0
      ? Matrix.zeros(path.length, 0)
      : forwardSolved(
          denseFactor(denseKernel(centres, centres)),
          denseKernel(centres, places),
        ).transpose();
  const rows = new Matrix(
    inputs.map((row, i) => [...columnValues(row, columns), ...radialRows.getRow(i)]),
  );
  const unexplained =
    centres.length === 0 ? among : among.sub(radialRows.mmul(radialRows.transpose()));
  return {
    mean: rows.mmul(Matrix.columnVector([...mean])).to1DArray(),
    covariance: rows
      .mmul(symmetricMatrix(covarianceLower, mean.length))
      .mmul(rows.transpose())
      .add(unexplained.mul(residual.sd ** 2)),
  };
}

/** Draws of the log-odds of a stage along a path, [draws][points]. */
export function drawnPaths(
  stage: StageWeights,
  { normal }: Generator,
  path: readonly { readonly unity: Unity; readonly coneIndex: number }[],
  count: number,
): number[][] {
  const { mean, covariance } = pathPosterior(stage, path);
  const size = mean.length;
  const most = Math.max(...covariance.diagonal());
  // Neighbours on a path are nearly alike: rounding must not make the matrix indefinite.
  const mirrored = covariance.clone().add(covariance.transpose()).mul(0.5);
  for (let i = 0; i < size; i++) mirrored.set(i, i, mirrored.get(i, i) + 1e-9 * most);
  const factor = denseFactor(mirrored).to2DArray();
  return Array.from({ length: count }, () => {
    const z = Array.from({ length: size }, normal);
    return mean.map((centre, i) => {
      let sum = centre;
      for (let k = 0; k <= i; k++) sum += factor[i][k] * z[k];
      return sum;
    });
  });
}
