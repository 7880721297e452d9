import type { IndexModel } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import type { Task } from './task.ts';
import { tellingDiameters } from './tellingDiameters.ts';

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

/** Step in size parameter of the diameters that a range is looked at with beside its telling ones. */
const SIZE_STEP = 0.5;

/** Most diameters of one range that are looked at for each of the two. */
const MOST_DIAMETERS = 100;

/** Most conditions between the ends of all ranges. */
const MOST_BETWEEN = 240;

/** Conditions that a search for the worst begins with. */
export interface FirstConditions {
  /**
   * Single diameters and both ends of a range at every wavelength of −drift, 0, +drift and every depth of −depth, 0, +depth;
   * the brief's other diameters as they are meant.
   */
  given: Condition[];
  /** Telling and evenly spaced diameters of ranges, each at the ends of drift and depth, or where those are many at one of them in turn. */
  between: Condition[];
}

export function firstConditions(task: Task, kinds: readonly Kind[]): FirstConditions {
  const { light, medium, placement } = task;
  const lightsOf = (wavelengths: readonly number[], depths: readonly number[]) =>
    wavelengths.flatMap((wavelengthM) => depths.map((depthM) => ({ wavelengthM, depthM })));
  const nominal = lightsOf([light.wavelengthM], [0]);
  const ends = lightsOf(endsOf(light.wavelengthM, light.driftM), endsOf(0, placement.depthM));
  const all = lightsOf(
    [...new Set([light.wavelengthM, ...endsOf(light.wavelengthM, light.driftM)])],
    [...new Set([0, ...endsOf(0, placement.depthM)])],
  );
  const given = kinds.flatMap((kind) =>
    kind.diametersM.flatMap((diameterM) => {
      const isEnd = diameterM === kind.leastM || diameterM === kind.largestM;
      return (isEnd ? all : nominal).map((one) => ({ kind, diameterM, ...one }));
    }),
  );
  const inside = kinds.flatMap((kind) =>
    diametersInside(kind, medium, light).map((diameterM) => ({ kind, diameterM })),
  );
  const isFew = inside.length * ends.length <= MOST_BETWEEN;
  const between = inside.flatMap((one, i) =>
    (isFew ? ends : [ends[i % ends.length]]).map((where) => ({ ...one, ...where })),
  );
  return { given, between };
}

function endsOf(middle: number, reach: number): number[] {
  return reach === 0 ? [middle] : [middle - reach, middle + reach];
}

/** Of more telling diameters than can be looked at, those with the extremes of turn. */
function diametersInside(kind: Kind, medium: IndexModel, light: Light): number[] {
  const { leastM, largestM } = kind;
  const telling = tellingDiameters(kind, medium, light).sort((p, q) => p.turn - q.turn);
  const half = MOST_DIAMETERS / 2;
  const kept = telling.filter((_, i) => i < half || i >= telling.length - half);
  const steps = Math.ceil((Math.PI * (largestM - leastM)) / (SIZE_STEP * light.wavelengthM));
  const count = Math.min(MOST_DIAMETERS, steps);
  const even = Array.from(
    { length: Math.max(0, count - 1) },
    (_, i) => leastM + ((largestM - leastM) * (i + 1)) / count,
  );
  return [...kept.map(({ diameterM }) => diameterM), ...even].sort((p, q) => p - q);
}
