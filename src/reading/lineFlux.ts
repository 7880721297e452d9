import { chebyshevFour, settledFit } from '../numeric/chebyshev.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { amplitudesAt } from '../optics/sphereAmplitudes.ts';
import type { FluxSamples } from './fluxDensity.ts';

/** A sphere in one colour, and the colour's part of the light. */
export interface WeighedSphere {
  weight: number;
  sphere: SphereAmplitudes;
}

/** Of the sums over a line, relative to their largest coefficient: a hundredth of what tables are held to. */
const TOLERANCE = 1e-10;

/** More terms than any line and cone asked for so far. */
const MOST_TERMS = 4000;

/**
 * Adds the flux density of one line's colours to the samples: what `fluxDensity` gives for each, summed.
 *
 * The colours are nearly in step: with P = r − z and k₀ among their wavenumbers,
 *
 *     Σ w_c S_c e^{ik_c P}/(k_c r) = e^{ik₀P}/(k₀r) · Σ w_c (k₀/k_c) S_c e^{i(k_c−k₀)P}
 *
 * has a sum that changes slowly over cosθ, and so has Σ w_c |S_c|²/k_c². Each is computed at a few places and becomes one series, so
 * that a sample costs no more than in light of a single colour.
 */
export function addLineFlux(
  colours: readonly WeighedSphere[],
  distanceM: number,
  { stepM2, mean, twofold, crossedCount }: FluxSamples,
): void {
  const count = mean.length;
  const cosAt = (i: number) => distanceM / Math.sqrt(distanceM * distanceM + i * stepM2);
  const work = new Float64Array(4);
  if (crossedCount > 0) {
    const low = cosAt(crossedCount - 1);
    const { wavenumber } = colours[colours.length >> 1].sphere;
    const read = reader(low, crossedSeries(colours, wavenumber, distanceM, low));
    for (let i = 0; i < crossedCount; i++) {
      const s = i * stepM2;
      const r = Math.sqrt(distanceM * distanceM + s);
      const cosTheta = distanceM / r;
      read(cosTheta, work);
      const phase = (wavenumber * s) / (r + distanceM);
      const cos = Math.cos(phase);
      const sin = Math.sin(phase);
      const factor = (1 + cosTheta) / (2 * wavenumber * r);
      const crossed1 = work[0] * sin + work[1] * cos;
      const crossed2 = work[2] * sin + work[3] * cos;
      mean[i] += factor * (crossed2 + crossed1);
      twofold[i] += factor * (crossed2 - crossed1);
    }
  }
  const low = cosAt(count - 1);
  const read = reader(low, scatteredSeries(colours, low));
  for (let i = 0; i < count; i++) {
    const r2 = distanceM * distanceM + i * stepM2;
    const cosTheta = distanceM / Math.sqrt(r2);
    read(cosTheta, work);
    const factor = -cosTheta / (2 * r2);
    mean[i] += factor * (work[1] + work[0]);
    twofold[i] += factor * (work[1] - work[0]);
  }
}

/** Series over [low, 1] of Σ w_c (k₀/k_c) S_c e^{i(k_c−k₀)P}, S1 and S2 as re, im. */
function crossedSeries(
  colours: readonly WeighedSphere[],
  wavenumber: number,
  distanceM: number,
  low: number,
): Fitted {
  const one = new Float64Array(4);
  const sample = (cosTheta: number, out: Float64Array) => {
    const path = (distanceM * (1 - cosTheta)) / cosTheta;
    out.fill(0);
    for (const { weight, sphere } of colours) {
      amplitudesAt(sphere, cosTheta, one);
      const phase = (sphere.wavenumber - wavenumber) * path;
      const factor = (weight * wavenumber) / sphere.wavenumber;
      const [cos, sin] = [factor * Math.cos(phase), factor * Math.sin(phase)];
      out[0] += one[0] * cos - one[1] * sin;
      out[1] += one[0] * sin + one[1] * cos;
      out[2] += one[2] * cos - one[3] * sin;
      out[3] += one[2] * sin + one[3] * cos;
    }
  };
  const strays = colours.map(({ sphere }) => Math.abs(sphere.wavenumber - wavenumber));
  const swing = (Math.max(...strays) * distanceM * (1 - low)) / low;
  return fitted(sample, colours, low, swing);
}

/** Series over [low, 1] of Σ w_c |S_c|²/k_c², for S1 and S2; two more hold nothing. */
function scatteredSeries(colours: readonly WeighedSphere[], low: number): Fitted {
  const one = new Float64Array(4);
  const sample = (cosTheta: number, out: Float64Array) => {
    out.fill(0);
    for (const { weight, sphere } of colours) {
      amplitudesAt(sphere, cosTheta, one);
      const factor = weight / sphere.wavenumber ** 2;
      out[0] += factor * (one[0] * one[0] + one[1] * one[1]);
      out[1] += factor * (one[2] * one[2] + one[3] * one[3]);
    }
  };
  return fitted(sample, colours, low, 0);
}

interface Fitted {
  series: Float64Array;
  terms: number;
}

/** @param swing phase over [low, 1] beside that of the amplitudes */
function fitted(
  sample: (cosTheta: number, out: Float64Array) => void,
  colours: readonly WeighedSphere[],
  low: number,
  swing: number,
): Fitted {
  const largest = Math.max(...colours.map(({ sphere }) => sphere.sizeParameter));
  const both = swing / 2 + largest * Math.sqrt(1 - low);
  const first = Math.ceil(both + 3 * Math.cbrt(both) + 8);
  return settledFit(sample, low, 1, { first, most: MOST_TERMS, tolerance: TOLERANCE });
}

function reader(low: number, { series, terms }: Fitted): (cosTheta: number, out: Float64Array) => void {
  const middle = (1 + low) / 2;
  const half = 1 - middle;
  return (cosTheta, out) => chebyshevFour(series, terms, half === 0 ? 0 : (cosTheta - middle) / half, out);
}
