import type { MostPlaces } from '../reading/positions.ts';

/** How finely a design is judged. */
export interface Fineness {
  /** Phase between neighbouring positions, radians (see `samplePositions`). */
  spacing: number;
  /** Wavelengths over the drift, and places over the depth. */
  drifts: number;
  depths: number;
  /** Most places for the particle, where an offset is so large that the spacing would ask for more. */
  most: MostPlaces;
  /** Boundary nodes per radian of phase. */
  perRadian: number;
  /** Places of a flight's grid beyond its phase, over the cube root of it (see `FlightGrid`). */
  tail: number;
  /** Whether directions of a source are taken for places (see `Scenario`). */
  tiltsAsPlaces: boolean;
}

/** For every candidate of a search. */
export const SEARCH_FINENESS: Fineness = {
  spacing: 0.5,
  drifts: 3,
  depths: 3,
  most: { circles: 12, steps: 24 },
  perRadian: 0.45,
  tail: 3,
  tiltsAsPlaces: true,
};

/** For what is reported: ten times denser in position, and finer in the rest. */
export const REPORT_FINENESS: Fineness = {
  spacing: 0.16,
  drifts: 5,
  depths: 5,
  most: { circles: 160, steps: 1200 },
  perRadian: 0.9,
  tail: 4.7,
  tiltsAsPlaces: false,
};
