/** A linear least-squares fit over a few points, ready for any values at them. */
export interface LocalFit {
  /** Coefficients of the columns for values given at the points. */
  coefficients(values: readonly number[]): number[] | undefined;
  /** What each point weighs in the prediction at a row. */
  weights(row: readonly number[]): number[] | undefined;
}

/** Relative ridge on every column but the first: enough for columns that depend on each other. */
const RIDGE = 1e-9;

/**
 * Least squares by normal equations: for a handful of columns of about the same size.
 *
 * @param rows one a point: 1, then what the values depend on
 * @param penalties one a column, relative to the column's own sum of squares; none if left out
 */
export function localFit(rows: readonly (readonly number[])[], penalties: readonly number[] = []): LocalFit {
  const columns = rows[0].length;
  const matrix = Array.from({ length: columns }, (_, i) =>
    Array.from({ length: columns }, (_, j) => {
      let sum = 0;
      for (const row of rows) sum += row[i] * row[j];
      return i === j && i > 0 ? sum * (1 + RIDGE + (penalties[i] ?? 0)) : sum;
    }),
  );
  return {
    coefficients(values) {
      const right = matrix.map((_, i) => rows.reduce((sum, row, k) => sum + row[i] * values[k], 0));
      return solved(matrix, right);
    },
    weights(row) {
      const dual = solved(matrix, row);
      return dual && rows.map((one) => one.reduce((sum, x, j) => sum + x * dual[j], 0));
    },
  };
}

/** Solution of a positive definite system by elimination; undefined where rounding has left it without one. */
function solved(matrix: readonly (readonly number[])[], right: readonly number[]): number[] | undefined {
  const a = matrix.map((row) => row.slice());
  const x = right.slice();
  const n = x.length;
  for (let i = 0; i < n; i++) {
    for (let k = i + 1; k < n; k++) {
      const factor = a[k][i] / a[i][i];
      for (let j = i; j < n; j++) a[k][j] -= factor * a[i][j];
      x[k] -= factor * x[i];
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = i + 1; j < n; j++) x[i] -= a[i][j] * x[j];
    x[i] /= a[i][i];
  }
  return x.every(Number.isFinite) ? x : undefined;
}
