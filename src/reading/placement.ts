import type { DiffusionMedium } from '../optics/diffusion.ts';

/** Brownian motion: how long one measurement takes, and what the particles are in. */
interface Diffusion {
  durationS: number;
  temperatureK: number;
  medium: DiffusionMedium;
}

/** Where the particle may be, and how it moves during one measurement. */
export interface Placement {
  /** Anywhere within this distance of the axis, metres. */
  offsetM: number;
  /** And this far before or behind the nominal place along the beam, metres. */
  depthM: number;
  /** Rms random motion per transverse axis during one measurement, metres: that of all particles, unless `diffusion` says. */
  spreadM: number;
  /** In place of `spreadM`: each particle moves as far as its own diameter lets it (see `spreadOf`). */
  diffusion?: Diffusion;
  /** Straight flight across the beam during one measurement, or null. */
  crossing: { spanM: number; headingRad: number } | null;
}

/**
 * Farthest from the axis that readings are taken for a placement, metres: the corner of the rectangle around all flights, which
 * are read on a grid (see `FlightGrid`).
 */
export function farthestRead({ offsetM, crossing }: Placement): number {
  return crossing === null ? offsetM : Math.hypot(offsetM + crossing.spanM / 2, offsetM);
}
