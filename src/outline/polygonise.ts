import type { Segment } from './segment.ts';
import { isClosed, pointOn } from './segment.ts';
import type { Loop } from './shape.ts';

/**
 * Turns a loop into the points that go to files, on a grid of 1 nm.
 *
 * Circles and arcs about any centre keep their area, and with it the mean of ρ² along them, hence the phase: their points
 * lie a little outside of them.
 *
 * @param verticesPerTurn vertices for a whole turn of curved segments, 16 or more
 * @returns flat [x0, y0, x1, y1, …], metres
 */
export function polygonise(loop: Loop, verticesPerTurn: number): Float64Array {
  const points: number[] = [];
  const point = new Float64Array(4);
  for (const segment of loop) {
    const pieces = pieceCount(segment, verticesPerTurn);
    const stretch = equalAreaStretch(segment, pieces);
    for (let i = 0; i < pieces; i++) {
      pointOn(segment, i / pieces, point);
      if (segment.kind === 'arc' && (i > 0 || isClosed(segment))) {
        point[0] = segment.centre[0] + (point[0] - segment.centre[0]) * stretch;
        point[1] = segment.centre[1] + (point[1] - segment.centre[1]) * stretch;
      }
      const x = onGrid(point[0]);
      const y = onGrid(point[1]);
      const last = points.length - 2;
      if (last < 0 || points[last] !== x || points[last + 1] !== y) points.push(x, y);
    }
  }
  const last = points.length - 2;
  if (last > 0 && points[0] === points[last] && points[1] === points[last + 1]) points.length = last;
  return Float64Array.from(points);
}

/** Shorter chords would be steps of the grid, not of the curve. */
const LEAST_CHORD_M = 1e-8;

/** Coordinates are written in mm with six decimals: one nanometre, far below what any shop holds. */
function onGrid(metres: number): number {
  return Math.round(metres * 1e9) / 1e9;
}

/** Vertices for each of the finest waves of a curve. */
const PER_WAVE = 16;

function pieceCount(segment: Segment, verticesPerTurn: number): number {
  if (segment.kind === 'line') return 1;
  const turns = Math.abs(segment.to - segment.from) / (2 * Math.PI);
  // A polar curve bends several times in a turn, and no stretch makes up for what its chords cut off.
  const density = segment.kind === 'polar' ? 4 : 1;
  const ofWaves = segment.kind === 'polar' ? PER_WAVE * segment.folds * (segment.waves ?? 0) : 0;
  // A rounding error in the angles must not give one fold a vertex more than the next.
  const wanted = Math.ceil(turns * Math.max(verticesPerTurn * density, ofWaves) - 1e-9);
  const fitting =
    segment.kind === 'arc' ? Math.floor((turns * 2 * Math.PI * segment.radius) / LEAST_CHORD_M) : wanted;
  const pieces = Math.max(2, Math.min(wanted, fitting));
  // A whole number of vertices a fold keeps the polygon as symmetric as the curve.
  return segment.kind === 'polar' && isClosed(segment)
    ? segment.folds * Math.ceil(pieces / segment.folds)
    : pieces;
}

/** Factor on the radius of an arc's points that makes up for the area its chords cut off; the ends of an open arc stay. */
function equalAreaStretch(segment: Segment, pieces: number): number {
  if (segment.kind !== 'arc') return 1;
  const angle = Math.abs(segment.to - segment.from) / pieces;
  const lost = angle / Math.sin(angle);
  if (isClosed(segment)) return Math.sqrt(lost);
  // (n − 2) f² + 2 f = n · lost: of the n triangles about the centre, the first and the last have one end that stays.
  const between = pieces - 2;
  return between === 0 ? lost : (Math.sqrt(1 + between * pieces * lost) - 1) / between;
}
