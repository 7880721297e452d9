import { inputError } from '../base/errors.ts';
import { chebyshevFit, chebyshevFour } from '../numeric/chebyshev.ts';
import type { MieCoefficients } from '../optics/mieCoefficients.ts';
import { FIELD_NUMBERS, scatteredField } from '../optics/scatteredField.ts';

/** Evaluates the four numbers of `exactFluxDensity` at s, m²; NaN beyond the largest s that it was made for. */
export type ExactFluxSampler = (s: number, out: Float64Array) => void;

/** Ex and Hy over the detector plane at azimuths 0° and 90°, as Ex0, Hy0, Ex90, Hy90, each re, im. */
export const PLANE_NUMBERS = 8;

/**
 * The four numbers of `fluxDensity` from the exact fields of the sphere, radial parts included: right at any distance at
 * which the sphere does not touch the detector plane.
 *
 * With the scattered field (Ex, Hy) = P (X, Y), P = e^{ikr}/(−ikr), at azimuth 0° and 90° from the incident field,
 *
 *   w(0°, 90°) = −Re{(X + Y) e^{ik(r−z)} / (−ikr)} − Re(X Y*) / (kr)²
 *
 * and w varies as cos 2φ between them. For kr ≫ x², X and Y become S2 cosθ and S2 at 0°, S1 and S1 cosθ at 90°: that is
 * `fluxDensity`. It errs by about n²/(2kr) in phase for the wave of order n, up to x²/(2kr).
 *
 * This is the plain formula, one Mie sum a call; for many s take `exactFluxSampler`.
 *
 * @param wavenumber k in the medium, 1/m
 * @param distanceM z from the sphere's centre to the detector plane, metres, more than its radius
 * @param s squared distance ρ² from the axis, m², 0 or more
 * @param out receives [crossed mean, crossed twofold, scattered mean, scattered twofold], without unit
 * @throws RimwrightError `input` for a plane that cuts the sphere
 */
export function exactFluxDensity(
  coefficients: MieCoefficients,
  wavenumber: number,
  distanceM: number,
  s: number,
  out: Float64Array,
): void {
  checkDistance(coefficients, wavenumber, distanceM);
  const plane = new Float64Array(PLANE_NUMBERS);
  const field = new Float64Array(FIELD_NUMBERS);
  planeFields(coefficients, wavenumber * distanceM, versineAt(distanceM, s), field, plane);
  fluxOfFields(plane, plane.subarray(4), wavenumber, distanceM, s, out);
}

/**
 * `exactFluxDensity` for many s: X and Y are fitted once by Chebyshev series in 1 − cosθ. On the plane 1/(kr) = cosθ/(kz),
 * so they are polynomials in cosθ, of degree 2 · order + 2 at most, and of far fewer useful terms over a narrow cone.
 *
 * @param largestS largest ρ² that will be asked for, m², above 0
 * @throws RimwrightError `input` for a plane that cuts the sphere, or a largestS that is not above 0
 */
export function exactFluxSampler(
  coefficients: MieCoefficients,
  wavenumber: number,
  distanceM: number,
  largestS: number,
): ExactFluxSampler {
  checkDistance(coefficients, wavenumber, distanceM);
  if (!(largestS > 0 && largestS < Infinity)) {
    throw inputError([{ key: 'largestS', found: String(largestS), expected: 'an area in m² above 0' }]);
  }
  const cone = versineAt(distanceM, largestS);
  const { at0, at90, terms } = fitPlane(coefficients, wavenumber * distanceM, cone);
  const fields0 = new Float64Array(4);
  const fields90 = new Float64Array(4);
  return (s, out) => {
    const t = (2 * versineAt(distanceM, s)) / cone - 1;
    if (!(t <= 1 + 1e-12)) {
      out.fill(Number.NaN, 0, 4);
      return;
    }
    chebyshevFour(at0, terms, t, fields0);
    chebyshevFour(at90, terms, t, fields90);
    fluxOfFields(fields0, fields90, wavenumber, distanceM, s, out);
  };
}

/** 1 − cosθ = s/(r (r + z)), with all digits where the angle is small. */
function versineAt(distanceM: number, s: number): number {
  const r = Math.sqrt(distanceM * distanceM + s);
  return s / (r * (r + distanceM));
}

