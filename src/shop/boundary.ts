import { inputError } from '../base/errors.ts';

/** One ring of a boundary. Its edges are those numbered from `first` up to `end` − 1. */
interface BoundaryRing {
  first: number;
  end: number;
  /** Square metres; positive for the outer ring of an opening, negative for a piece of sheet inside one. */
  areaM2: number;
  perimeterM: number;
  /** Centre of area. */
  centre: [x: number, y: number];
}

/**
 * The edges of all rings together. Edge i runs from vertex i to vertex next[i], with the opening on its left; `previous`
 * is the edge that ends at vertex i, and turn[i] the angle from that edge to edge i: positive in a convex corner of the
 * opening, negative in a reflex one.
 */
export interface Boundary {
  count: number;
  x: Float64Array;
  y: Float64Array;
  /** Unit direction of each edge. */
  tx: Float64Array;
  ty: Float64Array;
  lengthM: Float64Array;
  turnRad: Float64Array;
  next: Int32Array;
  previous: Int32Array;
  rings: BoundaryRing[];
  /** Lengths up to this count as none: 1e-9 of the longer side of the box around everything. */
  touchM: number;
}

/**
 * Lays out rings for measuring. A vertex that repeats the one before it carries no shape and is left out.
 *
 * @param rings closed polygons [x0, y0, x1, y1, …] in metres, the opening to the left of every edge
 * @throws RimwrightError `input` for a coordinate that is not finite, or a ring of fewer than three different points
 */
export function layOut(rings: readonly Float64Array[]): Boundary {
  const most = rings.reduce((sum, ring) => sum + ring.length / 2, 0);
  const b: Boundary = {
    count: 0,
    x: new Float64Array(most),
    y: new Float64Array(most),
    tx: new Float64Array(most),
    ty: new Float64Array(most),
    lengthM: new Float64Array(most),
    turnRad: new Float64Array(most),
    next: new Int32Array(most),
    previous: new Int32Array(most),
    rings: [],
    touchM: 0,
  };
  rings.forEach((points, number) => {
    addRing(b, points, number);
  });
  b.touchM = 1e-9 * longerSide(b);
  return b;
}

function addRing(b: Boundary, points: Float64Array, number: number): void {
  const first = b.count;
  let [lastX, lastY] = points.subarray(-2);
  for (let k = 0; k < points.length; k += 2) {
    const [x, y] = [points[k], points[k + 1]];
    if (!Number.isFinite(x) || !Number.isFinite(y)) {
      const key = `rings[${number}], point ${k / 2}`;
      throw inputError([{ key, found: `${x}, ${y}`, expected: 'finite coordinates in metres' }]);
    }
    if (x === lastX && y === lastY) continue;
    b.x[b.count] = lastX = x;
    b.y[b.count] = lastY = y;
    b.count++;
  }
  const end = b.count;
  if (end - first < 3) {
    const found = `${end - first} different points`;
    throw inputError([{ key: `rings[${number}]`, found, expected: 'a ring of three or more' }]);
  }

  let perimeterM = 0;
  for (let i = first; i < end; i++) {
    const next = i + 1 < end ? i + 1 : first;
    b.next[i] = next;
    b.previous[next] = i;
    const dx = b.x[next] - b.x[i];
    const dy = b.y[next] - b.y[i];
    const lengthM = Math.sqrt(dx * dx + dy * dy);
    b.tx[i] = dx / lengthM;
    b.ty[i] = dy / lengthM;
    b.lengthM[i] = lengthM;
    perimeterM += lengthM;
  }
  for (let i = first; i < end; i++) {
    const p = b.previous[i];
    const cross = b.tx[p] * b.ty[i] - b.ty[p] * b.tx[i];
    b.turnRad[i] = Math.atan2(cross, b.tx[p] * b.tx[i] + b.ty[p] * b.ty[i]);
  }
  b.rings.push({ first, end, perimeterM, ...areaAndCentre(b, first, end) });
}

function areaAndCentre(b: Boundary, first: number, end: number): Pick<BoundaryRing, 'areaM2' | 'centre'> {
  // Measured from the first vertex, so that a small ring far from the origin keeps its digits.
  const [x0, y0] = [b.x[first], b.y[first]];
  let twice = 0;
  let momentX = 0;
  let momentY = 0;
  for (let i = first + 1; i + 1 < end; i++) {
    const [ax, ay] = [b.x[i] - x0, b.y[i] - y0];
    const [bx, by] = [b.x[i + 1] - x0, b.y[i + 1] - y0];
    const cross = ax * by - ay * bx;
    twice += cross;
    momentX += cross * (ax + bx);
    momentY += cross * (ay + by);
  }
  const centre: [number, number] =
    twice === 0 ? [x0, y0] : [x0 + momentX / (3 * twice), y0 + momentY / (3 * twice)];
  return { areaM2: twice / 2, centre };
}

function longerSide({ x, y, count }: Boundary): number {
  let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let i = 0; i < count; i++) {
    minX = Math.min(minX, x[i]);
    maxX = Math.max(maxX, x[i]);
    minY = Math.min(minY, y[i]);
    maxY = Math.max(maxY, y[i]);
  }
  return count === 0 ? 0 : Math.max(maxX - minX, maxY - minY);
}
