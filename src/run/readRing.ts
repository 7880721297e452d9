import type { JsonMistakes } from './jsonMistakes.ts';

/** Largest coordinate either way: a metre. */
export const MOST_MM = 1000;

/**
 * Reads one ring of a design file: at least three points [x, y] in mm, the last not repeated.
 *
 * @param key where it stands, for messages
 * @returns flat [x0, y0, x1, y1, …] in metres; empty where there was a mistake, which is noted
 */
export function readRing(value: unknown, key: string, mistakes: JsonMistakes): Float64Array {
  const nothing = new Float64Array(0);
  if (!Array.isArray(value) || value.length < 3) {
    mistakes.refuse(key, value, 'a list of at least three points [x, y]');
    return nothing;
  }
  for (const [k, point] of value.entries()) {
    if (isPoint(point)) continue;
    mistakes.refuse(`${key}[${k}]`, point, `a point [x, y] of numbers from -${MOST_MM} to ${MOST_MM} (mm)`);
    return nothing;
  }
  const ring = Float64Array.from((value as [number, number][]).flat(), (mm) => mm / 1000);
  const last = value.length - 1;
  for (let k = 0; k <= last; k++) {
    const next = k === last ? 0 : k + 1;
    if (ring[2 * k] !== ring[2 * next] || ring[2 * k + 1] !== ring[2 * next + 1]) continue;
    if (k === last) {
      mistakes.note(key, 'the first point again at the end', 'a ring whose last point is not repeated');
    } else {
      mistakes.note(`${key}[${next}]`, `the same point as [${k}]`, 'each point once');
    }
    return nothing;
  }
  return ring;
}

function isPoint(value: unknown): value is [number, number] {
  return Array.isArray(value) && value.length === 2 && value.every((mm) => isNumber(mm, -MOST_MM, MOST_MM));
}

/** Whether a value is a number from `least` to `most`, hence finite. */
export function isNumber(value: unknown, least: number, most: number): value is number {
  return typeof value === 'number' && value >= least && value <= most;
}