/** Turns the spherical components to Ex and Hy, without P. At other azimuths they mix with cos²φ and sin²φ, and so does their flux. */
export function planeFields(
  coefficients: MieCoefficients,
  kz: number,
  versine: number,
  field: Float64Array,
  plane: Float64Array,
): void {
  const cos = 1 - versine;
  const sin = Math.sqrt(versine * (2 - versine));
  scatteredField(coefficients, kz / cos, versine, field);
  for (let j = 0; j < 2; j++) {
    plane[j] = cos * field[j] + sin * field[4 + j];
    plane[2 + j] = field[8 + j];
    plane[4 + j] = field[2 + j];
    plane[6 + j] = cos * field[6 + j] + sin * field[10 + j];
  }
}

function fluxOfFields(
  fields0: Float64Array,
  fields90: Float64Array,
  wavenumber: number,
  distanceM: number,
  s: number,
  out: Float64Array,
): void {
  const r = Math.sqrt(distanceM * distanceM + s);
  const kr = wavenumber * r;
  // r − z = s/(r + z) keeps all digits where the angle is small.
  const phase = (wavenumber * s) / (r + distanceM);
  const cos = Math.cos(phase) / kr;
  const sin = Math.sin(phase) / kr;
  const crossed0 = (fields0[0] + fields0[2]) * sin + (fields0[1] + fields0[3]) * cos;
  const crossed90 = (fields90[0] + fields90[2]) * sin + (fields90[1] + fields90[3]) * cos;
  const scattered0 = -(fields0[0] * fields0[2] + fields0[1] * fields0[3]) / (kr * kr);
  const scattered90 = -(fields90[0] * fields90[2] + fields90[1] * fields90[3]) / (kr * kr);
  out[0] = (crossed0 + crossed90) / 2;
  out[1] = (crossed0 - crossed90) / 2;
  out[2] = (scattered0 + scattered90) / 2;
  out[3] = (scattered0 - scattered90) / 2;
}

/** Series of the fields over 1 − cosθ in [0, cone], as long as it takes for the last terms to carry nothing. */
function fitPlane(coefficients: MieCoefficients, kz: number, cone: number) {
  const field = new Float64Array(FIELD_NUMBERS);
  const sample = (versine: number, out: Float64Array) => planeFields(coefficients, kz, versine, field, out);
  const most = 2 * coefficients.order + 3;
  // Fields vary as e^{±ixθ} over the cone, which is even in θ: xθ/2 terms and a tail.
  const swing = coefficients.x * Math.sqrt(cone / 2);
  // The abscissa is rounded, which shows in the fields as far as they vary with it.
  const tolerance = 1e-13 + 1e-16 * swing * swing;
  for (let count = Math.ceil(swing + 8 * Math.cbrt(swing) + 16); ; count = Math.ceil(1.5 * count)) {
    const tried = Math.min(count, most);
    const series = chebyshevFit(sample, PLANE_NUMBERS, 0, cone, tried);
    const terms = usefulTerms(series, tried, tolerance);
    // Two spare terms show that the tail has really been reached.
    if (terms + 2 <= tried || tried === most) {
      return { at0: halves(series, terms, 0), at90: halves(series, terms, 4), terms };
    }
  }
}

/** Number of terms before all further ones fall below the tolerance, relative to the largest. */
function usefulTerms(series: Float64Array, count: number, tolerance: number): number {
  const largest = series.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  let terms = count * PLANE_NUMBERS;
  while (terms > PLANE_NUMBERS && Math.abs(series[terms - 1]) < tolerance * largest) terms--;
  return Math.ceil(terms / PLANE_NUMBERS);
}

/** Four of the eight numbers of every term. */
function halves(series: Float64Array, terms: number, from: number): Float64Array {
  return Float64Array.from(
    { length: 4 * terms },
    (_, i) => series[(i >> 2) * PLANE_NUMBERS + from + (i & 3)],
  );
}

export function checkDistance({ x }: MieCoefficients, wavenumber: number, distanceM: number): void {
  if (wavenumber * distanceM > x) return;
  const expected = `more than the sphere's radius, ${x / wavenumber} m`;
  throw inputError([{ key: 'distanceM', found: `${distanceM} m`, expected }]);
}
