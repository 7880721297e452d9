import type { Loop } from './shape.ts';

/*
 * An arc loop is a closed ring of straight edges and arcs: flat [x0, y0, bulge0, x1, …], each bulge that of the piece from its
 * vertex to the next. A bulge is the tangent of a quarter of the arc's angle, positive to the left (counter-clockwise), 0 for a
 * straight edge. A whole circle is two half circles.
 */

/** An arc or a straight edge between two points. */
export interface ArcPiece {
  from: readonly [x: number, y: number];
  to: readonly [x: number, y: number];
  bulge: number;
}

/** A circle in parts: centre, radius, and the angle of the start of an arc on it. */
interface ArcGeometry {
  centre: readonly [x: number, y: number];
  radius: number;
  start: number;
  /** Radians, counter-clockwise positive. */
  span: number;
}

/** Longest arc that stays one piece: longer ones are halved, since a short chord says little about a large circle. */
const LONGEST_ARC = Math.PI * (1 + 1e-9);

/** The exact form of a loop that has only straight edges and arcs; null where a curve of another kind is in it. */
export function arcLoopOf(loop: Loop): Float64Array | null {
  const values: number[] = [];
  for (const segment of loop) {
    if (segment.kind === 'polar') return null;
    if (segment.kind === 'line') {
      values.push(...segment.from, 0);
      continue;
    }
    const { centre, radius, from, to } = segment;
    const parts = Math.max(1, Math.ceil(Math.abs(to - from) / LONGEST_ARC));
    const span = (to - from) / parts;
    for (let part = 0; part < parts; part++) {
      const angle = from + part * span;
      // Of a half circle the tangent is 1, but for rounding.
      const bulge = Math.abs(Math.abs(span) - Math.PI) < 1e-12 ? Math.sign(span) : Math.tan(span / 4);
      values.push(centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle), bulge);
    }
  }
  return Float64Array.from(values);
}

/** Whether there is any arc in it. */
export function isCurved(loop: Float64Array): boolean {
  return loop.some((value, i) => i % 3 === 2 && value !== 0);
}

/** Its pieces one after the other. */
export function arcPieces(loop: Float64Array): ArcPiece[] {
  return Array.from({ length: loop.length / 3 }, (_, k) => {
    const next = (3 * k + 3) % loop.length;
    return { from: [loop[3 * k], loop[3 * k + 1]], to: [loop[next], loop[next + 1]], bulge: loop[3 * k + 2] };
  });
}

/** The circle of an arc whose bulge is not 0. */
export function arcGeometry({ from, to, bulge }: ArcPiece): ArcGeometry {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  // The centre lies on the chord's bisector, (1 − b²)/(4b) of the chord to its left; the radius is (1 + b²)/(4|b|) of it.
  const left = (1 - bulge * bulge) / (4 * bulge);
  const centre: [number, number] = [(from[0] + to[0]) / 2 - left * dy, (from[1] + to[1]) / 2 + left * dx];
  const radius = (Math.hypot(dx, dy) * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
  return {
    centre,
    radius,
    start: Math.atan2(from[1] - centre[1], from[0] - centre[0]),
    span: 4 * Math.atan(bulge),
  };
}

/** Signed area of an arc loop, m²: that of its polygon, and of the segments of circles beside its chords. */
export function arcLoopArea(loop: Float64Array): number {
  let twice = 0;
  for (const piece of arcPieces(loop)) {
    const { from, to, bulge } = piece;
    twice += from[0] * to[1] - to[0] * from[1];
    if (bulge === 0) continue;
    const { radius, span } = arcGeometry(piece);
    twice += radius * radius * (span - Math.sin(span));
  }
  return twice / 2;
}

/** The circle that an arc loop is, or null. */
export function circleOf(loop: Float64Array): { centre: readonly [number, number]; radius: number } | null {
  if (loop.length !== 6 || Math.abs(loop[2]) !== 1 || loop[2] !== loop[5]) return null;
  const centre: [number, number] = [(loop[0] + loop[3]) / 2, (loop[1] + loop[4]) / 2];
  return { centre, radius: Math.hypot(loop[3] - loop[0], loop[4] - loop[1]) / 2 };
}

/** The same loop run the other way, from the same first vertex. */
export function reversedArcLoop(loop: Float64Array): Float64Array {
  const count = loop.length / 3;
  return loop.map((_, i) => {
    const vertex = (count - Math.floor(i / 3)) % count;
    // The piece after a vertex is the one that came before it.
    return i % 3 === 2 ? -loop[3 * ((vertex + count - 1) % count) + 2] : loop[3 * vertex + (i % 3)];
  });
}
