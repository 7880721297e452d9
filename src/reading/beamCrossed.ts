import type { Complex } from '../numeric/complex.ts';
import { add, divide, exponential, multiply, scale, square, subtract, timesI } from '../numeric/complex.ts';
import type { AmplitudeJet } from '../optics/amplitudeJet.ts';
import { JET_NUMBERS, jetAt } from '../optics/amplitudeJet.ts';
import { pointWave, slantDistance } from '../optics/gaussianBeam.ts';
import type { BeamPath } from './beamPath.ts';

/**
 * The crossed flux density in a focused beam as a power series in ν = p·ρ, ρ counted from the shadow of a particle at p:
 *
 *   w = Re{K(p²) Σ c_n(s) ν^n},   s = ρ²,
 *
 * over the irradiance on the axis at the particle's z, and the part with cos 2φ likewise. The c_n do not depend on p: one table
 * serves every place.
 *
 * It is the crossed flux of `fluxDensity` with the beam's u* for 1 and the obliquity (cosθ + cosθ_u)/2. In the exponent
 * ik(r − R*) the two distances are taken to second order of ν, elsewhere to first,
 *
 *   r = √(d² + |ρ + (m − 1)p|²) = r_s + (m − 1)ν/r_s + …,   R = √(Q² + |ρ + mp|²) = R_s + mν/R_s + …
 *
 * The sphere sees a wave tilted by the complex angle p/Q, whose imaginary part is the fall of the field across it, and
 * curved: it answers with the amplitudes of `beamAmplitudes` at cosΘ, the complex cosine to the direction (p, Q). That is the
 * sum over the beam's plane waves, each scattered in its own direction. The tilt counts: without it a
 * particle beside the axis of a beam that has spread would show S at the wrong angle, x²(p/R)²/8 of it.
 * With random motion d turns complex (see `BeamPath`).
 */
export interface BeamCrossed {
  /** E(s), the fast part that all c_n share: e^{ik(r − d)}/r and the beam's, of both together 1 on the axis. */
  wave(s: number): Complex;
  /**
   * Writes the slow parts c_n/E at s, re and im of each, and as many each of: the part with p² if `curved`; for polarised light
   * then those with the forms (ρ, p) and (p, p) of cos 2φ; for polarised light in any case that with cos 2φ itself.
   */
  slow(s: number, out: Float64Array): void;
  /** K(p²), 1 on the axis. */
  factor(p2: number): Complex;
}

/** What is written of the series. */
export interface SeriesForm {
  /** Powers of ν, from 0 on. */
  terms: number;
  /** ν is counted in these, m², and p² too. */
  unitM2: number;
  polarised: boolean;
  /** Whether the part with p² is written as well (see `tiltNumber`). */
  curved: boolean;
}

/**
 * @param jet the amplitudes in the beam (see `beamAmplitudes`)
 * @param shadow m, which scales the particle's place to that of its shadow
 */
export function beamCrossed(
  jet: AmplitudeJet,
  path: BeamPath,
  shadow: number,
  { terms, unitM2, polarised, curved }: SeriesForm,
): BeamCrossed {
  const { wavenumber, distanceM, atParticle, blurred, atPlane, wave, angle, source } = path;
  const work = new Float64Array(JET_NUMBERS);
  const series = new Float64Array(2 * terms);
  /** m − 1, for a particle at rest. */
  const offset = subtract([shadow, 0], source);
  const tilt = divide([distanceM, 0], atParticle);
  const onAxis = multiply(wave, atPlane);
  // −1/(−ik) = −i/k, times the beam's fields on the axis, u(particle) u*(plane)/|u(particle, at rest)|² = |Q|²/(Q − ikσ²)Q*.
  const lit = divide([atParticle[0] ** 2 + atParticle[1] ** 2, 0], blurred);
  const strength = divide(multiply([0, -1 / wavenumber], lit), onAxis);
  const axis = changesOnAxis(jet, path, offset, shadow);
  /** e: with p times that added to ρ, directions count from that of the wave. */
  const lean = subtract([shadow - 1, 0], tilt);

  function slow(s: number, out: Float64Array): void {
    const r = slantDistance(wave, s);
    const beam = slantDistance(atPlane, s);
    const cosWave = divide(wave, r);
    const cosBeam = divide(atPlane, beam);
    const obliquity = add(cosWave, cosBeam);
    const rSlope = divide(offset, r);
    const beamSlope = divide([shadow, 0], beam);
    const linear = scale(timesI(subtract(rSlope, beamSlope)), wavenumber * unitM2);
    const bend = subtract(divide(square(rSlope), r), divide(square(beamSlope), beam));
    const quadratic = scale(timesI(bend), -wavenumber * unitM2 * unitM2);
    exponentialSeries(linear, quadratic, multiply(strength, obliquity), terms, series);
    // Slope of the logarithm of obliquity/(rR).
    const rFade = divide(rSlope, r);
    const beamFade = divide(beamSlope, beam);
    const turning = divide(add(multiply(cosWave, rFade), multiply(cosBeam, beamFade)), obliquity);
    const fade = scale(add(turning, add(rFade, beamFade)), -unitM2);

    const slant = slantDistance(angle, s);
    const mu = divide(angle, slant);
    const muSquare = square(mu);
    jetAt(jet, mu, work);
    const [s0, s1, s2] = [0, 4, 8].map(
      (i): Complex => [(work[i] + work[i + 2]) / 2, (work[i + 1] + work[i + 3]) / 2],
    );
    const muSlope = divide(subtract(tilt, scale(muSquare, shadow - 1)), multiply(angle, slant));
    const delta = scale(muSlope, unitM2);
    const turned = multiply(s1, delta);
    const a1 = add(turned, multiply(s0, fade));
    const a2 = add(scale(multiply(s2, square(delta)), 0.5), multiply(turned, fade));
    seriesTimes(series, [s0, a1, a2], out.subarray(0, 2 * terms));
    if (curved) {
      const rBent = square(rSlope);
      const beamBent = square(beamSlope);
      const turningBack = divide(add(multiply(cosWave, rBent), multiply(cosBeam, beamBent)), obliquity);
      const fall = scale(add(turningBack, add(rBent, beamBent)), -0.5);
      const bent = subtract(multiply(rBent, r), multiply(beamBent, beam));
      const change = add(fall, scale(timesI(subtract(bent, axis.bend)), wavenumber / 2));
      const rest = scale(subtract(change, axis.lag), unitM2);
      const muFall = scale(divide(multiply(mu, muAtPlace(tilt, shadow, muSquare)), square(angle)), unitM2);
      const b0 = add(multiply(s0, rest), multiply(s1, muFall));
      const b1 = add(multiply(a1, rest), multiply(muFall, add(multiply(s2, delta), multiply(s1, fade))));
      seriesTimes(series, [b0, b1], out.subarray(2 * terms, 4 * terms));
    }
    if (polarised) {
      const twofold: Complex = [(work[2] - work[0]) / 2, (work[3] - work[1]) / 2];
      if (curved) {
        // Its plane of scattering is that of ρ + ep: cos 2φ becomes a form of that vector, over s.
        const overS = s > 0 ? scale(twofold, unitM2 / s) : scale(twofoldOnAxis(work, angle), unitM2);
        const once = scale(multiply(lean, overS), 2);
        const twice = multiply(square(lean), overS);
        seriesTimes(series, [once, multiply(once, fade)], out.subarray(4 * terms, 6 * terms));
        seriesTimes(series, [twice, multiply(twice, fade)], out.subarray(6 * terms, 8 * terms));
      }
      seriesTimes(series, [twofold, multiply(twofold, fade)], out.subarray(out.length - 2 * terms));
    }
  }

  return {
    wave: (s) =>
      multiply(onAxis, multiply(pointWave(wave, wavenumber, s), pointWave(atPlane, -wavenumber, s))),
    slow,
    factor: (p2) => crossedFactor(path, axis, p2),
  };
}

