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

/** Step in size parameter of the diameters that a range is looked at with: a fifth of a ripple of clear spheres, or less. */
const SIZE_STEP = 0.1;

/** Most diameters of all ranges together; beyond, the steps grow. */
const MOST_DIAMETERS = 240;

/** Conditions that a search for the worst begins with. */
export interface FirstConditions {
  /** Single diameters and both ends of a range at every wavelength of −drift, 0, +drift and every depth of −depth, 0, +depth; the brief's other diameters as they are meant. */
  given: Condition[];
  /** Between the ends of ranges; wavelengths and depths take turns. */
  between: Condition[];
}

export function firstConditions(task: Task, kinds: readonly Kind[]): FirstConditions {
  const { light, placement } = task;
  const around = (middle: number, reach: number) =>
    reach === 0 ? [middle] : [middle - reach, middle, middle + reach];
  const lights = around(light.wavelengthM, light.driftM).flatMap((wavelengthM) =>
    around(0, placement.depthM).map((depthM) => ({ wavelengthM, depthM })),
  );
  const nominal = [{ wavelengthM: light.wavelengthM, depthM: 0 }];
  const given = kinds.flatMap((kind) =>
    kind.diametersM.flatMap((diameterM) => {
      const isEnd = diameterM === kind.leastM || diameterM === kind.largestM;
      return (isEnd ? lights : nominal).map((one) => ({ kind, diameterM, ...one }));
    }),
  );
  const stepM = (SIZE_STEP * light.wavelengthM) / Math.PI;
  const wanted = kinds.reduce((sum, { leastM, largestM }) => sum + (largestM - leastM) / stepM, 0);
  const growth = Math.max(1, wanted / MOST_DIAMETERS);
  const between = kinds.flatMap((kind) => {
    const count = Math.ceil((kind.largestM - kind.leastM) / (stepM * growth));
    return Array.from({ length: Math.max(0, count - 1) }, (_, i) => ({
      kind,
      diameterM: kind.leastM + ((kind.largestM - kind.leastM) * (i + 1)) / count,
      ...lights[i % lights.length],
    }));
  });
  return { given, between };
}
