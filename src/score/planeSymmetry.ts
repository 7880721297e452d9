import type { Task } from './task.ts';

/** The mirror lines and turns that leave a task as it is: the offset's disc has them all. */
export interface PlaneSymmetry {
  /** Azimuth of a mirror line, radians; where there is none, where a half plane begins. */
  axisRad: number;
  /** Whether that line and the one across it are mirrors; half a turn always is one of its symmetries. */
  mirrors: boolean;
}

/** How far a heading may be off the field's angle or its normal, radians: rounding. */
const ALIGNED = 1e-9;

/**
 * What a field's angle and a flight's heading leave of the plane's symmetry. A flight is the same from either end, and a field's direction
 * has no sign.
 */
export function planeSymmetry({ light, placement }: Task): PlaneSymmetry {
  const field = light.polarizationRad;
  const heading = placement.crossing?.headingRad ?? field ?? 0;
  const mirrors = field === null || Math.abs(Math.sin(2 * (heading - field))) < ALIGNED;
  return { axisRad: heading, mirrors };
}

/** The different images of a place, flat [x0, y0, …], metres. */
export function imagesOf(
  { axisRad, mirrors }: PlaneSymmetry,
  [x, y]: readonly [number, number],
): Float64Array {
  const [cos2, sin2] = [Math.cos(2 * axisRad), Math.sin(2 * axisRad)];
  const mirrored: [number, number] = [cos2 * x + sin2 * y, sin2 * x - cos2 * y];
  const all = (mirrors ? [[x, y], mirrored] : [[x, y]]).flatMap(([u, v]) => [
    [u, v],
    [-u, -v],
  ]);
  const same = 1e-9 * Math.hypot(x, y);
  const kept = all.filter(([u, v], i) => !all.slice(0, i).some(([p, q]) => Math.hypot(u - p, v - q) <= same));
  return Float64Array.from(kept.flat());
}
