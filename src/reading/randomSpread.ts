import { RimwrightError } from '../base/errors.ts';
import { countWhile } from '../numeric/countWhile.ts';
import { evenNormal } from '../numeric/evenNormal.ts';
import { gaussHermite } from '../numeric/gaussHermite.ts';
import type { QuadratureRule } from '../numeric/gaussLegendre.ts';
import { sparseSamples } from '../numeric/sparseSamples.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { crossedAverage, stillPoint } from './crossedAverage.ts';
import type { FluxSamples } from './fluxDensity.ts';
import { fluxDensity } from './fluxDensity.ts';

/** Crossed flux damped by more than e^−25 is left at zero. */
const NEGLIGIBLE_EXPONENT = 25;
/**
 * Numbers of quadrature nodes an axis, tried until two agree: Gauss–Hermite, then for the scattered lobes of large spheres evenly
 * spaced. All even, so that none falls on the detector's centre.
 */
const HERMITE = [2, 4, 8, 16, 32, 60];
const EVEN = [32, 64, 128, 256];
/** How far two may differ, over the forward flux. Doubling the nodes about squares the error. */
const SETTLED = 1e-5;
/** Places farther off than this many σ carry less than 1e-10 of the particle, and are left out. */
export const FARTHEST_SPREAD = 7;

/**
 * Adds the flux density of one sphere, averaged over a normal spread of its transverse position, to the samples.
 *
 * At distance ρ the average is ∬ w(ρ + ξ) N(ξ; σ) d²ξ. The crossed part turns and fades as e^{ψ(q)} (see `StillPoint`);
 * what is left of it, and the scattered part, are slow: both are computed at every eighth sample, and interpolated.
 *
 * @param spreadM σ per axis, metres, above 0
 * @param weight of this sphere in the sum
 * @throws RimwrightError `input` where the average does not settle: the sphere is far inside its near zone, or σ about as large as z
 */
export function addSpreadFlux(
  sphere: SphereAmplitudes,
  distanceM: number,
  spreadM: number,
  weight: number,
  samples: FluxSamples,
): void {
  const { stepM2, mean, twofold } = samples;
  const stride = slowStride(sphere, distanceM);
  const forward = Math.hypot(...sphere.forward) / (sphere.wavenumber * distanceM);
  const work = new Float64Array(4);
  const hermite = HERMITE.map(gaussHermite);
  // The damping grows steadily with ρ.
  const lit = countWhile(samples.crossedCount, (i) => {
    const { exponent } = stillPoint(sphere.wavenumber, distanceM, spreadM, Math.sqrt(i * stepM2));
    return exponent[0] > -NEGLIGIBLE_EXPONENT;
  });
  const crossed = sparseSamples(lit, 6, stride, (place, out) => {
    const still = stillPoint(sphere.wavenumber, distanceM, spreadM, Math.sqrt(place * stepM2));
    out.set(still.exponent, 4);
    settle(hermite, out, 2 * forward * Math.exp(-still.exponent[0]), (rule) => {
      const [even, odd] = crossedAverage(sphere, distanceM, spreadM, still, rule, work);
      out.set(even);
      out.set(odd, 2);
    });
  });
  for (let i = 0; i < lit; i++) {
    const [evenRe, evenIm, oddRe, oddIm, damping, phase] = crossed.subarray(6 * i, 6 * i + 6);
    const cos = weight * Math.exp(damping) * Math.cos(phase);
    const sin = weight * Math.exp(damping) * Math.sin(phase);
    mean[i] += evenRe * sin + evenIm * cos;
    twofold[i] += oddRe * sin + oddIm * cos;
  }

  const rules = [...hermite.slice(0, 4), ...EVEN.map((count) => evenNormal(count, FARTHEST_SPREAD))];
  // Averaged over places, nothing changes faster than the spread itself.
  const wide = Math.max(stride, (spreadM * spreadM) / (4 * stepM2));
  const scattered = sparseSamples(mean.length, 2, wide, (place, out) => {
    const rho = Math.sqrt(place * stepM2);
    settle(rules, out, forward * forward, (rule) =>
      scatteredAverage(sphere, distanceM, spreadM, rho, rule, out, work),
    );
  });
  for (let i = 0; i < mean.length; i++) {
    mean[i] += weight * scattered[2 * i];
    twofold[i] += weight * scattered[2 * i + 1];
  }
}

/** The slow parts turn by at most ka²/z radians a radian of η, and a sample is an eighth of one. */
function slowStride({ sizeParameter, wavenumber }: SphereAmplitudes, distanceM: number): number {
  const nearness = sizeParameter ** 2 / (wavenumber * distanceM);
  return Math.max(1, Math.min(8, 3 / nearness));
}

/** Tries finer and finer rules until two of them agree to SETTLED of `largest`. */
function settle(
  rules: readonly QuadratureRule[],
  out: Float64Array,
  largest: number,
  average: (rule: QuadratureRule) => void,
): void {
  let before: Float64Array | null = null;
  for (const rule of rules) {
    average(rule);
    if (before?.every((value, n) => Math.abs(out[n] - value) < SETTLED * largest)) return;
    before = out.slice();
  }
  throw new RimwrightError(
    'input',
    'random motion too wide to be averaged, or a particle too large for its far zone at this distance',
  );
}

/** Mean and twofold part of the averaged scattered flux. */
function scatteredAverage(
  sphere: SphereAmplitudes,
  distanceM: number,
  spreadM: number,
  rho: number,
  { nodes, weights }: QuadratureRule,
  out: Float64Array,
  work: Float64Array,
): void {
  const flux = new Float64Array(4);
  out.fill(0);
  for (let i = 0; i < nodes.length; i++) {
    const x = rho + spreadM * nodes[i];
    // The lower half plane mirrors the upper one.
    for (let j = nodes.length >> 1; j < nodes.length; j++) {
      if (nodes[i] ** 2 + nodes[j] ** 2 > FARTHEST_SPREAD ** 2) continue;
      const y = spreadM * nodes[j];
      const s = x * x + y * y;
      fluxDensity(sphere, distanceM, s, flux, work);
      const share = 2 * weights[i] * weights[j];
      out[0] += share * flux[2];
      out[1] += (share * flux[3] * (x * x - y * y)) / s;
    }
  }
}
