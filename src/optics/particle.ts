import type { IndexModel } from './indexModel.ts';

/** A homogeneous sphere of the brief. */
export interface Particle {
  /** Diameter, metres. */
  diameterM: number;
  /** Its own index, relative to vacuum. */
  index: IndexModel;
  /** How tables call its material: a shelf name, or the index as written. */
  material: string;
}
