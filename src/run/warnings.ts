import { formatQuantity } from '../base/quantity.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import { isTabled } from '../optics/particle.ts';
import { spreadOf } from '../reading/spreadOf.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Design } from '../score/design.ts';
import { farZoneError } from '../score/farZoneError.ts';
import type { Task } from '../score/task.ts';

/** Share of the target correction from which the far-zone form's own error is worth a word. */
const WORTH_SAYING = 0.1;

/** An outline as far as warnings are concerned, metres. */
interface Outline {
  radiusM: number;
  distanceM: number;
}

/**
 * All that there is to say about reading outlines against a brief: the same for every command that reads some.
 *
 * @param wanted fields that were asked for
 */
export function readingWarnings(task: Task, wanted: Fields, outlines: readonly Outline[]): string[] {
  // Tables of amplitudes stay in the far zone whatever is asked for.
  const far = wanted === 'far' ? task : { ...task, particles: task.particles.filter(isTabled) };
  return present([
    tabledFieldsWarning(task, wanted),
    ...outlines.flatMap(({ distanceM }) => [
      far.particles.length === 0 ? null : farZoneWarning(far, distanceM),
      distanceWarning(task, distanceM),
    ]),
    diffusionWarning(task, outlines),
  ]);
}

/**
 * What the far-zone form leaves out at a distance (see `farZoneError`).
 *
 * @returns a warning where that exceeds a tenth of the target correction, else null
 */
export function farZoneWarning(task: Task, distanceM: number): string | null {
  const error = farZoneError(task, distanceM);
  if (error <= WORTH_SAYING * task.target.correction) return null;
  const largest = task.particles.reduce((most, one) => (one.diameterM > most.diameterM ? one : most));
  const particle = `particles of ${formatQuantity(largest.diameterM, 'length', 3)} at ${formatQuantity(distanceM, 'length', 3)}`;
  const about = formatQuantity(error, 'ratio', 2);
  const allowed = formatQuantity(task.target.correction, 'ratio', 3);
  const tells = !isTabled(largest) ? ': --exact tells' : '';
  return `The far-zone form may be off by about ${about} of the extinction for ${particle}, and the target allows ${allowed}${tells}`;
}

/**
 * How far the far zone's fields and the exact ones are apart for designs that were judged by both.
 *
 * @returns a warning where that exceeds a tenth of the target correction for any of them, else null
 */
export function fieldsWarning(task: Task, designs: readonly Design[]): string | null {
  const difference = Math.max(0, ...designs.map(({ otherFields }) => otherFields?.difference ?? 0));
  if (difference <= WORTH_SAYING * task.target.correction) return null;
  const leading =
    designs[0].fields === 'far'
      ? 'the far zone, and the exact ones meet the target where it is said to be met'
      : 'the exact solution';
  return `Far-zone and exact fields differ by up to ${formatQuantity(difference, 'ratio', 2)} of the extinction for these designs. Scores are of ${leading}`;
}

/** Where exact fields are wanted of particles that are known by their far-zone amplitudes alone. */
function tabledFieldsWarning({ particles }: Task, wanted: Fields): string | null {
  const tabled = particles.filter(isTabled).map(({ material }) => material);
  if (wanted === 'far' || tabled.length === 0) return null;
  return `Exact fields are not known of particles given by amplitudes, ${[...new Set(tabled)].join(', ')}: theirs are the far zone's`;
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

/** Phase 2κρσ up to which a normal spread stands for Brownian motion to 1 % (see `diffusionSpread`). */
const LARGEST_DIFFUSION_PHASE = 0.7;

/**
 * Where particles diffuse so far that a normal spread overstates how much that damps a rim's interference.
 *
 * @param outlines the radius and distance of each outline in question, metres
 */
export function diffusionWarning(
  { placement, particles, light, medium }: Task,
  outlines: readonly Outline[],
): string | null {
  if (placement.diffusion === undefined || outlines.length === 0) return null;
  const diameterM = Math.min(...particles.map((particle) => particle.diameterM));
  const index = refractiveIndex(medium, light.wavelengthM)[0];
  const steepest = Math.max(...outlines.map(({ radiusM, distanceM }) => radiusM / distanceM));
  const phase = ((2 * Math.PI * index) / light.wavelengthM) * steepest * spreadOf(placement, diameterM);
  if (phase <= LARGEST_DIFFUSION_PHASE) return null;
  const particle = `particles of ${formatQuantity(diameterM, 'length', 3)}`;
  return `Diffusion moves ${particle} by ${formatQuantity(phase, 'angle', 2)} of phase at the outline's radius: beyond ${formatQuantity(LARGEST_DIFFUSION_PHASE, 'angle', 2)} a normal spread says that it damps more than it does`;
}

/** What `diffusionWarning` asks of a design. */
export function outlineOf({ scores, distanceM }: Design): Outline {
  return { radiusM: scores.radius_m, distanceM };
}

/** The warnings that are there. */
export function present(warnings: readonly (string | null)[]): string[] {
  return [...new Set(warnings.filter((warning) => warning !== null))];
}
