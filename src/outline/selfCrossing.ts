import { edgeTree } from './edgeTree.ts';
import { orientation } from './orientation.ts';

/** Two edges of one ring that meet: edge k runs from point k to the next point, the last one back to point 0. */
export interface SelfCrossing {
  i: number;
  j: number;
  /** Where they meet, in the unit of the points. */
  x: number;
  y: number;
}

/** Two edges that meet, each with the number of its ring. */
export interface RingsCrossing extends SelfCrossing {
  ringI: number;
  ringJ: number;
}

/**
 * The first place where a closed ring crosses or touches itself, or null for a simple ring. Neighbouring edges may
 * share their common point, but not fold back on each other. Time grows as n log n for outlines of usual shape.
 *
 * @param points [x0, y0, x1, y1, …], at least three points, finite, the last point not repeated, any length unit
 * @returns the pair of edges with the smallest i, then the smallest j > i
 */
export function findSelfCrossing(points: Float64Array): SelfCrossing | null {
  const crossing = findRingsCrossing([points]);
  return crossing && { i: crossing.i, j: crossing.j, x: crossing.x, y: crossing.y };
}

/**
 * As `findSelfCrossing` for several rings together: the first place where a ring meets itself or any other ring.
 *
 * @param rings each as in `findSelfCrossing`
 */
export function findRingsCrossing(rings: readonly Float64Array[]): RingsCrossing | null {
  const { edges, ringOf, next, firstOf } = collectEdges(rings);
  const tree = edgeTree(edges);
  const count = ringOf.length;
  const commonPoint = (a: number, b: number) => {
    if (next[a] === b) return foldBack(edges, a, b);
    if (next[b] === a) return foldBack(edges, b, a);
    return meetingPoint(edges, a, b);
  };
  for (let a = 0; a < count; a++) {
    const found = tree.search(a, a + 1, (b): RingsCrossing | null => {
      const place = commonPoint(a, b);
      if (place === null) return null;
      const [ringI, ringJ] = [ringOf[a], ringOf[b]];
      return { ringI, ringJ, i: a - firstOf[ringI], j: b - firstOf[ringJ], x: place[0], y: place[1] };
    });
    if (found !== null) return found;
  }
  return null;
}

function collectEdges(rings: readonly Float64Array[]) {
  const count = rings.reduce((sum, points) => sum + points.length / 2, 0);
  const edges = new Float64Array(4 * count);
  const ringOf = new Int32Array(count);
  const next = new Int32Array(count);
  const firstOf: number[] = [];
  let first = 0;
  rings.forEach((points, ring) => {
    const n = points.length / 2;
    firstOf.push(first);
    for (let k = 0; k < n; k++) {
      const after = (k + 1) % n;
      edges.set(
        [points[2 * k], points[2 * k + 1], points[2 * after], points[2 * after + 1]],
        4 * (first + k),
      );
      ringOf[first + k] = ring;
      next[first + k] = first + after;
    }
    first += n;
  });
  return { edges, ringOf, next, firstOf };
}

/** Edge b starts where edge a ends: the common point if b runs back along a, else null. */
function foldBack(edges: Float64Array, a: number, b: number): [number, number] | null {
  const [ax, ay, cx, cy] = edges.subarray(4 * a, 4 * a + 4);
  const [, , bx, by] = edges.subarray(4 * b, 4 * b + 4);
  const goesOn = (ax - cx) * (bx - cx) + (ay - cy) * (by - cy) < 0;
  return !goesOn && orientation(ax, ay, cx, cy, bx, by) === 0 ? [cx, cy] : null;
}

/** A point that two edges have in common, ends included, or null. */
function meetingPoint(edges: Float64Array, a: number, b: number): [number, number] | null {
  const ax = edges[4 * a];
  const ay = edges[4 * a + 1];
  const bx = edges[4 * a + 2];
  const by = edges[4 * a + 3];
  const cx = edges[4 * b];
  const cy = edges[4 * b + 1];
  const dx = edges[4 * b + 2];
  const dy = edges[4 * b + 3];
  const sideC = orientation(ax, ay, bx, by, cx, cy);
  const sideD = orientation(ax, ay, bx, by, dx, dy);
  if (sideC * sideD > 0) return null;
  const sideA = orientation(cx, cy, dx, dy, ax, ay);
  const sideB = orientation(cx, cy, dx, dy, bx, by);
  if (sideA * sideB > 0) return null;
  // Where an end lies on the other edge, that end is the exact answer.
  if (sideC === 0 && inBox(cx, cy, ax, ay, bx, by)) return [cx, cy];
  if (sideD === 0 && inBox(dx, dy, ax, ay, bx, by)) return [dx, dy];
  if (sideA === 0 && inBox(ax, ay, cx, cy, dx, dy)) return [ax, ay];
  if (sideB === 0 && inBox(bx, by, cx, cy, dx, dy)) return [bx, by];
  if (sideA * sideB * sideC * sideD === 0) return null;
  const distanceA = (dx - cx) * (ay - cy) - (dy - cy) * (ax - cx);
  const distanceB = (dx - cx) * (by - cy) - (dy - cy) * (bx - cx);
  const share = distanceA === distanceB ? 0.5 : distanceA / (distanceA - distanceB);
  return [ax + share * (bx - ax), ay + share * (by - ay)];
}

function inBox(x: number, y: number, ax: number, ay: number, bx: number, by: number): boolean {
  return x >= Math.min(ax, bx) && x <= Math.max(ax, bx) && y >= Math.min(ay, by) && y <= Math.max(ay, by);
}
