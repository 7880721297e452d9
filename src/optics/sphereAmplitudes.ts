import { RimwrightError } from '../base/errors.ts';
import { chebyshevFit, chebyshevFour, chebyshevPairs } from '../numeric/chebyshev.ts';
import type { IndexModel } from './indexModel.ts';
import { refractiveIndex } from './indexModel.ts';
import { forwardAmplitude, scatteringAmplitudes } from './mieAmplitudes.ts';
import { mieCoefficients } from './mieCoefficients.ts';
import type { Particle } from './particle.ts';

/** How one sphere scatters light of one colour into a forward cone. */
export interface SphereAmplitudes {
  /** Wave number in the medium, 1/m. */
  wavenumber: number;
  /** Size parameter, wave number times radius. */
  sizeParameter: number;
  /** The sphere's own index, relative to vacuum. */
  index: readonly [n: number, k: number];
  /** S(0), Bohren & Huffman's convention. */
  forward: readonly [re: number, im: number];
  /** Extinction cross-section 4π Re S(0)/k², m². */
  extinctionM2: number;
  /** Least cosθ that `series` covers. */
  cosLimit: number;
  /** Chebyshev series in cosθ over [cosLimit, 1] of S1re, S1im, S2re, S2im. */
  series: Float64Array;
  terms: number;
}

/**
 * Solves one sphere at one wavelength and tables its amplitudes over a forward cone.
 *
 * @param vacuumWavelengthM metres
 * @param halfAngle of the cone, radians, above 0 and below π/2
 */
export function sphereAmplitudes(
  particle: Particle,
  medium: IndexModel,
  vacuumWavelengthM: number,
  halfAngle: number,
): SphereAmplitudes {
  const index = refractiveIndex(particle.index, vacuumWavelengthM);
  const mediumIndex = refractiveIndex(medium, vacuumWavelengthM)[0];
  const wavenumber = (2 * Math.PI * mediumIndex) / vacuumWavelengthM;
  const sizeParameter = (wavenumber * particle.diameterM) / 2;
  const coefficients = mieCoefficients(sizeParameter, [index[0] / mediumIndex, index[1] / mediumIndex]);
  const forward = forwardAmplitude(coefficients);
  const cosLimit = Math.cos(halfAngle);
  const sample = (cosTheta: number, out: Float64Array) =>
    scatteringAmplitudes(coefficients, cosTheta, out, 0);
  const { series, terms } = fitSeries(sample, cosLimit, coefficients.order + 1);
  return {
    wavenumber,
    sizeParameter,
    index,
    forward,
    extinctionM2: (4 * Math.PI * forward[0]) / (wavenumber * wavenumber),
    cosLimit,
    series,
    terms,
  };
}

/** S1re, S1im, S2re, S2im at cosθ in [cosLimit, 1]. */
export function amplitudesAt(sphere: SphereAmplitudes, cosTheta: number, out: Float64Array): void {
  const middle = (1 + sphere.cosLimit) / 2;
  chebyshevFour(sphere.series, sphere.terms, (cosTheta - middle) / (1 - middle), out);
}

/** S1 and S2 as re, im, re, im, continued to a complex cosθ near [cosLimit, 1]. */
export function amplitudesBeside(
  sphere: SphereAmplitudes,
  cosRe: number,
  cosIm: number,
  out: Float64Array,
): void {
  const middle = (1 + sphere.cosLimit) / 2;
  const half = 1 - middle;
  chebyshevPairs(sphere.series, sphere.terms, (cosRe - middle) / half, cosIm / half, out);
}

/** Doubles the number of terms until the last ones carry nothing; the amplitudes are polynomials in cosθ of degree `most` − 1. */
function fitSeries(sample: (x: number, out: Float64Array) => void, low: number, most: number) {
  for (let count = Math.min(16, most); ; count = Math.min(2 * count, most)) {
    const series = chebyshevFit(sample, 4, low, 1, count);
    const terms = usefulTerms(series, count);
    if (terms < count || count === most) return { series: series.slice(0, terms * 4), terms };
    if (count > 40_000) throw new RimwrightError('machine', 'the amplitudes of a sphere did not settle');
  }
}

/** Number of terms before all further ones fall below 1e-13 of the largest. */
function usefulTerms(series: Float64Array, count: number): number {
  let largest = 0;
  for (const value of series) largest = Math.max(largest, Math.abs(value));
  let terms = count;
  while (terms > 1) {
    const last = series.subarray((terms - 1) * 4, terms * 4);
    if (last.some((value) => Math.abs(value) > 1e-13 * largest)) break;
    terms--;
  }
  // Two spare terms show that the tail has really been reached.
  return Math.min(count, terms + 2);
}