/** (S2 − S1)/2s on the axis, from the jet there. */
export function twofoldOnAxis(work: Float64Array, distance: Complex): Complex {
  return divide([(work[4] - work[6]) / 4, (work[5] - work[7]) / 4], square(distance));
}

/** What changes with p² in the middle of the shadow: K(p²) but for the field at the particle, which is known for any p. */
interface AxisChanges {
  /** Of the exponent, over ik/2. */
  bend: Complex;
  /** Of the amplitude's logarithm, by cosΘ. */
  lag: Complex;
  /** With p⁴. */
  lag2: Complex;
}

function changesOnAxis(jet: AmplitudeJet, path: BeamPath, offset: Complex, shadow: number): AxisChanges {
  const { distanceM, atParticle, atPlane, wave, angle } = path;
  const work = new Float64Array(JET_NUMBERS);
  jetAt(jet, [1, 0], work);
  const [first, second] = [4, 8].map((i) =>
    divide([(work[i] + work[i + 2]) / 2, (work[i + 1] + work[i + 3]) / 2], [work[0], work[1]]),
  );
  const fall = divide(muAtPlace(divide([distanceM, 0], atParticle), shadow, [1, 0]), square(angle));
  return {
    bend: subtract(divide(square(offset), wave), divide([shadow * shadow, 0], atPlane)),
    lag: multiply(first, fall),
    lag2: scale(multiply(second, square(fall)), 0.5),
  };
}

/** What goes with p²/d² in cosΘ, over cosΘ. */
function muAtPlace(tilt: Complex, shadow: number, muSquare: Complex): Complex {
  const bent = add(scale(muSquare, (shadow - 1) ** 2), square(tilt));
  return subtract(scale(tilt, shadow - 1), scale(bent, 0.5));
}

function crossedFactor({ wavenumber, blurred }: BeamPath, axis: AxisChanges, p2: number): Complex {
  const phase = exponential(scale(timesI(axis.bend), (wavenumber * p2) / 2));
  const field = multiply(blurred, pointWave(blurred, wavenumber, p2));
  const amplitude = add([1, 0], add(scale(axis.lag, p2), scale(axis.lag2, p2 * p2)));
  return multiply(multiply(field, phase), amplitude);
}

/** Coefficients h_n of base · exp(linear ν + quadratic ν²/2): (n + 1) h_{n+1} = linear h_n + quadratic h_{n−1}. */
function exponentialSeries(
  linear: Complex,
  quadratic: Complex,
  base: Complex,
  terms: number,
  out: Float64Array,
): void {
  let before: Complex = [0, 0];
  let value = base;
  for (let n = 0; n < terms; n++) {
    out[2 * n] = value[0];
    out[2 * n + 1] = value[1];
    const next = scale(add(multiply(linear, value), multiply(quadratic, before)), 1 / (n + 1));
    before = value;
    value = next;
  }
}

/** A series times a short polynomial in ν, cut after as many terms. */
function seriesTimes(series: Float64Array, polynomial: readonly Complex[], out: Float64Array): void {
  for (let n = 0; n < series.length; n += 2) {
    let re = 0;
    let im = 0;
    for (let j = 0; j < polynomial.length && 2 * j <= n; j++) {
      const [aRe, aIm] = polynomial[j];
      const hRe = series[n - 2 * j];
      const hIm = series[n - 2 * j + 1];
      re += aRe * hRe - aIm * hIm;
      im += aRe * hIm + aIm * hRe;
    }
    out[n] = re;
    out[n + 1] = im;
  }
}
