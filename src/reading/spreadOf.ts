import { diffusionCoefficient, diffusionSpread } from '../optics/diffusion.ts';
import type { Placement } from './placement.ts';

/**
 * Rms random motion per transverse axis of one particle during one measurement, metres: about the place where the
 * measurement starts, for a brief's positions say where a particle may be found (see `diffusionSpread`).
 *
 * @param diameterM of the particle, 1 nm to 1 cm where it diffuses
 * @throws RimwrightError `input` outside the ranges of `diffusionCoefficient`
 */
export function spreadOf({ spreadM, diffusion }: Placement, diameterM: number): number {
  if (diffusion === undefined) return spreadM;
  const { durationS, temperatureK, medium } = diffusion;
  return diffusionSpread(diffusionCoefficient(diameterM, temperatureK, medium), durationS);
}
