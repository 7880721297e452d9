/**
 * Integral of a function over each cell of a uniform grid, by six-point Lagrange rules (one-sided in the first two cells).
 *
 * @param values at 0, step, 2·step …; at least cells + 3 of them
 * @returns ∫ over cell i in units of the step; error ~ h⁶ f⁽⁶⁾/60
 */
export function cellIntegrals(values: Float64Array, cells: number): Float64Array {
  const out = new Float64Array(cells);
  for (let i = 0; i < cells; i++) {
    const rule = SIX_POINT[Math.min(i, 2)];
    const first = i - Math.min(i, 2);
    let sum = 0;
    for (let j = 0; j < 6; j++) sum += rule[j] * values[first + j];
    out[i] = sum / 1440;
  }
  return out;
}

/** 1440 ∫₀¹ of the Lagrange polynomials whose nodes start 0, 1 or 2 cells before the integrated one (from their definition). */
const SIX_POINT = [
  [475, 1427, -798, 482, -173, 27],
  [-27, 637, 1022, -258, 77, -11],
  [11, -93, 802, 802, -93, 11],
] as const;

/** First derivative times the step at the first of six uniform values, by their Lagrange polynomial. */
export function slopeAtStart(values: Float64Array): number {
  const [a, b, c, d, e, f] = values;
  return (-137 * a + 300 * b - 300 * c + 200 * d - 75 * e + 12 * f) / 60;
}

/**
 * Cubic pieces through values and slopes: the piece of cell i at t in [0, 1] is
 * c[4i] + c[4i+1] t + c[4i+2] t² + c[4i+3] t³. Error at most h⁴ |f⁗| / 384.
 *
 * @param slopes derivative times the step
 */
export function hermitePieces(values: Float64Array, slopes: Float64Array, cells: number): Float64Array {
  const out = new Float64Array(cells * 4);
  for (let i = 0; i < cells; i++) {
    const rise = values[i + 1] - values[i];
    out[4 * i] = values[i];
    out[4 * i + 1] = slopes[i];
    out[4 * i + 2] = 3 * rise - 2 * slopes[i] - slopes[i + 1];
    out[4 * i + 3] = slopes[i] + slopes[i + 1] - 2 * rise;
  }
  return out;
}
