import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findRingsCrossing, findSelfCrossing } from '../../src/outline/selfCrossing.ts';

type Point = [x: number, y: number];

const ring = (...coordinates: number[]) => Float64Array.from(coordinates);

function polarRing(count: number, radius: (angle: number) => number): Float64Array {
  const points = new Float64Array(2 * count);
  for (let k = 0; k < count; k++) {
    const angle = (2 * Math.PI * k) / count;
    points[2 * k] = radius(angle) * Math.cos(angle);
    points[2 * k + 1] = radius(angle) * Math.sin(angle);
  }
  return points;
}

/** Whether any two edges of a ring of small whole numbers meet, by trying all pairs: here every product is exact. */
function meetsItselfByTrying(points: Float64Array): boolean {
  const n = points.length / 2;
  const at = (k: number): Point => [points[2 * (k % n)], points[2 * (k % n) + 1]];
  for (let i = 0; i < n; i++) {
    for (let j = i + 1; j < n; j++) {
      const areNeighbours = j === i + 1 || (i === 0 && j === n - 1);
      const [p, q, r, s] = [at(i), at(i + 1), at(j), at(j + 1)];
      if (areNeighbours ? neighboursOverlap(p, q, r, s) : edgesMeet(p, q, r, s)) return true;
    }
  }
  return false;
}

/** Solves p + t (q − p) = r + u (s − r); parallel edges meet where they lie on one line and overlap. */
function edgesMeet(p: Point, q: Point, r: Point, s: Point): boolean {
  const [ax, ay, bx, by] = [q[0] - p[0], q[1] - p[1], s[0] - r[0], s[1] - r[1]];
  const [cx, cy] = [r[0] - p[0], r[1] - p[1]];
  const determinant = ax * by - ay * bx;
  if (determinant !== 0) {
    const [t, u] = [(cx * by - cy * bx) / determinant, (cx * ay - cy * ax) / determinant];
    return t >= 0 && t <= 1 && u >= 0 && u <= 1;
  }
  const areOnOneLine = cx * ay - cy * ax === 0 && cx * by - cy * bx === 0;
  return areOnOneLine && Math.min(...overlaps(p, q, r, s)) >= 0;
}

/** Neighbours meet in their common point; more than that only if they are parallel and have a stretch in common. */
function neighboursOverlap(p: Point, q: Point, r: Point, s: Point): boolean {
  const [ax, ay, bx, by] = [q[0] - p[0], q[1] - p[1], s[0] - r[0], s[1] - r[1]];
  if ((ax === 0 && ay === 0) || (bx === 0 && by === 0)) return true;
  return ax * by - ay * bx === 0 && Math.max(...overlaps(p, q, r, s)) > 0;
}

/** Length of the stretch that both edges cover, seen along x and along y; negative for a gap. */
function overlaps(p: Point, q: Point, r: Point, s: Point): number[] {
  return [0, 1].map((axis) => {
    const low = Math.max(Math.min(p[axis], q[axis]), Math.min(r[axis], s[axis]));
    const high = Math.min(Math.max(p[axis], q[axis]), Math.max(r[axis], s[axis]));
    return high - low;
  });
}

