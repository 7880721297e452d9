/**
 * Faddeeva's function w(z) = e^(−z²) erfc(−iz) of a complex argument.
 *
 * In the upper half plane it is the rational series of Weideman (1994, SIAM J. Numer. Anal. 31, 1497, equations 37 and 38)
 * with N = 40 terms: 1e-14 of |w| up to |z| = 1e8 and beyond. Each part holds to that of |w|, not of itself. Below the real
 * axis w(z) = 2 e^(−z²) − w(−z), which cancels near its zeros and overflows to parts of ±Infinity or NaN where y² − x² > 709.
 *
 * @param out receives the real and the imaginary part
 */
export function faddeeva(x: number, y: number, out: Float64Array): void {
  if (y >= 0) {
    upperHalf(x, y, out);
    return;
  }
  upperHalf(-x, -y, out);
  const modulus = 2 * Math.exp((y - x) * (y + x));
  const phase = 2 * x * y;
  out[0] = modulus * Math.cos(phase) - out[0];
  out[1] = -modulus * Math.sin(phase) - out[1];
}

/**
 * The complementary error function erfc(z) = (2/√π) ∫_z^∞ e^(−t²) dt of a complex argument, by way of `faddeeva`:
 * erfc(z) = e^(−z²) w(iz). Holds to 1e-14 of |erfc| where x ≥ 0, but for the phase 2xy, whose rounding counts once |z| is large;
 * overflows as w does where y² − x² > 709, and underflows to 0 where x² − y² > 745 and x ≥ 0.
 *
 * @param out receives the real and the imaginary part
 */
export function complexErfc(x: number, y: number, out: Float64Array): void {
  // erfc(z) + erfc(−z) = 2 keeps to the half plane where w is bounded.
  const sign = x < 0 ? -1 : 1;
  upperHalf(-sign * y, sign * x, out);
  const modulus = Math.exp((y - x) * (y + x));
  const cos = modulus * Math.cos(2 * x * y);
  const sin = -modulus * Math.sin(2 * x * y);
  const re = cos * out[0] - sin * out[1];
  const im = cos * out[1] + sin * out[0];
  out[0] = sign < 0 ? 2 - re : re;
  out[1] = sign < 0 ? -im : im;
}

const INVERSE_ROOT_PI = 1 / Math.sqrt(Math.PI);
const TERMS = 40;
/** Weideman's best L for N terms. */
const STRETCH = Math.sqrt(TERMS / Math.SQRT2);
const COEFFICIENTS = weidemanCoefficients();

/** w = 2 p(Z)/(L − iz)² + 1/(√π (L − iz)), Z = (L + iz)/(L − iz), for y ≥ 0. */
function upperHalf(x: number, y: number, out: Float64Array): void {
  // 1/(L − iz)
  const re = STRETCH + y;
  const norm = re * re + x * x;
  const inverseRe = re / norm;
  const inverseIm = x / norm;
  // Z = 2L/(L − iz) − 1
  const ratioRe = 2 * STRETCH * inverseRe - 1;
  const ratioIm = 2 * STRETCH * inverseIm;
  let sumRe = COEFFICIENTS[TERMS - 1];
  let sumIm = 0;
  for (let n = TERMS - 2; n >= 0; n--) {
    const next = sumRe * ratioRe - sumIm * ratioIm + COEFFICIENTS[n];
    sumIm = sumRe * ratioIm + sumIm * ratioRe;
    sumRe = next;
  }
  // (2 p/(L − iz) + 1/√π)/(L − iz)
  const innerRe = 2 * (sumRe * inverseRe - sumIm * inverseIm) + INVERSE_ROOT_PI;
  const innerIm = 2 * (sumRe * inverseIm + sumIm * inverseRe);
  out[0] = innerRe * inverseRe - innerIm * inverseIm;
  out[1] = innerRe * inverseIm + innerIm * inverseRe;
}

/** Fourier coefficients of e^(−t²)(L² + t²) over θ, t = L tan(θ/2), by the trapezoid rule with 4N points. */
function weidemanCoefficients(): Float64Array {
  const points = 4 * TERMS;
  const coefficients = new Float64Array(TERMS);
  for (let k = 1 - points / 2; k < points / 2; k++) {
    const t = STRETCH * Math.tan((Math.PI * k) / points);
    const value = Math.exp(-t * t) * (STRETCH * STRETCH + t * t);
    for (let n = 0; n < TERMS; n++) {
      // The angle is reduced in whole numbers first: large n·k would lose digits.
      coefficients[n] += (value * Math.cos((2 * Math.PI * (((n + 1) * k) % points)) / points)) / points;
    }
  }
  return coefficients;
}
