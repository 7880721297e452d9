import type { AmplitudeTable } from './amplitudeTable.ts';
import type { IndexModel } from './indexModel.ts';

/** A particle of the brief: a sphere to be solved, or one whose amplitudes were computed elsewhere. */
export type Particle = Sphere | TabledParticle;

/** A sphere of one material, or a core with a shell around it. */
export interface Sphere {
  /** Outer diameter, metres. */
  diameterM: number;
  /** Index relative to vacuum: the sphere's own, or its shell's where it has a core. */
  index: IndexModel;
  /** How tables call its material: a shelf name, the index as written, or both of core and shell. */
  material: string;
  core?: Core;
  population?: Membership;
  range?: DiameterRange;
}

/** The inside of a layered sphere. */
export interface Core {
  /** Its diameter over the outer one, between 0 and 1. */
  share: number;
  /** Relative to vacuum. */
  index: IndexModel;
}

/** A particle as one of the diameters that stand for a distribution of sizes. */
export interface Membership {
  /** Which distribution of the brief, from 0. */
  of: number;
  /** Share of the distribution's particles that this diameter stands for; they add up to 1. */
  share: number;
}

/** The diameters that an entry of the brief means, of which a sphere is one. */
export interface DiameterRange {
  /** Which entry, from 0. */
  of: number;
  /** Metres. */
  leastM: number;
  largestM: number;
}

/** A particle of any kind that scatters alike at all azimuths. */
export interface TabledParticle {
  /** Of the sphere that it is as large as, metres: for the lobe ratio and for what the far zone leaves out. */
  diameterM: number;
  /** The table's name, for tables and messages. */
  material: string;
  amplitudes: AmplitudeTable;
  index?: never;
  core?: never;
  population?: never;
  range?: never;
}

export function isTabled(particle: Particle): particle is TabledParticle {
  return 'amplitudes' in particle;
}
