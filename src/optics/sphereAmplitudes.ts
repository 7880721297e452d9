import { chebyshevFit, chebyshevFour, chebyshevPairs, settledFit } from '../numeric/chebyshev.ts';
import type { IndexModel } from './indexModel.ts';
import { refractiveIndex } from './indexModel.ts';
import { layeredSphere } from './layeredSphere.ts';
import { forwardAmplitude, scatteringAmplitudes } from './mieAmplitudes.ts';
import type { MieCoefficients } from './mieCoefficients.ts';
import { mieCoefficients } from './mieCoefficients.ts';
import type { Sphere } from './particle.ts';

/** How one sphere scatters light of one colour into a forward cone. */
export interface SphereAmplitudes {
  /** Wave number in the medium, 1/m. */
  wavenumber: number;
  /** Size parameter, wave number times radius. */
  sizeParameter: number;
  /** The sphere's own index, or its shell's, relative to vacuum. */
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
  /** What the amplitudes follow from, where they were computed here. */
  coefficients?: MieCoefficients;
}

/**
 * Solves one sphere, with a core or without, at one wavelength and tables its amplitudes over a forward cone.
 *
 * @param vacuumWavelengthM metres
 * @param halfAngle of the cone, radians, above 0 and below π/2
 */
export function sphereAmplitudes(
  sphere: Sphere,
  medium: IndexModel,
  vacuumWavelengthM: number,
  halfAngle: number,
): SphereAmplitudes {
  const coefficients = sphereCoefficients(sphere, medium, vacuumWavelengthM);
  return coefficientAmplitudes(coefficients, sphere, medium, vacuumWavelengthM, halfAngle);
}

/** Mie's coefficients of a sphere, with a core or without, at one wavelength in vacuum, metres. */
export function sphereCoefficients(
  { diameterM, index, core }: Sphere,
  medium: IndexModel,
  vacuumWavelengthM: number,
): MieCoefficients {
  const mediumIndex = refractiveIndex(medium, vacuumWavelengthM)[0];
  const sizeParameter = (((2 * Math.PI * mediumIndex) / vacuumWavelengthM) * diameterM) / 2;
  const relative = (model: IndexModel) => {
    const [n, k] = refractiveIndex(model, vacuumWavelengthM);
    return [n / mediumIndex, k / mediumIndex] as const;
  };
  const outer = { x: sizeParameter, m: relative(index) };
  return core === undefined
    ? mieCoefficients(outer.x, outer.m)
    : layeredSphere([{ x: core.share * sizeParameter, m: relative(core.index) }, outer]);
}

/** Tables over a forward cone of what follows from coefficients: a sphere's own, or their mean over colours near this one. */
export function coefficientAmplitudes(
  coefficients: MieCoefficients,
  sphere: Sphere,
  medium: IndexModel,
  vacuumWavelengthM: number,
  halfAngle: number,
): SphereAmplitudes {
  const wavenumber = (2 * Math.PI * refractiveIndex(medium, vacuumWavelengthM)[0]) / vacuumWavelengthM;
  const forward = forwardAmplitude(coefficients);
  const cosLimit = Math.cos(halfAngle);
  const sample = (cosTheta: number, out: Float64Array) =>
    scatteringAmplitudes(coefficients, cosTheta, out, 0);
  const { series, terms } = fitAmplitudes(sample, cosLimit, coefficients);
  return {
    wavenumber,
    sizeParameter: (wavenumber * sphere.diameterM) / 2,
    index: refractiveIndex(sphere.index, vacuumWavelengthM),
    forward,
    extinctionM2: (4 * Math.PI * forward[0]) / (wavenumber * wavenumber),
    cosLimit,
    series,
    terms,
    coefficients,
  };
}

/**
 * Amplitudes that scatter as much as a variance of amplitudes does. They extinguish nothing, and keep in step with nothing.
 *
 * @param variance writes |S1|² and |S2|² at cosθ, smooth functions of it
 * @param like what else they are given: wave number, cone, size
 */
export function incoherentAmplitudes(
  variance: (cosTheta: number, out: [s1: number, s2: number]) => void,
  like: SphereAmplitudes,
): SphereAmplitudes {
  const { coefficients: _, ...plain } = like;
  const out: [number, number] = [0, 0];
  const sample = (cosTheta: number, amplitudes: Float64Array) => {
    variance(cosTheta, out);
    amplitudes.set([Math.sqrt(Math.max(0, out[0])), 0, Math.sqrt(Math.max(0, out[1])), 0]);
  };
  // It is a small part of the scattered flux: a root need not be followed to the last digit.
  const terms = Math.ceil(like.sizeParameter * Math.sqrt(1 - like.cosLimit)) + 8;
  const series = chebyshevFit(sample, 4, like.cosLimit, 1, terms);
  return { ...plain, extinctionM2: 0, series, terms };
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

/**
 * Chebyshev series in cosθ over [low, 1] of four amplitudes, as long as it takes for the last terms to carry nothing.
 *
 * @param sample writes S1re, S1im, S2re, S2im at cosθ
 */
export function fitAmplitudes(
  sample: (cosTheta: number, out: Float64Array) => void,
  low: number,
  { order, x }: MieCoefficients,
): { series: Float64Array; terms: number } {
  // Amplitudes are polynomials in cosθ of degree `order` at most; near fields double that.
  const most = 2 * order + 3;
  // They vary as e^{±ixθ} over the cone, and a rounded cosθ shows in them as 1e-17 x².
  const swing = x * Math.sqrt(1 - low);
  const tolerance = 1e-13 + 3e-17 * x * x;
  const first = Math.ceil(swing + 8 * Math.cbrt(swing) + 14);
  return settledFit(sample, low, 1, { first, most, tolerance });
}
