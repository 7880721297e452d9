import { inputError } from '../base/errors.ts';
import { presetsFolder } from '../base/presetsFolder.ts';
import type { Sphere } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import { loadIndexModel } from '../optics/shelf.ts';
import type { Task } from '../score/task.ts';
import { checkSpheres } from './response.ts';

/** Every sphere of one kind, whatever its diameter. */
export type SphereKind = Omit<Sphere, 'diameterM' | 'population' | 'range'>;

/**
 * A material on the shelf, or without its name what the brief's first spheres are made of (core and shell where they have both).
 *
 * @returns null where neither is there: a brief with tables of amplitudes alone
 * @throws RimwrightError `input` for an unknown material
 */
export function sphereKind({ particles }: Task, material: string | undefined): SphereKind | null {
  if (material !== undefined) {
    return { material, index: loadIndexModel('materials', material, presetsFolder()) };
  }
  const first = particles.find((particle) => !isTabled(particle));
  if (first === undefined || isTabled(first)) return null;
  const { index, core, material: name } = first;
  return { material: name, index, ...(core && { core }) };
}

/**
 * A sphere of one diameter; null where none was asked for.
 *
 * @throws RimwrightError `input` where it cannot be computed in the brief's light and medium
 */
export function sphereLike(
  task: Task,
  diameterM: number | null,
  material: string | undefined,
): Sphere | null {
  if (diameterM === null && material === undefined) return null;
  if (diameterM === null) {
    throw inputError([{ key: '--material', found: material ?? '', expected: '--diameter beside it' }]);
  }
  const kind = sphereKind(task, material);
  if (kind === null) {
    const found = 'particles that are tables of amplitudes';
    throw inputError([{ key: '--diameter', found, expected: '--material beside it' }]);
  }
  checkSpheres(task, { ...kind, fromM: diameterM, toM: diameterM }, '--diameter', '--diameter');
  return { ...kind, diameterM };
}
