import type { Particle, Sphere, TabledParticle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import type { Task } from '../score/task.ts';
import type { Brief } from './brief.ts';

/** A brief as results hold it: of tables of amplitudes, which may be long, their extent alone. */
export type BriefJson = Omit<Brief, 'task' | 'uncertainties' | 'uncertaintyDefaults'> & {
  task: Omit<Task, 'particles'> & { particles: ParticleJson[] };
};

type ParticleJson =
  | Sphere
  | (Pick<TabledParticle, 'diameterM' | 'material'> & {
      amplitudes: { rows: number; largestAngle_rad: number };
    });

/** The brief of a search, which knows nothing of the built instrument's uncertainties. */
export function briefToJson({ uncertainties, uncertaintyDefaults, ...brief }: Brief): BriefJson {
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
