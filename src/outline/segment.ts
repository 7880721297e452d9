/** A straight edge. */
interface LineSegment {
  kind: 'line';
  from: readonly [x: number, y: number];
  to: readonly [x: number, y: number];
}

/** An arc of a circle, from one angle to another (either sense); a whole circle spans ±2π. */
export interface ArcSegment {
  kind: 'arc';
  centre: readonly [x: number, y: number];
  radius: number;
  from: number;
  to: number;
}

/**
 * A curve ρ(φ) about the origin, given by ρ² and its derivative, smooth between the two azimuths. A closed one spans ±2π.
 * `folds` tells how often a closed one repeats itself in a turn.
 */
interface PolarSegment {
  kind: 'polar';
  from: number;
  to: number;
  folds: number;
  /** Waves of the finest ripple in a fold, where it has more than a dozen. */
  waves?: number;
  /** Writes ρ² and d(ρ²)/dφ at φ into out[0], out[1]. */
  squared: (phi: number, out: Float64Array) => void;
}

/** A piece of a boundary, traversed with the opening on its left. Lengths in metres, angles in radians. */
export type Segment = LineSegment | ArcSegment | PolarSegment;

/** Whether the segment closes on itself smoothly, so that evenly spaced nodes converge exponentially. */
export function isClosed(segment: Segment): boolean {
  return segment.kind !== 'line' && Math.abs(Math.abs(segment.to - segment.from) - 2 * Math.PI) < 1e-12;
}

/** Writes x, y, dx/dt, dy/dt at t in [0, 1] into `out`. */
export function pointOn(segment: Segment, t: number, out: Float64Array): void {
  if (segment.kind === 'line') {
    const dx = segment.to[0] - segment.from[0];
    const dy = segment.to[1] - segment.from[1];
    out[0] = segment.from[0] + t * dx;
    out[1] = segment.from[1] + t * dy;
    out[2] = dx;
    out[3] = dy;
    return;
  }
  const span = segment.to - segment.from;
  const phi = segment.from + t * span;
  const cos = Math.cos(phi);
  const sin = Math.sin(phi);
  if (segment.kind === 'arc') {
    out[0] = segment.centre[0] + segment.radius * cos;
    out[1] = segment.centre[1] + segment.radius * sin;
    out[2] = -segment.radius * sin * span;
    out[3] = segment.radius * cos * span;
    return;
  }
  segment.squared(phi, out);
  const radius = Math.sqrt(out[0]);
  const slope = out[1] / (2 * radius);
  out[0] = radius * cos;
  out[1] = radius * sin;
  out[2] = (slope * cos - radius * sin) * span;
  out[3] = (slope * sin + radius * cos) * span;
}
