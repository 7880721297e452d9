import type { Complex } from '../numeric/complex.ts';
import {
  add,
  divide,
  exponential,
  multiply,
  scale,
  square,
  squareRoot,
  subtract,
  timesI,
} from '../numeric/complex.ts';
import type { QuadratureRule } from '../numeric/gaussLegendre.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { amplitudesBeside } from '../optics/sphereAmplitudes.ts';

/**
 * The complex place where the exponent of the averaged crossed flux is stationary.
 *
 * With the particle spread normally by σ per axis, the crossed flux at ρ is the imaginary part of the mean over places
 * (X, Y) of a slow amplitude times e^ψ,
 *
 *     ψ = −((X − ρ)² + Y²)/(2σ²) + ik(r − z),   r² = z² + X² + Y²,
 *
 * and ψ is stationary at Y = 0, X = q = ρ/(1 − ikσ²/r). At small angles, where r = z, ψ there is −αρ² of the paraxial form.
 */
export interface StillPoint {
  /** q, metres. */
  place: Complex;
  /** r and r − z at q, metres. */
  r: Complex;
  path: Complex;
  /** ψ at q: the real part is the damping, never above 0. */
  exponent: Complex;
}

/** Passes of the repetition below; each gains a factor of about (r/ρ)², 50 at 80°. */
const MOST_PASSES = 2000;

/** Solves q = ρ/(1 − ikσ²/r(q)) by repetition from r = z. */
export function stillPoint(wavenumber: number, distanceM: number, spreadM: number, rho: number): StillPoint {
  const pull = wavenumber * spreadM * spreadM;
  let r: Complex = [distanceM, 0];
  let place: Complex = [rho, 0];
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    place = divide(scale(r, rho), [r[0], r[1] - pull]);
    const next = distanceAt(square(place), distanceM);
    const change = Math.abs(next[0] - r[0]) + Math.abs(next[1] - r[1]);
    r = next;
    if (change < 1e-15 * distanceM) break;
  }
  // (q − ρ)/σ = ikσ q/r, without the difference.
  const shift = scale(timesI(divide(place, r)), wavenumber * spreadM);
  const path = pathLength(square(place), r, distanceM);
  const exponent = subtract(timesI(scale(path, wavenumber)), scale(square(shift), 0.5));
  return { place, r, path, exponent };
}

/**
 * The averaged crossed field over e^{ψ(q)}: a slow function of ρ.
 *
 * Gauss–Hermite quadrature through q along the lines on which e^ψ falls off as a Gaussian, with the complex variances
 * σ²/(1 − ikσ²z²/r³) along and σ²/(1 − ikσ²/r) across. Two nodes suffice for a constant amplitude at small angles.
 *
 * @param rule for the standard normal variable, an even number of nodes
 * @param work four numbers of scratch space
 * @returns mean and twofold part: the imaginary parts of their products with e^{ψ(q)} are the crossed flux of `fluxDensity`
 */
export function crossedAverage(
  sphere: SphereAmplitudes,
  distanceM: number,
  spreadM: number,
  still: StillPoint,
  { nodes, weights }: QuadratureRule,
  work: Float64Array,
): [mean: Complex, twofold: Complex] {
  const { wavenumber } = sphere;
  const cosine = divide([distanceM, 0], still.r);
  const chirp = scale(cosine, (wavenumber * spreadM * spreadM) / distanceM);
  const along = squareRoot(divide([1, 0], subtract([1, 0], timesI(multiply(chirp, square(cosine))))));
  const across = squareRoot(divide([1, 0], subtract([1, 0], timesI(chirp))));
  const shift = scale(timesI(divide(still.place, still.r)), wavenumber * spreadM);
  let mean: Complex = [0, 0];
  let twofold: Complex = [0, 0];
  for (let i = 0; i < nodes.length; i++) {
    const offX = add(shift, scale(along, nodes[i]));
    const x2 = square(add(still.place, scale(along, spreadM * nodes[i])));
    // The lower half plane mirrors the upper one.
    for (let j = nodes.length >> 1; j < nodes.length; j++) {
      const offY = scale(across, nodes[j]);
      const y2 = scale(square(offY), spreadM * spreadM);
      const s = add(x2, y2);
      const r = distanceAt(s, distanceM);
      const phase = timesI(scale(pathLength(s, r, distanceM), wavenumber));
      const gaussian = scale(add(square(offX), square(offY)), 0.5);
      const rise = subtract(subtract(phase, gaussian), still.exponent);
      // The rule's own weight holds e^{−u²/2}: it is divided out.
      const excess = exponential([rise[0] + (nodes[i] ** 2 + nodes[j] ** 2) / 2, rise[1]]);
      const cosTheta = divide([distanceM, 0], r);
      const field = multiply(excess, divide([1 + cosTheta[0], cosTheta[1]], scale(r, wavenumber)));
      const weighted = scale(field, 2 * weights[i] * weights[j]);
      amplitudesBeside(sphere, cosTheta[0], cosTheta[1], work);
      const [s1Re, s1Im, s2Re, s2Im] = work;
      mean = add(mean, multiply(weighted, [(s2Re + s1Re) / 2, (s2Im + s1Im) / 2]));
      const cos2Phi = divide(subtract(x2, y2), s);
      const half = multiply(weighted, [(s2Re - s1Re) / 2, (s2Im - s1Im) / 2]);
      twofold = add(twofold, multiply(cos2Phi, half));
    }
  }
  const stretch = multiply(along, across);
  return [multiply(mean, stretch), multiply(twofold, stretch)];
}

/** r of s = ρ². */
function distanceAt(s: Complex, distanceM: number): Complex {
  return squareRoot([distanceM * distanceM + s[0], s[1]]);
}

/** r − z = s/(r + z), without the difference. */
function pathLength(s: Complex, r: Complex, distanceM: number): Complex {
  return divide(s, [r[0] + distanceM, r[1]]);
}
