import type { Tolerance } from '../score/tolerances.ts';

/** The tolerances of a brief: `shop` for what its shop keeps. */
export interface BriefTolerances {
  edge: Tolerance | 'shop';
  kerf: Tolerance | 'shop';
  place: Tolerance;
  distance: Tolerance;
  tilt: Tolerance;
  wavelength: Tolerance;
  index: Tolerance;
  size: Tolerance;
  /** How long one measurement is averaged, seconds; null for one without noise. */
  averagingS: number | null;
}
