import { arcGeometry, arcLoopArea, arcPieces } from '../outline/arcLoop.ts';
import { ringArea } from '../outline/area.ts';
import type { JsonMistakes } from './jsonMistakes.ts';
import { isNumber, MOST_MM } from './readRing.ts';

/** Arcs of more than this bulge are almost whole circles, which are to be halved. */
const LARGEST_BULGE = 10;
/** How far curves and points may differ: in area, with the points' grid of 1 nm, and in each side of the box, in parts of its size. */
const AREA_SHARE = 1e-5;
const GRID_M = 1e-9;
const BOX_SHARE = 1e-3;

/**
 * Reads the exact curves that stand beside the rings of a design's element: for each ring a list of at least two vertices
 * [x, y, bulge] (see `outline/arcLoop.ts`), in mm. They must be the same outline as the points.
 *
 * @param rings as they were read, empty where there was a mistake
 * @param key where the curves stand, for messages
 * @returns flat [x0, y0, bulge0, …] in metres; null where there was a mistake, which is noted
 */
export function readCurves(
  value: unknown,
  rings: readonly Float64Array[],
  key: string,
  mistakes: JsonMistakes,
): Float64Array[] | null {
  if (!Array.isArray(value) || value.length !== rings.length) {
    mistakes.refuse(key, value, `a list with a curve for each of the ${rings.length} rings`);
    return null;
  }
  const curves = value.map((curve: unknown, r) => readCurve(curve, rings[r], `${key}[${r}]`, mistakes));
  return curves.every((curve) => curve !== null) ? curves : null;
}

function readCurve(
  value: unknown,
  ring: Float64Array,
  key: string,
  mistakes: JsonMistakes,
): Float64Array | null {
  if (!Array.isArray(value) || value.length < 2) {
    mistakes.refuse(key, value, 'a list of at least two vertices [x, y, bulge]');
    return null;
  }
  const odd = value.findIndex((vertex) => !isVertex(vertex));
  if (odd >= 0) {
    const expected = `[x, y, bulge], x and y from -${MOST_MM} to ${MOST_MM} (mm), bulge from -${LARGEST_BULGE} to ${LARGEST_BULGE}`;
    mistakes.refuse(`${key}[${odd}]`, value[odd], expected);
    return null;
  }
  const loop = Float64Array.from((value as number[][]).flat(), (number, i) =>
    i % 3 === 2 ? number : number / 1000,
  );
  if (ring.length > 0 && !isSameOutline(loop, ring)) {
    mistakes.note(key, 'a curve beside its points', 'the curve of which rings_mm are the points');
    return null;
  }
  return loop;
}

function isVertex(value: unknown): boolean {
  return (
    Array.isArray(value) &&
    value.length === 3 &&
    value.every((number, i) =>
      i === 2 ? isNumber(number, -LARGEST_BULGE, LARGEST_BULGE) : isNumber(number, -MOST_MM, MOST_MM),
    )
  );
}

/** Whether a curve has the area of its points, the same box around it, and the same sense of rotation. */
function isSameOutline(loop: Float64Array, ring: Float64Array): boolean {
  const area = ringArea(ring);
  const own = boxOf(curvePoints(loop));
  const box = boxOf(ring);
  const size = Math.max(box[2] - box[0], box[3] - box[1]);
  const allowed = AREA_SHARE * Math.abs(area) + GRID_M * size;
  if (!(Math.abs(arcLoopArea(loop) - area) <= allowed)) return false;
  return own.every((side, i) => Math.abs(side - box[i]) <= BOX_SHARE * size);
}

/** Points on a curve, close enough together to tell how far it reaches. */
function curvePoints(loop: Float64Array): number[] {
  return arcPieces(loop).flatMap((piece) => {
    if (piece.bulge === 0) return [...piece.from];
    const { centre, radius, start, span } = arcGeometry(piece);
    const count = Math.ceil(Math.abs(span) / 0.03) + 1;
    return Array.from({ length: count }, (_, k) => start + (k * span) / count).flatMap((angle) => [
      centre[0] + radius * Math.cos(angle),
      centre[1] + radius * Math.sin(angle),
    ]);
  });
}

/** [left, bottom, right, top]. */
function boxOf(points: ArrayLike<number>): number[] {
  const box = [Infinity, Infinity, -Infinity, -Infinity];
  for (let i = 0; i < points.length; i++) {
    box[i % 2] = Math.min(box[i % 2], points[i]);
    box[2 + (i % 2)] = Math.max(box[2 + (i % 2)], points[i]);
  }
  return box;
}
