import type { Electronics } from './noisePower.ts';
import { noiseOf, noisePower } from './noisePower.ts';

/** Angle of the first dark ring of diffraction at a disc, over λ/d: the first zero of J₁(x)/x over π, rounded as is common practice. */
const FIRST_DARK_RING = 1.22;

/** One detector element as the electronics see it. */
export interface ElementArea {
  weight: number;
  areaM2: number;
}

/**
 * Lobe ratio: the outline's largest half-angle over the angle of the first dark ring, 1.22 λ/d.
 * Common practice, no source: at or below 1/10, where little forward-scattered light enters the detector.
 *
 * @param wavelengthM in the medium
 * @param diameterM of the largest particle
 */
export function lobeRatio(
  radiusM: number,
  distanceM: number,
  wavelengthM: number,
  diameterM: number,
): number {
  return Math.atan(radiusM / distanceM) / ((FIRST_DARK_RING * wavelengthM) / diameterM);
}

/** Required signal-to-noise ratio Σ|w|A/(ε g C): detector area over (target correction · gain · extinction). */
export function requiredSnr(
  elements: readonly ElementArea[],
  targetCorrection: number,
  gain: number,
  extinctionM2: number,
): number {
  return weightedArea(elements) / (targetCorrection * gain * extinctionM2);
}

/**
 * Time for one measurement of two readings (with and without the particle) whose noise is the target correction:
 * τ = N/(ε s)², N the noise of the weighted currents (see `noisePower`), i = ℛ·irradiance·A, s = ℛ·irradiance·g·C.
 * Each reading's bandwidth is 1/(2τ); their difference doubles the variance.
 *
 * @returns seconds
 */
export function measurementTime(
  elements: readonly ElementArea[],
  targetCorrection: number,
  gain: number,
  extinctionM2: number,
  electronics: Electronics,
): number {
  const perArea = electronics.responsivityAW * electronics.irradianceWm2;
  const signal = targetCorrection * perArea * gain * extinctionM2;
  return currentNoise(elements, electronics) / (signal * signal);
}

/** Noise of the weighted current, A²/Hz (one-sided): see `noisePower`. */
export function currentNoise(elements: readonly ElementArea[], electronics: Electronics): number {
  const areas = elements.map(({ areaM2 }) => areaM2);
  const weights = elements.map(({ weight }) => weight);
  return noisePower(noiseOf(areas, electronics), weights);
}

/** (area / gain) over λ z, with λ in the medium: see the design floor in DEVELOPERS.md. */
export function areaOverFloor(
  elements: readonly ElementArea[],
  gain: number,
  wavelengthM: number,
  distanceM: number,
): number {
  return weightedArea(elements) / (gain * wavelengthM * distanceM);
}

/** Σ |w| A, m². */
function weightedArea(elements: readonly ElementArea[]): number {
  return elements.reduce((sum, { weight, areaM2 }) => sum + Math.abs(weight) * areaM2, 0);
}
