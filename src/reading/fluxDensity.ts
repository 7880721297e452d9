import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { amplitudesAt } from '../optics/sphereAmplitudes.ts';

/** Radial samples of the flux density on a uniform grid of s = ρ². */
export interface FluxSamples {
  /** Grid step in s, m². */
  stepM2: number;
  /** Values at 0, step, 2·step …: mean over azimuth, and factor of cos 2φ. */
  mean: Float64Array;
  twofold: Float64Array;
  /** How many of them may hold crossed flux: farther out the colours of the line cancel. */
  crossedCount: number;
}

/**
 * The integrand w of the reading for a plane wave of unit irradiance: extinguished minus scattered flux through a unit
 * area of the detector plane, for a sphere on the z axis a distance z before it.
 *
 *   w = −(1 + cosθ) Re{(S2 cos²φ + S1 sin²φ) e^{ik(r−z)} / (−ikr)} − cosθ (|S2|² cos²φ + |S1|² sin²φ) / (kr)²
 *     = (crossed + scattered)(mean) + (crossed + scattered)(twofold) · cos 2φ,   φ from the field's direction.
 *
 * It is the full normal flux of the crossed and the scattered Poynting vectors in the particle's far zone; there is
 * no small-angle step. Far fields after Bohren & Huffman (1983), section 3.4.
 *
 * @param s squared distance ρ² from the axis, m², 0 or more
 * @param out receives [crossed mean, crossed twofold, scattered mean, scattered twofold], without unit
 * @param work four numbers of scratch space
 */
export function fluxDensity(
  sphere: SphereAmplitudes,
  distanceM: number,
  s: number,
  out: Float64Array,
  work: Float64Array,
): void {
  const r = Math.sqrt(distanceM * distanceM + s);
  const cosTheta = distanceM / r;
  amplitudesAt(sphere, cosTheta, work);
  const s1Re = work[0];
  const s1Im = work[1];
  const s2Re = work[2];
  const s2Im = work[3];
  // r − z = s/(r + z) keeps all digits where the angle is small.
  const phase = (sphere.wavenumber * s) / (r + distanceM);
  const cos = Math.cos(phase);
  const sin = Math.sin(phase);
  const kr = sphere.wavenumber * r;
  // −Re{S e^{iφ}/(−ikr)} = Im{S e^{iφ}}/(kr)
  const crossed1 = ((1 + cosTheta) * (s1Re * sin + s1Im * cos)) / kr;
  const crossed2 = ((1 + cosTheta) * (s2Re * sin + s2Im * cos)) / kr;
  const scattered1 = (-cosTheta * (s1Re * s1Re + s1Im * s1Im)) / (kr * kr);
  const scattered2 = (-cosTheta * (s2Re * s2Re + s2Im * s2Im)) / (kr * kr);
  out[0] = (crossed2 + crossed1) / 2;
  out[1] = (crossed2 - crossed1) / 2;
  out[2] = (scattered2 + scattered1) / 2;
  out[3] = (scattered2 - scattered1) / 2;
}
