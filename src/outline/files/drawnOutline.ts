import { inputError } from '../../base/errors.ts';
import { isCurved } from '../arcLoop.ts';
import { ringArea } from '../area.ts';
import { orientElement } from '../nesting.ts';
import { findRingsCrossing } from '../selfCrossing.ts';
import type { OutlineElement } from '../shape.ts';
import type { Curve } from './curve.ts';
import type { DrawnElement, DrawnPath, Place } from './drawnPath.ts';
import { LARGEST_M, MOST_VERTICES, pointText, refuseAt, refuseManyRings } from './drawnPath.ts';
import { flattenCurve } from './flatten.ts';

/** How far chords may lie off a curve, in parts of the drawing's size: as far as the 1440 sides of a polygon do off a circle. */
const SAG = (Math.PI / 1440) ** 2 / 2;
/** And in parts of the ring's own size, so that a small ring beside the axis is round as well. */
const OWN_SAG = (Math.PI / 180) ** 2 / 2;
/** No ring with a smaller share of its length squared as its area is meant as an opening. */
const LEAST_AREA_SHARE = 1e-9;

/** What a file of any format holds. */
export interface ReadOutline {
  elements: OutlineElement[];
  /** What its reader should know, such as the unit that was taken. */
  notes: string[];
}

/** Largest distance of any path from the origin, metres, to a percent. */
export function drawingSize(paths: readonly DrawnPath[], file: string): number {
  let size = 0;
  for (const { curves, place } of paths) {
    for (const point of curves.flatMap(probes)) {
      if (point.some((value) => !(Math.abs(value) <= LARGEST_M))) {
        const found = point.every(Number.isFinite)
          ? `${place.name} reaching ${pointText(point)}`
          : place.name;
        refuseAt(file, place, found, 'x and y between -1000 and 1000 mm');
      }
      size = Math.max(size, Math.hypot(point[0], point[1]));
    }
  }
  return size;
}

function probes({ from, to, at }: Curve) {
  return at === undefined ? [from, to] : [from, at(0.2), at(0.4), at(0.6), at(0.8), to];
}

/**
 * The outline that closed paths enclose: curves become points that keep the area to 1e-7, outer rings run counter-clockwise and holes
 * clockwise by their nesting, and what consists of straight edges and arcs keeps these exactly.
 *
 * @throws RimwrightError `input` for no path, rings without area, that cross or touch themselves or each other, or of too many points
 */
export function outlineOf(drawn: readonly DrawnElement[], file: string): OutlineElement[] {
  if (drawn.every(({ loops }) => loops.length === 0)) {
    throw inputError([{ file, found: 'no outline', expected: 'at least one closed curve' }]);
  }
  refuseManyRings(
    drawn.reduce((sum, { loops }) => sum + loops.length, 0),
    file,
  );
  const sizeM = drawingSize(
    drawn.flatMap(({ loops }) => loops),
    file,
  );
  let left = MOST_VERTICES;
  return drawn
    .filter(({ loops }) => loops.length > 0)
    .map(({ weight, loops }) => {
      const rings = loops.map((loop) => {
        const ring = ringOf(loop, sizeM, left, file);
        left -= ring.length / 2;
        return ring;
      });
      refuseCrossing(rings, loops, file);
      rings.forEach((ring, r) => {
        refuseEmpty(ring, loops[r].place, file);
      });
      const curves = loops.map(({ curves: pieces }) => arcsOf(pieces));
      const isExact = curves.every((loop) => loop !== null) && curves.some((loop) => loop && isCurved(loop));
      return orientElement({ weight, rings, ...(isExact && { curves: curves as Float64Array[] }) });
    });
}

function ringOf({ curves, place }: DrawnPath, sizeM: number, most: number, file: string): Float64Array {
  const box = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of curves.flatMap(probes)) {
    box[0] = Math.min(box[0], x);
    box[1] = Math.min(box[1], y);
    box[2] = Math.max(box[2], x);
    box[3] = Math.max(box[3], y);
  }
  const width = Math.hypot(box[2] - box[0], box[3] - box[1]);
  const sagM = Math.min(SAG * sizeM, (OWN_SAG * width) / 2);
  const points: number[] = [];
  for (const curve of curves) {
    const piece = flattenCurve(curve, sagM, most - points.length / 2);
    if (piece === null || points.length + piece.length > 2 * most) {
      throw inputError([
        { file, found: `more than ${MOST_VERTICES} points`, expected: `at most ${MOST_VERTICES} points` },
      ]);
    }
    addPoints(points, piece);
  }
  const last = points.length - 2;
  if (last > 0 && points[0] === points[last] && points[1] === points[last + 1]) points.length = last;
  if (points.length < 6) refuseEmpty(Float64Array.from(points), place, file);
  return Float64Array.from(points);
}

function refuseEmpty(ring: Float64Array, place: Place, file: string): void {
  const perimeter = ring.reduce(
    (sum, x, i) =>
      i % 2 === 1
        ? sum
        : sum + Math.hypot(ring[(i + 2) % ring.length] - x, ring[(i + 3) % ring.length] - ring[i + 1]),
    0,
  );
  if (ring.length >= 6 && Math.abs(ringArea(ring)) > LEAST_AREA_SHARE * perimeter * perimeter) return;
  refuseAt(file, place, `no area within ${place.name}`, 'outlines that enclose an area');
}

/** Adds points, leaving out those that repeat the one before. */
function addPoints(points: number[], added: readonly number[]): void {
  for (let i = 0; i < added.length; i += 2) {
    const last = points.length - 2;
    if (last < 0 || points[last] !== added[i] || points[last + 1] !== added[i + 1]) {
      points.push(added[i], added[i + 1]);
    }
  }
}

/** The straight edges and arcs of a closed path; null where another curve is in it. */
function arcsOf(curves: readonly Curve[]): Float64Array | null {
  if (curves.some(({ bulge }) => bulge === undefined)) return null;
  return Float64Array.from(curves.flatMap(({ from, bulge }) => [...from, bulge ?? 0]));
}

function refuseCrossing(rings: readonly Float64Array[], loops: readonly DrawnPath[], file: string): void {
  const crossing = findRingsCrossing(rings);
  if (crossing === null) return;
  const { ringI, ringJ, x, y } = crossing;
  const [own, other] = [loops[ringI].place, loops[ringJ].place];
  const met = own.name === other.name ? 'itself' : other.name;
  refuseAt(
    file,
    own,
    `${own.name} meeting ${met} at ${pointText([x, y])}`,
    'outlines that do not cross or touch themselves or each other',
  );
}
