import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { RimwrightError } from '../base/errors.ts';

/** A = V diag(values) Vᵀ. */
export interface SymmetricEigen {
  /** Eigenvalues, ascending. */
  values: Float64Array;
  /** n × n, row by row; column k is the unit eigenvector of `values[k]`. */
  vectors: Float64Array;
}

/**
 * Eigenvalues and orthonormal eigenvectors of a real symmetric matrix.
 *
 * @param matrix n × n, row by row, symmetric (taken as so, not checked)
 * @param size n, at least 1
 * @throws RimwrightError `machine` where an entry is not finite: the iteration would never end
 */
export function symmetricEigen(matrix: Float64Array, size: number): SymmetricEigen {
  if (!matrix.every(Number.isFinite)) {
    throw new RimwrightError('machine', 'symmetricEigen: the matrix has an entry that is not finite');
  }
  const found = new EigenvalueDecomposition(Matrix.from1DArray(size, size, matrix), {
    assumeSymmetric: true,
  });
  const vectors = Float64Array.from(found.eigenvectorMatrix.to1DArray());
  return { values: Float64Array.from(found.realEigenvalues), vectors };
}
