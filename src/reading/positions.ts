import type { Placement } from './placement.ts';

/** The part of the offset disc that stands for all of it, by the outline's symmetry. */
export interface Symmetry {
  /** Repeats in a turn; Infinity for circles about the axis, 1 for none. */
  folds: number;
  /** Whether the x axis is a mirror line. */
  mirror: boolean;
}

/**
 * Most circles, and most places on one. So many spacings out a reading has swung through all it can; further ones would
 * only take time.
 */
const MOST_CIRCLES = 60;
const MOST_STEPS = 120;

/**
 * Places where the particle is tried: the axis, and circles out to the offset, each sampled over the outline's smallest
 * wedge, both ends included.
 *
 * A step of δ in position changes the phase at a rim of radius R by up to 2κRδ. Neighbours lie at most `spacing` radians
 * apart in that measure, so the worst place is missed by half of that at most, where the reading falls short of its
 * extreme by about (spacing/2)²/2 of the swing.
 *
 * @param phasePerMetre 2κR, rad/m
 * @param spacing radians; 0.5 in a search, 0.16 (ten times denser in area) for what is reported
 * @returns flat [x0, y0, x1, y1, …], metres
 */
export function samplePositions(
  offsetM: number,
  phasePerMetre: number,
  spacing: number,
  symmetry: Symmetry,
): Float64Array {
  const positions = [0, 0];
  if (offsetM > 0) {
    const reach = offsetM * phasePerMetre;
    const circles = Math.min(MOST_CIRCLES, Math.max(3, Math.ceil(reach / spacing)));
    const wedge = Number.isFinite(symmetry.folds)
      ? ((symmetry.mirror ? 1 : 2) * Math.PI) / symmetry.folds
      : 0;
    for (let i = 1; i <= circles; i++) {
      const radius = (offsetM * i) / circles;
      const arc = radius * phasePerMetre * wedge;
      // An n-fold outline makes an n-fold pattern, whatever the phase: three steps to half a period at the least.
      const least = symmetry.mirror ? 4 : 7;
      const steps = wedge === 0 ? 1 : Math.min(MOST_STEPS, Math.max(least, Math.ceil(arc / spacing) + 1));
      for (let j = 0; j < steps; j++) {
        const angle = steps === 1 ? 0 : (wedge * j) / (steps - 1);
        positions.push(radius * Math.cos(angle), radius * Math.sin(angle));
      }
    }
  }
  return Float64Array.from(positions);
}

/** Most points of one flight: phases beyond a thousand radians average to nothing anyway. */
const MOST_FLIGHT = 2000;

/**
 * Points of a straight flight, relative to its middle, at equal times: the mean of their readings is the flight's.
 * Without a crossing it is the one point where the particle stays.
 */
export function flightPoints(crossing: Placement['crossing'], phasePerMetre: number): Float64Array {
  if (crossing === null) return new Float64Array(2);
  const count = Math.min(MOST_FLIGHT, Math.ceil((crossing.spanM * phasePerMetre) / 0.5) + 8);
  const points = new Float64Array(2 * count);
  for (let i = 0; i < count; i++) {
    const along = crossing.spanM * ((i + 0.5) / count - 0.5);
    points[2 * i] = along * Math.cos(crossing.headingRad);
    points[2 * i + 1] = along * Math.sin(crossing.headingRad);
  }
  return points;
}
