import type { Particle } from '../optics/particle.ts';
import { kindsOf, particleOf } from './conditions.ts';
import type { Task } from './task.ts';
import { tellingDiameters } from './tellingDiameters.ts';

/**
 * A task with two more particles for every range of diameters: those that turn the light's phase most and least, beyond the
 * range's own samples. A search that knows only a few diameters of a range finds outlines that suit just these, and read
 * between them up to twice as far off.
 */
export function guardedTask(task: Task): Task {
  const guards = kindsOf(task).flatMap((kind): Particle[] => {
    const telling = tellingDiameters(kind, task.medium, task.light).sort((p, q) => p.turn - q.turn);
    const ends = [...new Set([telling.at(0), telling.at(-1)])];
    return ends.flatMap((end) => (end ? [particleOf({ kind, diameterM: end.diameterM })] : []));
  });
  return { ...task, particles: [...task.particles, ...guards] };
}