describe('findSelfCrossing', () => {
  it('lets simple rings pass, in either sense and from any first point', () => {
    for (const points of [
      ring(0, 0, 1, 0, 0, 1),
      ring(0, 0, 2, 0, 2, 2, 1, 1, 0, 2),
      ring(0, 0, 1, 0, 2, 0, 2, 1, 2, 2, 0, 2), // points along straight sides
    ]) {
      const turned = Float64Array.from([...points.slice(2), ...points.slice(0, 2)]);
      expect(findSelfCrossing(points)).toBeNull();
      expect(findSelfCrossing(turned)).toBeNull();
      expect(findSelfCrossing(points.slice().reverse())).toBeNull();
    }
  });

  it('finds the place of a crossing', () => {
    const crossing = findSelfCrossing(ring(0, 0, 4, 4, 4, 0, 0, 2));
    expect(crossing).toMatchObject({ i: 0, j: 2 });
    expect(crossing?.x).toBeCloseTo(4 / 3, 14);
    expect(crossing?.y).toBeCloseTo(4 / 3, 14);
  });

  it.each([
    ['a corner on an edge', ring(0, 0, 2, 0, 2, 2, 1, 0, 0, 2), { i: 0, j: 2, x: 1, y: 0 }],
    ['two corners in one place', ring(0, 0, 2, 0, 1, 1, 2, 2, 0, 2, 1, 1), { i: 1, j: 4, x: 1, y: 1 }],
    ['an edge that folds back', ring(0, 0, 4, 0, 2, 0, 2, 2), { i: 0, j: 1, x: 4, y: 0 }],
    ['a fold at the first point', ring(0, 0, 2, 0, 2, 2, 4, 0), { i: 0, j: 3, x: 0, y: 0 }],
    ['an edge run twice', ring(0, 0, 3, 0, 3, 1, 2, 1, 2, 0, 1, 0, 1, 1, 0, 1), { i: 0, j: 3, x: 2, y: 0 }],
    ['a point given twice', ring(0, 0, 1, 0, 1, 0, 1, 1), { i: 0, j: 1, x: 1, y: 0 }],
  ])('counts touching: %s', (_name, points, crossing) => {
    expect(findSelfCrossing(points)).toEqual(crossing);
  });

  it('agrees with trying every pair of edges on a small grid', () => {
    const coordinate = fc.integer({ min: 0, max: 5 });
    const corners = fc.array(fc.tuple(coordinate, coordinate), { minLength: 3, maxLength: 8 });
    let simple = 0;
    fc.assert(
      fc.property(corners, (list) => {
        const points = Float64Array.from(list.flat());
        const isMet = meetsItselfByTrying(points);
        if (!isMet) simple++;
        expect(findSelfCrossing(points) !== null).toBe(isMet);
      }),
      { numRuns: 5000, seed: 7 },
    );
    expect(simple).toBeGreaterThan(200);
  });

  it('sees gaps and crossings of one rounding step', () => {
    // A notch whose tip ends just short of, on, and just beyond the opposite side.
    const notch = (tip: number) => ring(0, 0.5, 1, 0.5, 1, 1, 0.7, tip, 0.4, 1, 0, 1);
    expect(findSelfCrossing(notch(0.5 + 2 ** -53))).toBeNull();
    expect(findSelfCrossing(notch(0.5))).toEqual({ i: 0, j: 2, x: 0.7, y: 0.5 });
    expect(findSelfCrossing(notch(0.5 - 2 ** -54))).toMatchObject({ i: 0, j: 2 });
  });

  it('copes with 20 000 points, and finds the one crossing among them', () => {
    const points = polarRing(20_000, (angle) => 1e-3 * (1 + 0.5 * Math.sin(40 * angle)));
    expect(findSelfCrossing(points)).toBeNull();
    // Two neighbouring points in the wrong order: the line folds over itself.
    const k = 12_345;
    const swapped = points.slice();
    swapped.set(points.subarray(2 * k + 2, 2 * k + 4), 2 * k);
    swapped.set(points.subarray(2 * k, 2 * k + 2), 2 * k + 2);
    const crossing = findSelfCrossing(swapped);
    expect(crossing?.i).toBe(k - 1);
    expect(crossing?.j).toBe(k + 1);
  });
});

describe('findRingsCrossing', () => {
  const outer = ring(0, 0, 10, 0, 10, 10, 0, 10);

  it('lets nested and separate rings pass', () => {
    const hole = ring(2, 2, 2, 8, 8, 8, 8, 2);
    const other = ring(20, 0, 30, 0, 25, 5);
    expect(findRingsCrossing([outer, hole, other])).toBeNull();
    expect(findRingsCrossing([])).toBeNull();
  });

  it('names both rings and edges', () => {
    const across = ring(5, 5, 12, 5, 5, 7);
    expect(findRingsCrossing([outer, across])).toEqual({ ringI: 0, i: 1, ringJ: 1, j: 0, x: 10, y: 5 });
  });

  it('counts touching rings, equal rings and a ring that crosses itself', () => {
    expect(findRingsCrossing([outer, ring(10, 3, 12, 2, 12, 4)])).toMatchObject({ x: 10, y: 3 });
    expect(findRingsCrossing([outer, outer.slice()])).not.toBeNull();
    expect(findRingsCrossing([outer, ring(20, 0, 21, 1, 21, 0, 20, 1)])).toMatchObject({
      ringI: 1,
      ringJ: 1,
    });
  });
});
