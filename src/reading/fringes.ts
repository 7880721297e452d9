import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { beamRadius } from '../optics/gaussianBeam.ts';
import { beamFringes, beamPath, farthestPlace, shadowScale } from './beamPath.ts';

/** What sets how densely outlines and places are sampled, in a flat wave or a focused beam. */
export interface Fringes {
  /** Fringes about the particle's shadow go as κρ², 1/m²: κ = k/2d in a flat wave. */
  kappa: number;
  /** How far the shadow, or what else a place changes, moves over the place itself: 1 in a flat wave. */
  magnification: number;
  /** How fast the light itself changes with the particle's place, 1/m: 0 in a flat wave. */
  fallPerM: number;
}

/**
 * @param beam none for a flat wave
 * @param wavenumber k in the medium, 1/m
 * @param distanceM from the particle's nominal place to the detector plane, metres
 * @param placeM z of the particle from there, metres
 */
export function fringesAt(
  beam: GaussianBeam | undefined,
  wavenumber: number,
  distanceM: number,
  placeM: number,
): Fringes {
  if (beam === undefined) {
    return { kappa: wavenumber / (2 * (distanceM - placeM)), magnification: 1, fallPerM: 0 };
  }
  const fringes = beamFringes(beamPath(beam, wavenumber, placeM, distanceM - placeM, 0));
  return { ...fringes, fallPerM: 2 / beamRadius(beam, wavenumber, placeM) };
}

/**
 * How far from the axis the shadow of a particle may fall, metres: as far off as the particle itself in a flat wave.
 *
 * @param offsetM largest distance of the particle from the axis
 */
export function shadowOffset(
  beam: GaussianBeam | undefined,
  wavenumber: number,
  distanceM: number,
  placeM: number,
  spreadM: number,
  offsetM: number,
): number {
  if (beam === undefined) return offsetM;
  const path = beamPath(beam, wavenumber, placeM, distanceM - placeM, spreadM);
  return Math.abs(shadowScale(path)) * Math.min(offsetM, farthestPlace(path));
}
