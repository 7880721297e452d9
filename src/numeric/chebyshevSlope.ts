/**
 * Chebyshev coefficients of the derivatives: c'_{n−1} = c'_{n+1} + 2n c_n (Clenshaw 1957), for series as from `chebyshevFit`.
 *
 * @param coefficients laid out as [n · width + j], the first term halved
 * @param halfRange half the length of the interval that t in [−1, 1] stands for
 * @returns as many coefficients in the same layout; the last `width` are 0
 */
export function chebyshevSlope(
  coefficients: Float64Array,
  width: number,
  count: number,
  halfRange: number,
): Float64Array {
  const slopes = new Float64Array(count * width);
  for (let n = count - 1; n > 0; n--) {
    for (let j = 0; j < width; j++) {
      const above = n + 1 < count ? slopes[(n + 1) * width + j] : 0;
      slopes[(n - 1) * width + j] = above + (2 * n * coefficients[n * width + j]) / halfRange;
    }
  }
  for (let j = 0; j < width && j < slopes.length; j++) slopes[j] /= 2;
  return slopes;
}
