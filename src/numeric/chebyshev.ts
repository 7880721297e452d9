/**
 * Chebyshev coefficients c of several functions at once: f_j(x) = Σ' c_n T_n(t), t running over [−1, 1] as x over [low, high].
 *
 * @param sample writes the `width` function values at x into `out`
 * @param count number of coefficients, 1 or more
 * @returns coefficients laid out as [n · width + j]; the halved first term is already applied
 */
export function chebyshevFit(
  sample: (x: number, out: Float64Array) => void,
  width: number,
  low: number,
  high: number,
  count: number,
): Float64Array {
  const values = new Float64Array(count * width);
  const out = new Float64Array(width);
  for (let i = 0; i < count; i++) {
    const t = Math.cos((Math.PI * (i + 0.5)) / count);
    sample((low + high) / 2 + ((high - low) / 2) * t, out);
    values.set(out, i * width);
  }
  const cosines = Float64Array.from({ length: 4 * count }, (_, q) => Math.cos((Math.PI * q) / (2 * count)));
  const coefficients = new Float64Array(count * width);
  for (let n = 0; n < count; n++) {
    for (let i = 0; i < count; i++) {
      const weight = cosines[(n * (2 * i + 1)) % (4 * count)];
      for (let j = 0; j < width; j++) coefficients[n * width + j] += values[i * width + j] * weight;
    }
    const scale = (n === 0 ? 1 : 2) / count;
    for (let j = 0; j < width; j++) coefficients[n * width + j] *= scale;
  }
  return coefficients;
}

/**
 * As `chebyshevFit`, of four functions, as long as it takes for the last terms to carry nothing.
 *
 * @param first number of coefficients tried first; half as many again, up to `most`, until two spare ones show that the tail has been reached
 * @param tolerance relative to the largest coefficient
 */
export function settledFit(
  sample: (x: number, out: Float64Array) => void,
  low: number,
  high: number,
  { first, most, tolerance }: { first: number; most: number; tolerance: number },
): { series: Float64Array; terms: number } {
  for (let count = first; ; count = Math.ceil(1.5 * count)) {
    const tried = Math.min(count, most);
    const series = chebyshevFit(sample, 4, low, high, tried);
    const terms = usefulTerms(series, tried, tolerance);
    if (terms + 2 <= tried || tried === most) return { series: series.slice(0, terms * 4), terms };
  }
}

/** Number of terms before all further ones fall below the tolerance, relative to the largest. */
function usefulTerms(series: Float64Array, count: number, tolerance: number): number {
  const largest = series.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  let length = count * 4;
  while (length > 4 && Math.abs(series[length - 1]) <= tolerance * largest) length--;
  return Math.ceil(length / 4);
}

/** Clenshaw's sum of four series at once at t in [−1, 1]; `coefficients` as from `chebyshevFit` with width 4. */
export function chebyshevFour(coefficients: Float64Array, count: number, t: number, out: Float64Array): void {
  let a1 = 0;
  let a2 = 0;
  let b1 = 0;
  let b2 = 0;
  let c1 = 0;
  let c2 = 0;
  let d1 = 0;
  let d2 = 0;
  const twice = 2 * t;
  for (let n = (count - 1) * 4; n > 0; n -= 4) {
    const a = coefficients[n] + twice * a1 - a2;
    a2 = a1;
    a1 = a;
    const b = coefficients[n + 1] + twice * b1 - b2;
    b2 = b1;
    b1 = b;
    const c = coefficients[n + 2] + twice * c1 - c2;
    c2 = c1;
    c1 = c;
    const d = coefficients[n + 3] + twice * d1 - d2;
    d2 = d1;
    d1 = d;
  }
  out[0] = coefficients[0] + t * a1 - a2;
  out[1] = coefficients[1] + t * b1 - b2;
  out[2] = coefficients[2] + t * c1 - c2;
  out[3] = coefficients[3] + t * d1 - d2;
}

/**
 * Clenshaw's sum of two complex series at a complex t, such as just beside [−1, 1].
 *
 * @param coefficients as from `chebyshevFit` with width 4: the first pair is one complex function, the second another
 * @param out receives the two sums as re, im, re, im
 */
export function chebyshevPairs(
  coefficients: Float64Array,
  count: number,
  tRe: number,
  tIm: number,
  out: Float64Array,
): void {
  let aRe1 = 0;
  let aIm1 = 0;
  let aRe2 = 0;
  let aIm2 = 0;
  let bRe1 = 0;
  let bIm1 = 0;
  let bRe2 = 0;
  let bIm2 = 0;
  const twiceRe = 2 * tRe;
  const twiceIm = 2 * tIm;
  for (let n = (count - 1) * 4; n > 0; n -= 4) {
    const aRe = coefficients[n] + twiceRe * aRe1 - twiceIm * aIm1 - aRe2;
    const aIm = coefficients[n + 1] + twiceRe * aIm1 + twiceIm * aRe1 - aIm2;
    aRe2 = aRe1;
    aIm2 = aIm1;
    aRe1 = aRe;
    aIm1 = aIm;
    const bRe = coefficients[n + 2] + twiceRe * bRe1 - twiceIm * bIm1 - bRe2;
    const bIm = coefficients[n + 3] + twiceRe * bIm1 + twiceIm * bRe1 - bIm2;
    bRe2 = bRe1;
    bIm2 = bIm1;
    bRe1 = bRe;
    bIm1 = bIm;
  }
  out[0] = coefficients[0] + tRe * aRe1 - tIm * aIm1 - aRe2;
  out[1] = coefficients[1] + tRe * aIm1 + tIm * aRe1 - aIm2;
  out[2] = coefficients[2] + tRe * bRe1 - tIm * bIm1 - bRe2;
  out[3] = coefficients[3] + tRe * bIm1 + tIm * bRe1 - bIm2;
}
