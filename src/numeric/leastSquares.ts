import { RimwrightError } from '../base/errors.ts';

/** Share of a column's own square that is added to the diagonal: far below what any fit here resolves. */
const RIDGE = 1e-13;

/**
 * Least squares for several right-hand sides at once, by Cholesky's factors of the normal equations. Fit for columns that are
 * nearly orthogonal, as those of orthogonal polynomials over random points are.
 *
 * @param matrix rows × columns, row by row; more rows than columns
 * @param values rows × responses, row by row
 * @returns columns of the solution: responses × columns, response by response
 * @throws RimwrightError `machine` where the columns depend on each other
 */
export function leastSquares(
  matrix: Float64Array,
  columns: number,
  values: Float64Array,
  responses: number,
): Float64Array {
  const rows = matrix.length / columns;
  const factor = new Float64Array(columns * columns);
  const sides = new Float64Array(responses * columns);
  for (let r = 0; r < rows; r++) {
    const row = matrix.subarray(r * columns, (r + 1) * columns);
    for (let i = 0; i < columns; i++) {
      for (let j = 0; j <= i; j++) factor[i * columns + j] += row[i] * row[j];
    }
    for (let k = 0; k < responses; k++) {
      const value = values[r * responses + k];
      for (let i = 0; i < columns; i++) sides[k * columns + i] += row[i] * value;
    }
  }
  factorise(factor, columns);
  for (let k = 0; k < responses; k++) solve(factor, columns, sides.subarray(k * columns, (k + 1) * columns));
  return sides;
}

/** Turns the lower half of a symmetric matrix into its Cholesky factor. */
function factorise(a: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = a[i * n + j];
      const least = 10 * RIDGE * sum;
      if (i === j) sum *= 1 + RIDGE;
      for (let k = 0; k < j; k++) sum -= a[i * n + k] * a[j * n + k];
      if (i > j) {
        a[i * n + j] = sum / a[j * n + j];
      } else {
        if (!(sum > least))
          throw new RimwrightError('machine', 'a fit has columns that depend on each other');
        a[i * n + i] = Math.sqrt(sum);
      }
    }
  }
}

function solve(a: Float64Array, n: number, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) b[i] -= a[i * n + k] * b[k];
    b[i] /= a[i * n + i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) b[i] -= a[k * n + i] * b[k];
    b[i] /= a[i * n + i];
  }
}
