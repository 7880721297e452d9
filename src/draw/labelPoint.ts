import type { OutlineElement } from '../outline/shape.ts';

/** An odd number, so that one line runs through the middle. */
const LINES = 49;
/** Where on an opening along such a line to try, as parts of its length. */
const PARTS = [0.5, 0.7];

/**
 * A point well inside an element's openings, for a label to point at: of some points along level lines the one farthest
 * from any edge, with some liking for the right, where the labels stand, and off the middle, where the centre mark is.
 *
 * @returns [x, y] in metres
 */
export function labelPoint({ rings }: OutlineElement): [number, number] {
  const [bottom, top] = heightRange(rings);
  const middle = 0.3 * Math.max(Math.abs(bottom), Math.abs(top));
  let best: [number, number] = [rings[0][0], rings[0][1]];
  let bestScore = -Infinity;
  for (let k = 0; k < LINES; k++) {
    const y = bottom + ((k + 0.5) / LINES) * (top - bottom);
    const crossings = levelCrossings(rings, y);
    for (let c = 0; c + 1 < crossings.length; c += 2) {
      for (const part of PARTS) {
        const x = crossings[c] + part * (crossings[c + 1] - crossings[c]);
        const axisDistance = Math.hypot(x, y);
        const liking = axisDistance < middle ? 0.3 : 1 + (0.2 * x) / axisDistance;
        const score = liking * clearance(rings, x, y);
        if (score > bestScore) [bestScore, best] = [score, [x, y]];
      }
    }
  }
  return best;
}

function heightRange(rings: readonly Float64Array[]): [number, number] {
  let [bottom, top] = [Infinity, -Infinity];
  for (const ring of rings) {
    for (let k = 1; k < ring.length; k += 2) {
      bottom = Math.min(bottom, ring[k]);
      top = Math.max(top, ring[k]);
    }
  }
  return [bottom, top];
}

/** Where the level line at y crosses the rings, from left to right; openings lie between the 1st and 2nd, 3rd and 4th, … */
function levelCrossings(rings: readonly Float64Array[], y: number): number[] {
  const crossings: number[] = [];
  for (const ring of rings) {
    for (let k = 0; k < ring.length; k += 2) {
      const next = (k + 2) % ring.length;
      const [x0, y0, x1, y1] = [ring[k], ring[k + 1], ring[next], ring[next + 1]];
      if (y0 <= y !== y1 <= y) crossings.push(x0 + ((y - y0) / (y1 - y0)) * (x1 - x0));
    }
  }
  return crossings.sort((a, b) => a - b);
}

/** Distance from (x, y) to the nearest edge. */
function clearance(rings: readonly Float64Array[], x: number, y: number): number {
  let nearest = Infinity;
  for (const ring of rings) {
    for (let k = 0; k < ring.length; k += 2) {
      const next = (k + 2) % ring.length;
      const [dx, dy] = [ring[next] - ring[k], ring[next + 1] - ring[k + 1]];
      const [px, py] = [x - ring[k], y - ring[k + 1]];
      const along = Math.min(1, Math.max(0, (px * dx + py * dy) / (dx * dx + dy * dy || 1)));
      nearest = Math.min(nearest, Math.hypot(px - along * dx, py - along * dy));
    }
  }
  return nearest;
}
