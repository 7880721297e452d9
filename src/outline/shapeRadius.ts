import type { Segment } from './segment.ts';
import { isClosed, pointOn } from './segment.ts';
import type { Shape } from './shape.ts';

/** Probes of a segment, and of each of its finest waves. */
const PROBES = 66;
const PER_WAVE = 5;

/** Radius of the circle about the axis around a shape, metres; curves are probed and the best probe refined, to 1e-6 or so. */
export function shapeRadius(shape: Shape): number {
  let squared = 0;
  for (const { loops } of shape.elements) {
    for (const loop of loops)
      for (const segment of loop) squared = Math.max(squared, farthestSquared(segment));
  }
  return Math.sqrt(squared);
}

function farthestSquared(segment: Segment): number {
  const point = new Float64Array(4);
  const squaredAt = (t: number) => {
    pointOn(segment, t, point);
    return point[0] * point[0] + point[1] * point[1];
  };
  if (segment.kind === 'line') return Math.max(squaredAt(0), squaredAt(1));
  if (segment.kind === 'arc' && segment.centre[0] === 0 && segment.centre[1] === 0)
    return segment.radius ** 2;
  // A repeating curve need only be searched over one of its folds.
  const span = segment.kind === 'polar' ? 1 / segment.folds : 1;
  // A closed curve goes on beyond its ends.
  const within = (t: number) => (isClosed(segment) ? t : Math.min(span, Math.max(0, t)));
  const probes = Math.max(PROBES, PER_WAVE * ((segment.kind === 'polar' && segment.waves) || 0));
  let best = 0;
  let place = 0;
  for (let i = 0; i <= probes; i++) {
    const value = squaredAt((span * i) / probes);
    if (value > best) {
      best = value;
      place = (span * i) / probes;
    }
  }
  // Parabolas through the best place and its neighbours, ever closer together.
  for (let step = span / probes; step > 1e-3 * span; step /= 4) {
    const before = squaredAt(within(place - step));
    const after = squaredAt(within(place + step));
    const bend = before - 2 * best + after;
    const shift = bend < 0 ? (step * (before - after)) / (2 * bend) : 0;
    const moved = within(place + shift);
    const value = squaredAt(moved);
    if (value > best) {
      best = value;
      place = moved;
    }
  }
  return best;
}
