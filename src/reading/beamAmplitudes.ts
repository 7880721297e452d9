import { chebyshevFit } from '../numeric/chebyshev.ts';
import type { Complex } from '../numeric/complex.ts';
import { add, divide, exponential, multiply, scale, square } from '../numeric/complex.ts';
import { amplitudeJet, JET_NUMBERS, jetAt } from '../optics/amplitudeJet.ts';
import { scatteringAmplitudes } from '../optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../optics/mieCoefficients.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { fitAmplitudes } from '../optics/sphereAmplitudes.ts';
import type { BeamPath } from './beamPath.ts';
import { nearAmplitudes } from './nearAmplitudes.ts';
import type { Fields } from './tableShelf.ts';

/**
 * Spread b of the directions that the beam's plane waves come from, as the sphere on the axis sees it: a function of angle is
 * smoothed to e^{b∇²} of it. Waves of the angle a have the weight e^{−(1 − cos a)/2c}, c = −i/(2kQ), which is 1/(kw0)² at the waist;
 * its means over Legendre polynomials are I_{n+½}(1/2c)/I_½(1/2c) = e^{−n(n+1)(c + c² + …)}.
 */
export function beamBlur({ wavenumber, atParticle }: BeamPath): Complex {
  const paraxial = divide([0, -1 / (2 * wavenumber)], atParticle);
  return add(paraxial, square(paraxial));
}

/** The same for the crossed flux of a moving particle, whose scattered waves have a mean of their own. */
export function movingBlur(path: BeamPath): Complex {
  const { distanceM, spreadM, atParticle, angle } = path;
  const tilt = divide([distanceM, 0], atParticle);
  const motion = divide(scale(square(add([1, 0], tilt)), (spreadM * spreadM) / (2 * distanceM)), angle);
  return add(beamBlur(path), motion);
}

/**
 * The amplitudes e^{b∇²}S of a sphere in a beam: the sum over the beam's plane waves, each scattered in its own direction.
 *
 * The scalar Laplacian of (S1 + S2)/2 has for the wave of order n the eigenvalue −(n(n + 1) − 1) near the axis, so that a_n and
 * b_n are to be taken e^{−b(n(n + 1) − 1)} times. At the waist that is the localised beam, e^{−((n + ½)/kw0)²} but for a
 * constant factor (Lock & Gouesbet 1994). Amplitudes without coefficients are expanded to the second order of b∇².
 *
 * @param fields those of the far zone, or on the detector plane at `distanceM` from the sphere
 */
export function beamAmplitudes(
  sphere: SphereAmplitudes,
  blur: Complex,
  distanceM: number,
  fields: Fields,
): SphereAmplitudes {
  const { coefficients, cosLimit } = sphere;
  if (coefficients === undefined) return { ...sphere, series: smoothedSeries(sphere, blur) };
  const seen = smoothedCoefficients(coefficients, blur);
  if (fields === 'exact') return nearAmplitudes({ ...sphere, coefficients: seen }, distanceM);
  const sample = (cosTheta: number, out: Float64Array) => scatteringAmplitudes(seen, cosTheta, out);
  return { ...sphere, coefficients: seen, ...fitAmplitudes(sample, cosLimit, seen) };
}

function smoothedCoefficients(coefficients: MieCoefficients, blur: Complex): MieCoefficients {
  const { order, x } = coefficients;
  const [aRe, aIm, bRe, bIm] = Array.from({ length: 4 }, () => new Float64Array(order));
  for (let i = 0; i < order; i++) {
    const factor = exponential(scale(blur, 1 - (i + 1) * (i + 2)));
    [aRe[i], aIm[i]] = multiply(factor, [coefficients.aRe[i], coefficients.aIm[i]]);
    [bRe[i], bIm[i]] = multiply(factor, [coefficients.bRe[i], coefficients.bIm[i]]);
  }
  return { order, aRe, aIm, bRe, bIm, x };
}

/** The polynomial S + b∇²(S1 + S2)/2 + …: what S1 and S2 differ by begins with θ², and is left as it is. */
function smoothedSeries(sphere: SphereAmplitudes, blur: Complex): Float64Array {
  const out = sphere.series.slice();
  let term = sphere;
  for (let n = 1; n <= 2; n++) {
    term = { ...term, series: laplacianOfMean(term, scale(blur, 1 / n)) };
    for (let i = 0; i < out.length; i++) out[i] += term.series[i];
  }
  return out;
}

/** A factor times ∇²(S1 + S2)/2, with ∇² = (1 − μ²) d²/dμ² − 2μ d/dμ, μ = cosθ: of the same degree as S. */
function laplacianOfMean(sphere: SphereAmplitudes, factor: Complex): Float64Array {
  const jet = amplitudeJet(sphere);
  const work = new Float64Array(JET_NUMBERS);
  const sample = (mu: number, out: Float64Array) => {
    jetAt(jet, [mu, 0], work);
    const [re, im] = [0, 1].map((part) => {
      const [s1, s2] = [4, 8].map((at) => (work[at + part] + work[at + 2 + part]) / 2);
      return (1 - mu * mu) * s2 - 2 * mu * s1;
    });
    out.set(multiply(factor, [re, im]));
    out.copyWithin(2, 0, 2);
  };
  return chebyshevFit(sample, 4, sphere.cosLimit, 1, sphere.terms);
}
