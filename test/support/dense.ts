import { CholeskyDecomposition, Matrix } from 'ml-matrix';

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

/** Cholesky factor by another library, of a matrix that is symmetric up to rounding. */
export function denseFactor(matrix: Matrix): Matrix {
  const mirrored = matrix.clone().add(matrix.transpose()).mul(0.5);
  const decomposition = new CholeskyDecomposition(mirrored);
  if (!decomposition.isPositiveDefinite()) throw new RangeError('matrix is no covariance');
  return decomposition.lowerTriangularMatrix;
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
