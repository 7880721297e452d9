import type { SphereAmplitudes } from '../../src/optics/sphereAmplitudes.ts';
import { fluxDensity } from '../../src/reading/fluxDensity.ts';

/**
 * The plain form of the flux density averaged over random motion, ∬ w(ρ + ξ) N(ξ; σ) d²ξ, by the trapezoid rule in the plane:
 * for a Gaussian weight it converges exponentially once its step resolves the integrand's phase.
 *
 * @param rho distance from the axis, metres
 * @returns mean over azimuth, and factor of cos 2φ
 */
export function plainSpread(
  sphere: SphereAmplitudes,
  distanceM: number,
  spreadM: number,
  rho: number,
): [mean: number, twofold: number] {
  const k = sphere.wavenumber;
  // Steepest phase, in radians a spread, within ±7 spreads; then as much again for the Gaussian.
  const steepest = (k * spreadM * (rho + 7 * spreadM)) / Math.hypot(distanceM, rho + 7 * spreadM);
  const lobes = (2 * sphere.sizeParameter * spreadM) / distanceM;
  const points = Math.ceil((7 * (steepest + lobes + 9)) / (2 * Math.PI));
  const out = new Float64Array(4);
  const work = new Float64Array(4);
  let [mean, twofold, total] = [0, 0, 0];
  for (let i = -points; i <= points; i++) {
    for (let j = -points; j <= points; j++) {
      const u = (7 * i) / points;
      const v = (7 * j) / points;
      const weight = Math.exp(-(u * u + v * v) / 2);
      const x = rho + spreadM * u;
      const y = spreadM * v;
      const s = x * x + y * y;
      fluxDensity(sphere, distanceM, s, out, work);
      total += weight;
      mean += weight * (out[0] + out[2]);
      if (s > 0) twofold += (weight * (out[1] + out[3]) * (x * x - y * y)) / s;
    }
  }
  return [mean / total, twofold / total];
}
