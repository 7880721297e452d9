import { formatQuantity } from '../base/quantity.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Task } from '../score/task.ts';

/** Share of the target correction from which the far-zone form's own error is worth a word. */
const WORTH_SAYING = 0.1;

/**
 * What the far-zone form leaves out: its phase errs by about k(d/2)²/(2z), and readings by about as much of the extinction.
 *
 * @param distancesM distances of the designs in question
 * @returns a warning where that exceeds a tenth of the target correction for any particle, else null
 */
export function farZoneWarning(task: Task, distancesM: readonly number[]): string | null {
  const { light, medium, particles, placement, target } = task;
  const distanceM = Math.min(...distancesM);
  const nearestM = distanceM - placement.depthM;
  const diameterM = Math.max(...particles.map((particle) => particle.diameterM));
  const index = refractiveIndex(medium, light.wavelengthM)[0];
  const wavenumber = (2 * Math.PI * index) / light.wavelengthM;
  const phase = (wavenumber * (diameterM / 2) ** 2) / (2 * nearestM);
  if (phase <= WORTH_SAYING * target.correction) return null;
  const particle = `particles of ${formatQuantity(diameterM, 'length', 3)} at ${formatQuantity(distanceM, 'length', 3)}`;
  const error = formatQuantity(phase, 'ratio', 2);
  const allowed = formatQuantity(target.correction, 'ratio', 3);
  return `The far-zone form may be off by about ${error} of the extinction for ${particle}, and the target allows ${allowed}`;
}

/** Where a distance in use lies outside of those that the brief allows. */
export function distanceWarning(task: Task, distanceM: number): string | null {
  const [least, most] = task.detector.distanceM;
  const slack = 1e-9;
  if (distanceM >= least * (1 - slack) && distanceM <= most * (1 + slack)) return null;
  const [low, high] = [least, most].map((distance) => formatQuantity(distance, 'length'));
  const range = low === high ? low : `${low} to ${high}`;
  return `The distance ${formatQuantity(distanceM, 'length')} is not the brief's ${range}`;
}

/** The warnings that are there. */
export function present(warnings: readonly (string | null)[]): string[] {
  return [...new Set(warnings.filter((warning) => warning !== null))];
}
