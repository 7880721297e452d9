import { refractiveIndex } from '../optics/indexModel.ts';
import { lobeRatio } from './cost.ts';
import type { Task } from './task.ts';

/** Largest radius that an outline may have at a distance, metres: the brief's own, or what its lobe limit leaves of it. */
export function radiusWithinLobe(
  { light, medium, particles, detector, target }: Task,
  distanceM: number,
): number {
  const most = detector.radiusM[1];
  if (target.lobe === null) return most;
  const wavelengthM = light.wavelengthM / refractiveIndex(medium, light.wavelengthM)[0];
  const diameterM = Math.max(...particles.map((particle) => particle.diameterM));
  // The ratio goes with the half-angle: what a small radius has of it tells what the limit allows.
  const perRadian = lobeRatio(distanceM, distanceM, wavelengthM, diameterM) / (Math.PI / 4);
  return Math.min(most, distanceM * Math.tan(Math.min(target.lobe / perRadian, 1.57)));
}
