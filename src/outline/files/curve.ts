import type { ArcPiece } from '../arcLoop.ts';
import { arcGeometry } from '../arcLoop.ts';

export type Point = readonly [x: number, y: number];

/** A piece of an outline as a file draws it; lengths in metres. */
export interface Curve {
  from: Point;
  to: Point;
  /** Its point at t, from 0 to 1; none for a straight edge. */
  at?: (t: number) => Point;
  /** For arcs of circles: the tangent of a quarter of the angle; 0 for a straight edge; none for other curves. */
  bulge?: number;
}

export function straight(from: Point, to: Point): Curve {
  return { from, to, bulge: 0 };
}

/** An arc by its bulge (see `arcLoop.ts`), or a straight edge where that is 0. */
export function bulged(piece: ArcPiece): Curve {
  const { from, to, bulge } = piece;
  if (bulge === 0) return straight(from, to);
  const { centre, radius, start, span } = arcGeometry(piece);
  return { from, to, bulge, at: circlePoint(centre, radius, start, span) };
}

/** An arc about a centre, radians, either sense; a whole circle is given as two of them. */
export function arcAbout(centre: Point, radius: number, start: number, span: number): Curve[] {
  const parts = Math.abs(span) > Math.PI * (1 + 1e-9) ? 2 : 1;
  return Array.from({ length: parts }, (_, k) => {
    const angle = start + (k * span) / parts;
    const at = circlePoint(centre, radius, angle, span / parts);
    const isHalf = Math.abs(Math.abs(span / parts) - Math.PI) < 1e-12;
    const bulge = isHalf ? Math.sign(span) : Math.tan(span / parts / 4);
    return { from: at(0), to: at(1), at, bulge };
  });
}

function circlePoint(centre: Point, radius: number, start: number, span: number): (t: number) => Point {
  return (t) => [
    centre[0] + radius * Math.cos(start + t * span),
    centre[1] + radius * Math.sin(start + t * span),
  ];
}

/** Any other curve. */
export function curved(at: (t: number) => Point): Curve {
  return { from: at(0), to: at(1), at };
}

/** A Bézier curve by its control points, by de Casteljau's construction. */
export function bezier(points: readonly Point[]): Curve {
  return curved((t) => {
    let rest = points;
    while (rest.length > 1) {
      rest = rest
        .slice(1)
        .map(([x, y], i): Point => [rest[i][0] + t * (x - rest[i][0]), rest[i][1] + t * (y - rest[i][1])]);
    }
    return rest[0];
  });
}

/** The same curve run the other way. */
export function backwards({ from, to, at, bulge }: Curve): Curve {
  return {
    from: to,
    to: from,
    ...(at && { at: (t: number) => at(1 - t) }),
    ...(bulge !== undefined && { bulge: -bulge }),
  };
}
