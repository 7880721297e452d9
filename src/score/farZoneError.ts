import { refractiveIndex } from '../optics/indexModel.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Task } from './task.ts';

/** Share of the target correction beyond which a search is led by the exact fields. */
const LEADING = 0.25;

/**
 * About how far the far-zone form errs, over the extinction: half of the phase k(d/2)²/(2z) that it leaves out for the
 * largest particle. (For spheres of 4 to 50 µm at 5 to 60 mm, centred discs err by 0.34 to 0.51 of that phase at most.)
 *
 * @param distanceM of the detector, metres; the depth of the placement brings the particle nearer
 */
export function farZoneError({ light, medium, particles, placement }: Task, distanceM: number): number {
  const diameterM = Math.max(...particles.map((particle) => particle.diameterM));
  const index = refractiveIndex(medium, light.wavelengthM)[0];
  const wavenumber = (2 * Math.PI * index) / light.wavelengthM;
  return (wavenumber * (diameterM / 2) ** 2) / (4 * (distanceM - placement.depthM));
}

/** The fields that a search is led by: the far zone's where they serve, since they do not change with the distance. */
export function leadingFields(task: Task): Fields {
  return farZoneError(task, task.detector.distanceM[0]) > LEADING * task.target.correction ? 'exact' : 'far';
}
