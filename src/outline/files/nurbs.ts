import type { Curve, Point } from './curve.ts';
import { curved } from './curve.ts';

const HIGHEST_DEGREE = 10;

/**
 * A rational B-spline as one smooth curve for each span between knots (Piegl & Tiller, The NURBS Book, 1997, algorithm A4.1, with
 * de Boor's triangle).
 *
 * @param points control points, at least degree + 1
 * @param knots never falling, points + degree + 1 of them
 * @param weights above 0, one a point; none for an ordinary B-spline
 * @returns what is wrong, in words, where anything is
 */
export function nurbs(
  degree: number,
  points: readonly Point[],
  knots: readonly number[],
  weights: readonly number[],
): Curve[] | string {
  if (!Number.isInteger(degree) || degree < 1 || degree > HIGHEST_DEGREE) return `a degree of ${degree}`;
  if (points.length <= degree) return `${points.length} control points`;
  if (knots.length !== points.length + degree + 1) return `${knots.length} knots`;
  if (knots.some((knot, i) => i > 0 && knot < knots[i - 1])) return 'falling knots';
  if (weights.length > 0 && weights.length !== points.length) return `${weights.length} weights`;
  if (weights.some((weight) => !(weight > 0))) return 'a weight that is not above 0';
  const weighted = points.map(([x, y], i): Homogeneous => {
    const weight = weights[i] ?? 1;
    return [x * weight, y * weight, weight];
  });
  const curves: Curve[] = [];
  for (let span = degree; span < points.length; span++) {
    const [from, to] = [knots[span], knots[span + 1]];
    if (from === to) continue;
    curves.push(curved((t) => deBoor(degree, weighted, knots, span, from + t * (to - from))));
  }
  return curves.length === 0 ? 'knots without a span' : curves;
}

type Homogeneous = readonly [x: number, y: number, weight: number];

function deBoor(
  degree: number,
  points: readonly Homogeneous[],
  knots: readonly number[],
  span: number,
  place: number,
): Point {
  const triangle = points.slice(span - degree, span + 1);
  for (let level = 1; level <= degree; level++) {
    for (let i = degree; i >= level; i--) {
      const first = knots[span - degree + i];
      const share = (place - first) / (knots[span + i + 1 - level] - first);
      const [a, b] = [triangle[i - 1], triangle[i]];
      triangle[i] = [
        a[0] + share * (b[0] - a[0]),
        a[1] + share * (b[1] - a[1]),
        a[2] + share * (b[2] - a[2]),
      ];
    }
  }
  const [x, y, weight] = triangle[degree];
  return [x / weight, y / weight];
}
