import type { LegendreRules } from '../numeric/gaussLegendre.ts';
import type { Placement } from './placement.ts';

/** Most circles in the offset disc, and most places on one. */
export interface MostPlaces {
  circles: number;
  steps: number;
}

/** The part of the offset disc that stands for all of it, by the outline's symmetry. */
export interface Symmetry {
  /** Repeats in a turn; Infinity for circles about the axis, 1 for none. */
  folds: number;
  /** Whether the x axis is a mirror line. */
  mirror: boolean;
  /** Azimuth of the line that is meant in place of the x axis, radians. */
  axisRad?: number;
}

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
 * @param most so far out a reading has swung through all it can, and further places would only take time
 * @returns flat [x0, y0, x1, y1, …], metres
 */
export function samplePositions(
  offsetM: number,
  phasePerMetre: number,
  spacing: number,
  symmetry: Symmetry,
  { circles: mostCircles, steps: mostSteps }: MostPlaces = { circles: Infinity, steps: Infinity },
): Float64Array {
  const positions = [0, 0];
  const { axisRad = 0 } = symmetry;
  if (offsetM > 0) {
    const reach = offsetM * phasePerMetre;
    const circles = Math.min(mostCircles, Math.max(3, Math.ceil(reach / spacing)));
    const wedge = Number.isFinite(symmetry.folds)
      ? ((symmetry.mirror ? 1 : 2) * Math.PI) / symmetry.folds
      : 0;
    for (let i = 1; i <= circles; i++) {
      const radius = (offsetM * i) / circles;
      const arc = radius * phasePerMetre * wedge;
      // An n-fold outline makes an n-fold pattern, whatever the phase: three steps to half a period at the least.
      const least = symmetry.mirror ? 4 : 7;
      const steps = wedge === 0 ? 1 : Math.min(mostSteps, Math.max(least, Math.ceil(arc / spacing) + 1));
      for (let j = 0; j < steps; j++) {
        const angle = axisRad + (steps === 1 ? 0 : (wedge * j) / (steps - 1));
        positions.push(radius * Math.cos(angle), radius * Math.sin(angle));
      }
    }
  }
  return Float64Array.from(positions);
}

/** Most points of one flight: phases beyond a thousand radians average to nothing anyway. */
const MOST_FLIGHT = 2000;

/** Points of a flight with the share of each in the mean. */
export interface FlightRule {
  /** Flat [x0, y0, x1, y1, …], metres, relative to the flight's middle. */
  points: Float64Array;
  weights: Float64Array;
}

/** A flight that is one point: the particle stays. */
export const NO_FLIGHT: FlightRule = { points: new Float64Array(2), weights: Float64Array.of(1) };

/**
 * Gauss–Legendre points of a straight flight at an even pace: the weighted mean of their readings is the flight's.
 *
 * @param phasePerMetre 2κR, rad/m
 */
export function flightRule(
  crossing: Placement['crossing'],
  phasePerMetre: number,
  rules: LegendreRules,
): FlightRule {
  if (crossing === null) return NO_FLIGHT;
  const { spanM, headingRad } = crossing;
  const { nodes, weights } = rules.rule(Math.min(MOST_FLIGHT, Math.ceil(0.55 * spanM * phasePerMetre) + 8));
  const points = new Float64Array(2 * nodes.length);
  for (let i = 0; i < nodes.length; i++) {
    points[2 * i] = ((spanM * nodes[i]) / 2) * Math.cos(headingRad);
    points[2 * i + 1] = ((spanM * nodes[i]) / 2) * Math.sin(headingRad);
  }
  return { points, weights: weights.map((weight) => weight / 2) };
}

/**
 * Points of a straight flight, relative to its middle, at equal times: the mean of their readings is the flight's.
 * Without a crossing it is the one point where the particle stays.
 */
export function flightPoints(crossing: Placement['crossing'], phasePerMetre: number): Float64Array {
  if (crossing === null) return new Float64Array(2);
  // The mean over middles of equal steps errs by the square of their phase at the ends of the flight.
  const count = Math.min(MOST_FLIGHT, Math.ceil((crossing.spanM * phasePerMetre) / 0.1) + 40);
  const points = new Float64Array(2 * count);
  for (let i = 0; i < count; i++) {
    const along = crossing.spanM * ((i + 0.5) / count - 0.5);
    points[2 * i] = along * Math.cos(crossing.headingRad);
    points[2 * i + 1] = along * Math.sin(crossing.headingRad);
  }
  return points;
}
