import type { Complex } from '../numeric/complex.ts';
import { divide, multiply, scale, square, subtract } from '../numeric/complex.ts';
import type { AmplitudeJet } from '../optics/amplitudeJet.ts';
import { JET_NUMBERS, jetAt } from '../optics/amplitudeJet.ts';
import { twofoldOnAxis } from './beamCrossed.ts';
import type { BeamPath } from './beamPath.ts';
import { meanPlace } from './beamPath.ts';

/** q_0 … q_3 of the mean over azimuth, q_0 of the part with cos 2φ, and of its forms (ρ, p), ν(ρ, p) and (p, p). */
export const SCATTERED_NUMBERS = 8;

/**
 * The scattered flux density in a focused beam, −cosθ |S|²/(kr)², over the irradiance at the particle: with ν = p·ρ and ρ
 * counted from the shadow of a particle at p,
 *
 *   q_0(s) + q_1(s) ν + q_2(s) ν² + q_3(s) p²,   s = ρ².
 *
 * S is that of the beam without motion (see `beamAmplitudes`). A moving particle counts where the light is; the lobes are smoothed
 * by σ²∇²/2, to second order. The plane of scattering turns with the tilt τ of the wave: to S2 − S1 belongs the square of a
 * vector v, and where that is complex |v_x² − v_y²|² + 4|v_x v_y|² exceeds |v_x² + v_y²|² by 8 (Im τ × v)².
 *
 * @returns writes `SCATTERED_NUMBERS` into `out`
 */
export function beamScattered(
  jet: AmplitudeJet,
  path: BeamPath,
  shadow: number,
  unitM2: number,
): (s: number, out: Float64Array) => void {
  const { wavenumber, distanceM, spreadM, atParticle } = path;
  const work = new Float64Array(JET_NUMBERS);
  const mean = meanPlace(path);
  const tilt = divide([distanceM, 0], atParticle);
  /** See `BeamCrossed`. */
  const lean = subtract([shadow - mean, 0], scale(tilt, mean));
  const motion = (mean * (spreadM * (1 + tilt[0])) ** 2) / (2 * distanceM * distanceM);
  const lag = square(divide(lean, [distanceM, 0]));
  return (s, out) => {
    const r2 = distanceM * distanceM + s;
    const r = Math.sqrt(r2);
    const mu = distanceM / r;
    const sin2 = s / r2;
    jetAt(jet, [mu, 0], work);
    const muSlope = subtract(scale(tilt, mean), [mu * mu * (shadow - mean), 0]);
    const delta = scale(muSlope, unitM2 / (distanceM * r));
    // cosθ/r² is d/r³.
    const fade = (-3 * (shadow - mean) * unitM2) / r2;
    const weight = -mu / (2 * wavenumber * wavenumber * r2);
    out.fill(0, 0, SCATTERED_NUMBERS);
    for (const [at, sign] of FIELDS) {
      const s0: Complex = [work[at], work[at + 1]];
      const s1: Complex = [work[at + 4], work[at + 5]];
      const s2: Complex = [work[at + 8], work[at + 9]];
      const laplacian = subtract(scale(s2, sin2), scale(s1, 2 * mu));
      const a1 = multiply(s1, delta);
      const a2 = scale(multiply(s2, square(delta)), 0.5);
      // ∇²|S|² = 2 Re(S* ∇²S) + 2 sin²θ |S'|²
      const smoothing = 2 * motion * (inner(s0, laplacian) + sin2 * inner(s1, s1));
      const power = inner(s0, s0) + smoothing;
      out[0] += weight * power;
      out[1] += weight * (2 * inner(s0, a1) + fade * power);
      out[2] += weight * (inner(a1, a1) + 2 * inner(s0, a2) + 2 * fade * inner(s0, a1));
      out[3] -= weight * mu * inner(s0, multiply(s1, lag));
      out[4] += sign * weight * power;
    }
    const twofold: Complex =
      s > 0
        ? [(work[2] - work[0]) / (2 * s), (work[3] - work[1]) / (2 * s)]
        : twofoldOnAxis(work, [distanceM, 0]);
    const turned = 16 * weight * inner(twofold, twofold) * lean[1] * lean[1];
    out[2] -= turned * unitM2 * unitM2;
    out[3] += turned * s;
    const s0: Complex = [(work[0] + work[2]) / 2, (work[1] + work[3]) / 2];
    const a1 = multiply([(work[4] + work[6]) / 2, (work[5] + work[7]) / 2], delta);
    const once = scale(multiply(lean, twofold), 2);
    out[5] = 4 * weight * inner(s0, once);
    out[6] = 4 * weight * inner(a1, once);
    out[7] = 4 * weight * inner(s0, multiply(square(lean), twofold));
  };
}

/** S1 and S2 in the jet, and their signs in the twofold part. */
const FIELDS = [
  [0, -1],
  [2, 1],
] as const;

/** Re(a* b). */
function inner(a: Complex, b: Complex): number {
  return a[0] * b[0] + a[1] * b[1];
}
