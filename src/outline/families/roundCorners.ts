import type { Segment } from '../segment.ts';
import type { Loop } from '../shape.ts';

/** Corners are left sharp below this: no shop cuts finer, and on the files' grid of 1 nm a tighter arc would fold over. */
const LEAST_RADIUS_M = 1e-7;

/**
 * A closed polygon with every corner rounded by an arc that touches both edges.
 *
 * @param points flat [x0, y0, …], counter-clockwise, metres
 * @param radiusM wanted radius; a corner whose edges are too short gets the largest that fits half of each, and one that
 *   would come below a tenth of a micrometre stays sharp
 */
export function roundCorners(points: readonly number[], radiusM: number): Loop {
  const n = points.length;
  const segments: Segment[] = [];
  let pen: readonly [number, number] | null = null;
  let firstStart: readonly [number, number] | null = null;
  for (let i = 0; i < n; i += 2) {
    const before = (i + n - 2) % n;
    const after = (i + 2) % n;
    const corner = roundCorner(points, before, i, after, radiusM);
    if (pen) segments.push({ kind: 'line', from: pen, to: corner.start });
    else firstStart = corner.start;
    if (corner.arc) segments.push(corner.arc);
    pen = corner.end;
  }
  if (pen && firstStart) segments.push({ kind: 'line', from: pen, to: firstStart });
  return segments;
}

function roundCorner(points: readonly number[], before: number, at: number, after: number, radiusM: number) {
  const x = points[at];
  const y = points[at + 1];
  const backX = points[before] - x;
  const backY = points[before + 1] - y;
  const onX = points[after] - x;
  const onY = points[after + 1] - y;
  const back = Math.hypot(backX, backY);
  const on = Math.hypot(onX, onY);
  const here: readonly [number, number] = [x, y];
  const leftward = backY * onX - backX * onY;
  const turn = Math.atan2(Math.abs(leftward), -backX * onX - backY * onY);
  // The arc touches each edge at radius·tan(turn/2) from the corner.
  const perRadius = Math.tan(turn / 2);
  const radius = Math.min(radiusM, (0.499 * Math.min(back, on)) / perRadius);
  if (radius < LEAST_RADIUS_M || turn < 1e-9) return { start: here, end: here, arc: null };
  const cut = radius * perRadius;
  const start: readonly [number, number] = [x + (backX / back) * cut, y + (backY / back) * cut];
  const end: readonly [number, number] = [x + (onX / on) * cut, y + (onY / on) * cut];
  const left = leftward > 0 ? 1 : -1;
  // The centre lies at a right angle to the incoming edge, on the inner side of the turn.
  const centreX = start[0] + (left * backY * radius) / back;
  const centreY = start[1] - (left * backX * radius) / back;
  const from = Math.atan2(start[1] - centreY, start[0] - centreX);
  const arc: Segment = { kind: 'arc', centre: [centreX, centreY], radius, from, to: from + left * turn };
  return { start, end, arc };
}
