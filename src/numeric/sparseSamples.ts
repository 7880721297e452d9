/**
 * Uniform samples of several slow functions, most of them interpolated (six-point Lagrange) between the computed ones.
 * Error at most 0.005 h⁶ f⁽⁶⁾ inside and 0.17 h⁶ f⁽⁶⁾ in the end cells, h the distance between computed places.
 *
 * @param count number of samples, at 0, 1, 2 …
 * @param width number of functions
 * @param stride largest distance between computed places, 1 or more
 * @param compute writes the `width` values at a place (not always whole) into `out`; never asked beyond max(count − 1, 5)
 * @returns samples laid out as [i · width + j]
 */
export function sparseSamples(
  count: number,
  width: number,
  stride: number,
  compute: (place: number, out: Float64Array) => void,
): Float64Array {
  const computed = Math.max(6, Math.ceil((count - 1) / stride) + 1);
  const spacing = count > 6 ? (count - 1) / (computed - 1) : 1;
  const known = new Float64Array(computed * width);
  for (let k = 0; k < computed; k++) compute(k * spacing, known.subarray(k * width, (k + 1) * width));
  const samples = new Float64Array(count * width);
  for (let i = 0; i < count; i++) {
    const position = i / spacing;
    const first = Math.max(0, Math.min(Math.floor(position) - 2, computed - 6));
    const weights = sixPointWeights(position - first);
    for (let j = 0; j < width; j++) {
      let sum = 0;
      for (let k = 0; k < 6; k++) sum += weights[k] * known[(first + k) * width + j];
      samples[i * width + j] = sum;
    }
  }
  return samples;
}

/** Lagrange polynomials of the nodes 0 … 5 at t. */
function sixPointWeights(t: number): number[] {
  const [a, b, c, d, e, f] = [t, t - 1, t - 2, t - 3, t - 4, t - 5];
  return [
    (b * c * d * e * f) / -120,
    (a * c * d * e * f) / 24,
    (a * b * d * e * f) / -12,
    (a * b * c * e * f) / 12,
    (a * b * c * d * f) / -24,
    (a * b * c * d * e) / 120,
  ];
}
