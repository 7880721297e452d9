import type { Curve, Point } from './curve.ts';

/** x' = a x + c y + e, y' = b x + d y + f. */
export type Matrix = readonly [a: number, b: number, c: number, d: number, e: number, f: number];

export const SAME_PLACE: Matrix = [1, 0, 0, 1, 0, 0];

/** What `inner` and then `outer` make of a point. */
export function multiply(outer: Matrix, inner: Matrix): Matrix {
  const [a, b, c, d, e, f] = outer;
  const [p, q, r, s, t, u] = inner;
  return [a * p + c * q, b * p + d * q, a * r + c * s, b * r + d * s, a * t + c * u + e, b * t + d * u + f];
}

export function moved([a, b, c, d, e, f]: Matrix, [x, y]: Point): Point {
  return [a * x + c * y + e, b * x + d * y + f];
}

/** A curve as the matrix shows it. Arcs of circles stay such where both directions have the same scale. */
export function movedCurve(matrix: Matrix, { from, to, at, bulge }: Curve): Curve {
  const [a, b, c, d] = matrix;
  const size = Math.hypot(a, b);
  const isSimilar =
    Math.abs(Math.hypot(c, d) - size) <= 1e-12 * size && Math.abs(a * c + b * d) <= 1e-12 * size * size;
  const turned = bulge !== undefined && (bulge === 0 || isSimilar) ? { bulge: bulge * sense(matrix) } : {};
  return {
    from: moved(matrix, from),
    to: moved(matrix, to),
    ...(at && { at: (t: number) => moved(matrix, at(t)) }),
    ...turned,
  };
}

function sense([a, b, c, d]: Matrix): 1 | -1 {
  return a * d - b * c < 0 ? -1 : 1;
}

const STEP = /\s*(matrix|translate|scale|rotate|skewX|skewY)\s*\(([^()]*)\)\s*,?/y;
const NUMBER = /[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/g;

/** The matrix of a `transform` attribute (SVG 1.1, section 7.6); null where it is none. */
export function readTransform(text: string): Matrix | null {
  let matrix = SAME_PLACE;
  STEP.lastIndex = 0;
  while (text.slice(STEP.lastIndex).trim() !== '') {
    const [, name, inner] = STEP.exec(text) ?? [];
    if (name === undefined || inner.replace(NUMBER, '').replace(/[\s,]/g, '') !== '') return null;
    const step = stepMatrix(name, (inner.match(NUMBER) ?? []).map(Number));
    if (step === null || !step.every(Number.isFinite)) return null;
    matrix = multiply(matrix, step);
  }
  return matrix;
}

function stepMatrix(name: string, values: readonly number[]): Matrix | null {
  const [p = 0, q, r = 0] = values;
  const count = values.length;
  switch (name) {
    case 'matrix':
      return count === 6 ? (values as unknown as Matrix) : null;
    case 'translate':
      return count === 1 || count === 2 ? [1, 0, 0, 1, p, q ?? 0] : null;
    case 'scale':
      return count === 1 || count === 2 ? [p, 0, 0, q ?? p, 0, 0] : null;
    case 'rotate': {
      if (count !== 1 && count !== 3) return null;
      const [cos, sin] = [Math.cos((p * Math.PI) / 180), Math.sin((p * Math.PI) / 180)];
      const about: Matrix = [1, 0, 0, 1, q ?? 0, r];
      const back: Matrix = [1, 0, 0, 1, -(q ?? 0), -r];
      return multiply(about, multiply([cos, sin, -sin, cos, 0, 0], back));
    }
    case 'skewX':
      return count === 1 ? [1, 0, Math.tan((p * Math.PI) / 180), 1, 0, 0] : null;
    default:
      return count === 1 ? [1, Math.tan((p * Math.PI) / 180), 0, 1, 0, 0] : null;
  }
}
