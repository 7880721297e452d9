import type { Boundary } from './boundary.ts';
import { FACING_COSINE } from './facing.ts';

/** Radians: vertices that turn by less are points on a curve, where the lines upright on the edges beside them do. */
const SHALLOW_TURN = 0.1;

/**
 * Visits the lines that stand upright on an edge at a convex corner and end inside an edge that faces it, in the
 * opening (side 1) or the sheet (side −1). They are the shortest where a taper is cut off blunt.
 */
export function visitCornerLines(
  b: Boundary,
  visit: (side: 1 | -1, lengthM: number, middleX: number, middleY: number) => void,
): void {
  const { count, x, y, tx, ty, turnRad, previous } = b;
  for (let p = 0; p < count; p++) {
    if (Math.abs(turnRad[p]) <= SHALLOW_TURN) continue;
    const side = turnRad[p] > 0 ? 1 : -1;
    for (const edge of [p, previous[p]]) {
      const ux = -side * ty[edge];
      const uy = side * tx[edge];
      const { hit, lengthM } = firstHit(b, p, ux, uy);
      if (hit < 0 || lengthM <= b.touchM || tx[edge] * tx[hit] + ty[edge] * ty[hit] > -FACING_COSINE)
        continue;
      visit(side, lengthM, x[p] + (lengthM / 2) * ux, y[p] + (lengthM / 2) * uy);
    }
  }
}

/**
 * The edge that a ray from vertex p meets first, or −1; the edges at p do not count. A ray that leaves an acute corner the
 * wrong way meets backs alone, which do not face it.
 */
function firstHit(b: Boundary, p: number, ux: number, uy: number): { hit: number; lengthM: number } {
  const { x, y, next, previous, count, touchM } = b;
  let hit = -1;
  let lengthM = Infinity;
  for (let i = 0; i < count; i++) {
    const j = next[i];
    const from = ux * (y[i] - y[p]) - uy * (x[i] - x[p]);
    const to = ux * (y[j] - y[p]) - uy * (x[j] - x[p]);
    if (from < 0 === to < 0 || i === p || i === previous[p]) continue;
    const share = from / (from - to);
    const along = ux * (x[i] + share * (x[j] - x[i]) - x[p]) + uy * (y[i] + share * (y[j] - y[i]) - y[p]);
    if (along > -touchM && along < lengthM) {
      hit = i;
      lengthM = along;
    }
  }
  return { hit, lengthM };
}
