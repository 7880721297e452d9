import type { Particle, Sphere, TabledParticle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import type { Task } from '../score/task.ts';
import type { Brief } from './brief.ts';

/** A brief as results hold it: of tables of amplitudes, which may be long, their extent alone. */
export type BriefJson = Omit<Brief, 'task'> & {
  task: Omit<Task, 'particles'> & { particles: ParticleJson[] };
};

type ParticleJson =
  | Sphere
  | (Pick<TabledParticle, 'diameterM' | 'material'> & {
      amplitudes: { rows: number; largestAngle_rad: number };
    });

export function briefToJson(brief: Brief): BriefJson {
  return { ...brief, task: { ...brief.task, particles: brief.task.particles.map(particleToJson) } };
}

function particleToJson(particle: Particle): ParticleJson {
  if (!isTabled(particle)) return particle;
  const { diameterM, material, amplitudes } = particle;
  const { angles } = amplitudes;
  return {
    diameterM,
    material,
    amplitudes: { rows: angles.length, largestAngle_rad: angles[angles.length - 1] },
  };
}
