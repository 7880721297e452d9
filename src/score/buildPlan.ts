import type { Particle } from '../optics/particle.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { Fineness } from './fineness.ts';
import type { Task } from './task.ts';
import type { Deviations } from './tolerances.ts';

/** What a build is judged on, as plain data that may be sent to a worker: every light at every depth and place. */
export interface BuildPlan {
  /** The brief's, with the distance of the design and the radius of its outline. */
  task: Task;
  elements: readonly OutlineElement[];
  distanceM: number;
  radiusM: number;
  fields: Fields;
  /** Particles in the light that they are read in: vacuum, metres. The first `calibrating` are what a bench calibrates with. */
  lights: readonly { particle: Particle; wavelengthM: number }[];
  calibrating: number;
  /** Places along the beam, metres. */
  depthsM: readonly number[];
  /** Places across it, flat, metres; the first is the axis. */
  places: Float64Array;
  /** The farthest that builds differ. */
  farthest: Deviations;
}

/** How finely builds are judged: twice as finely as a search's candidates, for the worst cases of the drawing come on top. */
export const BUILD_FINENESS: Fineness = {
  spacing: 0.3,
  drifts: 3,
  depths: 3,
  most: { circles: 24, steps: 60 },
  perRadian: 0.6,
  tail: 3,
  tiltsAsPlaces: true,
};

/** How many readings judge one build. */
export function readingCount({ lights, depthsM, places }: BuildPlan): number {
  return (lights.length * depthsM.length * places.length) / 2;
}
