import type { Boundary } from './boundary.ts';

/**
 * Sides face each other, and enclose a width, where they are within 30.7° of parallel; a wider wedge is a corner. Where a
 * curve closes in on a straight side, the width is the one at this angle: 0.86 R for half a disc of radius R. The angle is
 * kept off 30° and 36°, where drawn shapes like to be and rounding would decide.
 */
export const FACING_COSINE = 0.86;

/** Room for rounding where a line runs along an edge: the sine of the angle between them. */
const ROUNDING = 1e-9;

/**
 * Whether the boundary at vertex q faces along (vx, vy), a unit vector into the opening (side 1) or the sheet (side −1):
 * one of its edges does, or the vector lies in the fan of normals of a reflex vertex.
 */
export function faces(b: Boundary, q: number, vx: number, vy: number, side: 1 | -1): boolean {
  const { tx, ty, turnRad, previous } = b;
  const p = previous[q];
  // Sines of the angles from the edges at q to the vector are cosines of those from their normals.
  const isUpright =
    side * (tx[q] * vy - ty[q] * vx) >= FACING_COSINE || side * (tx[p] * vy - ty[p] * vx) >= FACING_COSINE;
  if (isUpright) return opensTo(b, q, vx, vy, side);
  return side * turnRad[q] < 0 && tx[p] * vx + ty[p] * vy >= 0 && tx[q] * vx + ty[q] * vy <= 0;
}

/**
 * Whether a line along (vx, vy), upright on one of the edges at vertex q, leaves it into the opening (side 1) or the sheet
 * (side −1). At an acute convex corner it may run outside.
 */
export function opensTo(b: Boundary, q: number, vx: number, vy: number, side: 1 | -1): boolean {
  const { tx, ty, turnRad, previous } = b;
  const p = previous[q];
  if (side * turnRad[q] <= 0) return true;
  return side * (tx[q] * vy - ty[q] * vx) >= -ROUNDING && side * (tx[p] * vy - ty[p] * vx) >= -ROUNDING;
}
