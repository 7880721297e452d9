import type { Particle } from '../optics/particle.ts';
import type { Task } from './task.ts';

/** Particles that differ by their diameter alone, which may be any from the least to the largest. */
export interface Kind {
  /** Its number among a task's kinds. */
  id: number;
  particle: Particle;
  leastM: number;
  largestM: number;
  /** Those of the brief, metres. */
  diametersM: readonly number[];
}

/** One particle in one light at one place along the beam: all that a reading hangs on but the particle's place across it. */
export interface Condition {
  kind: Kind;
  diameterM: number;
  /** Of the main line, vacuum, metres. */
  wavelengthM: number;
  /** From the nominal place towards the detector, metres. */
  depthM: number;
}

/** The kinds of a task's particles. Neighbours of one range that a caller made without naming it stand alone. */
export function kindsOf({ particles }: Pick<Task, 'particles'>): Kind[] {
  const kinds = new Map<number | Particle, Kind>();
  for (const particle of particles) {
    const { diameterM, range } = particle;
    const held = kinds.get(range?.of ?? particle);
    if (held) {
      kinds.set(range?.of ?? particle, { ...held, diametersM: [...held.diametersM, diameterM] });
    } else {
      const { leastM, largestM } = range ?? { leastM: diameterM, largestM: diameterM };
      kinds.set(range?.of ?? particle, {
        id: kinds.size,
        particle,
        leastM,
        largestM,
        diametersM: [diameterM],
      });
    }
  }
  return [...kinds.values()];
}

/** The kind's particle of another diameter; a core keeps its share, and no distribution counts it. */
export function particleOf({ kind, diameterM }: Pick<Condition, 'kind' | 'diameterM'>): Particle {
  const { population: _, ...particle } = kind.particle;
  return { ...particle, diameterM };
}
