import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { Complex } from '../numeric/complex.ts';
import { add, divide, exponential, multiply, scale, square, squareRoot, timesI } from '../numeric/complex.ts';

/**
 * A focused Gaussian beam along +z, on the detector's axis.
 * z counts from the particle's nominal place, as in the brief.
 */
export interface GaussianBeam {
  /** Radius at the focus where the irradiance is 1/e² of that on the axis, metres. */
  waistM: number;
  /** Place of the waist, metres; negative before the particle. */
  focusM: number;
}

/**
 * The waist is at least this many wavelengths and particle radii. At both limits readings hold to 1e-4 of the extinction, wherever
 * the particle is, at twice that to 2e-5 (measured against the sum over the beam's plane waves). What a waist means is known
 * no better than to (kw0)^−2, 1e-3 at five wavelengths: there a paraxial Gaussian, the waves from a complex place that are used
 * here, and the fields of a real lens are so far apart.
 */
const LEAST_WAIST = 5;

/**
 * @param wavelengthM in the medium, metres
 * @param radiusM of the largest particle, metres
 * @throws RimwrightError `input` for a waist below five wavelengths or five particle radii
 */
export function checkBeam(beam: GaussianBeam, wavelengthM: number, radiusM: number): void {
  const problems = beamProblems(beam, wavelengthM, radiusM);
  if (problems.length > 0) throw inputError(problems);
}

/** What `checkBeam` throws, as a list. */
export function beamProblems(beam: GaussianBeam, wavelengthM: number, radiusM: number): Problem[] {
  const problems: Problem[] = [];
  const leastM = LEAST_WAIST * Math.max(wavelengthM, radiusM);
  if (!(beam.waistM >= leastM && beam.waistM < Number.POSITIVE_INFINITY)) {
    const which = wavelengthM > radiusM ? 'wavelengths in the medium' : 'radii of the largest particle';
    problems.push({
      key: 'light.beam.waist',
      found: micrometres(beam.waistM),
      expected: `at least ${micrometres(leastM)}, five ${which}`,
    });
  }
  if (!Number.isFinite(beam.focusM)) {
    problems.push({
      key: 'light.beam.focus',
      found: String(beam.focusM),
      expected: 'a place along the beam, such as 0 mm',
    });
  }
  return problems;
}

/** Rayleigh range z_R = k w0²/2, metres: there the beam is √2 wider than at its waist. k in the medium, 1/m. */
export function rayleighRange({ waistM }: GaussianBeam, wavenumber: number): number {
  return (wavenumber * waistM * waistM) / 2;
}

/** w(z) = w0 √(1 + (z − f)²/z_R²), metres (Kogelnik & Li 1966, eq. 20). */
export function beamRadius(beam: GaussianBeam, wavenumber: number, zM: number): number {
  return beam.waistM * Math.hypot(1, (zM - beam.focusM) / rayleighRange(beam, wavenumber));
}

/** 1/R(z), 1/m: positive where the beam spreads, 0 at the waist, where R itself is infinite (Kogelnik & Li 1966, eq. 21). */
export function wavefrontCurvature(beam: GaussianBeam, wavenumber: number, zM: number): number {
  return divide([1, 0], complexDistance(beam, wavenumber, zM))[0];
}

/** arctan((z − f)/z_R), radians: how far the phase on the axis lags behind kz (Kogelnik & Li 1966, eq. 22). */
export function gouyPhase(beam: GaussianBeam, wavenumber: number, zM: number): number {
  return Math.atan((zM - beam.focusM) / rayleighRange(beam, wavenumber));
}

/** Power of the whole beam, W, of the irradiance (W/m²) that is on its axis at z: π w²/2 times that. */
export function beamPower(
  beam: GaussianBeam,
  wavenumber: number,
  zM: number,
  axialIrradianceWm2: number,
): number {
  return (Math.PI / 2) * beamRadius(beam, wavenumber, zM) ** 2 * axialIrradianceWm2;
}

/** Irradiance on the axis at z over that at the particle's nominal place, w(0)²/w(z)². */
export function axialIrradiance(beam: GaussianBeam, wavenumber: number, zM: number): number {
  return (beamRadius(beam, wavenumber, 0) / beamRadius(beam, wavenumber, zM)) ** 2;
}

/** Q(z) = z − f − i z_R, metres: the distance from the complex place where the beam's spherical waves begin. */
export function complexDistance(beam: GaussianBeam, wavenumber: number, zM: number): Complex {
  return [zM - beam.focusM, -rayleighRange(beam, wavenumber)];
}

/** √(Q² + s), metres: the distance off the axis at s = ρ², on the branch that goes over into Q on the axis. */
export function slantDistance(q: Complex, s: number): Complex {
  const [re, im] = squareRoot(add(square(q), [s, 0]));
  return re * q[0] + im * q[1] < 0 ? [-re, -im] : [re, im];
}

/**
 * e^{ik(R − Q)}/R, 1/m: the spherical wave from a point at the distance Q, real or complex, at s = ρ².
 * Its phase is counted from the plane's axis.
 */
export function pointWave(q: Complex, wavenumber: number, s: number): Complex {
  const r = slantDistance(q, s);
  // R − Q = s/(R + Q) keeps all digits near the axis.
  return divide(exponential(timesI(scale(divide([s, 0], add(r, q)), wavenumber))), r);
}

/**
 * The beam's field u without its e^{ikz}, 1 at the middle of the waist: −i z_R times the wave from a point at a complex
 * place, an exact solution of the wave equation (Deschamps 1971).
 *
 * Its paraxial form, R ≈ Q + ρ²/2Q, is the Gaussian 1/(1 + iζ) e^{−ρ²/(w0²(1 + iζ))} with ζ = (z − f)/z_R. The two agree
 * to (kw0)^−2 in amplitude, but far behind a small waist the paraxial phase is off by kρ⁴/8z³, and a spherical scattered wave
 * shows it: by one radian at the edge of the beam, 50 mm behind a waist of five wavelengths.
 *
 * @param wavenumber k in the medium, 1/m
 * @param s squared distance ρ² from the axis, m², far below |Q|²
 */
export function beamField(beam: GaussianBeam, wavenumber: number, zM: number, s: number): Complex {
  const wave = pointWave(complexDistance(beam, wavenumber, zM), wavenumber, s);
  return multiply([0, -rayleighRange(beam, wavenumber)], wave);
}

function micrometres(lengthM: number): string {
  return `${Number((lengthM * 1e6).toPrecision(4))} um`;
}
