const LARGEST_STEPS = 100_000;
const TINY = 1e-300;

/** Lanczos's series with g = 7 and nine terms: ln Γ to 14 digits. */
const LANCZOS = [
  0.9999999999998099, 676.5203681218851, -1259.1392167224028, 771.3234287776531, -176.6150291621406,
  12.507343278686905, -0.13857109526572012, 9.984369578019572e-6, 1.5056327351493116e-7,
];

/** ln Γ(x) for x of 0.5 or more (Lanczos 1964). */
export function logGamma(x: number): number {
  const base = x + 6.5;
  const series = LANCZOS.reduce((sum, term, i) => sum + (i === 0 ? term : term / (x - 1 + i)));
  return 0.5 * Math.log(2 * Math.PI) + (x - 0.5) * Math.log(base) - base + Math.log(series);
}

/**
 * The regularised incomplete beta function I_x(a, b), by its continued fraction (Abramowitz & Stegun 1964, 26.5.8) evaluated
 * after Lentz. Holds to 1e-12 of itself for a and b up to some thousands, to 1e-9 up to a million.
 *
 * @param x from 0 to 1
 * @param rest 1 − x, which the caller may know with more digits
 * @param a, b 0.5 or more
 */
export function regularisedBeta(x: number, rest: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (rest <= 0) return 1;
  const logFront = logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log(rest);
  const front = Math.exp(logFront);
  // The fraction converges fast below the mean; above it the mirrored function is meant.
  return x < (a + 1) / (a + b + 2)
    ? (front * betaFraction(x, a, b)) / a
    : 1 - (front * betaFraction(rest, b, a)) / b;
}

function betaFraction(x: number, a: number, b: number): number {
  const away = (value: number) => (Math.abs(value) < TINY ? TINY : value);
  let c = 1;
  let d = 1 / away(1 - ((a + b) * x) / (a + 1));
  let fraction = d;
  for (let m = 1; m <= LARGEST_STEPS; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / away(1 + even * d);
    c = away(1 + even / c);
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / away(1 + odd * d);
    c = away(1 + odd / c);
    fraction *= d * c;
    if (Math.abs(d * c - 1) < 1e-15) break;
  }
  return fraction;
}
