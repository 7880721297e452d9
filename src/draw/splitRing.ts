import { isFree, startsInside } from './diagonal.ts';

/** Ways to share out vertices that are tried, from halves on. */
const WAYS = 24;
/** Vertices that are tried for each way, before more of them. */
const BATCH = 8;

/**
 * Cuts a ring along diagonals between its vertices until no part has more than `most`. No vertex is added or moved, so the parts have the
 * ring's area exactly.
 *
 * @param ring counter-clockwise, flat [x0, y0, x1, y1, …]; it may run to and fro along slits
 * @param most at least 4
 */
export function splitRing(ring: Float64Array, most: number): Float64Array[] {
  if (ring.length / 2 <= most) return [ring];
  const [from, to] = findDiagonal(ring);
  const one = ring.slice(2 * from, 2 * to + 2);
  const other = new Float64Array(ring.length - one.length + 4);
  other.set(ring.subarray(2 * to));
  other.set(ring.subarray(0, 2 * from + 2), ring.length - 2 * to);
  return [...splitRing(one, most), ...splitRing(other, most)];
}

/** Two vertices that see each other, as many on one side as on the other as far as is soon found. */
function findDiagonal(ring: Float64Array): [from: number, to: number] {
  const count = ring.length / 2;
  const spans = Array.from({ length: WAYS }, (_, k) => Math.floor((count / 2) * (1 - k / WAYS)));
  const stride = scatteringStride(count);
  for (let first = 0; first < count; first += BATCH) {
    for (const span of spans.filter((one) => one > 2)) {
      for (let k = first; k < Math.min(count, first + BATCH); k++) {
        const i = (k * stride) % count;
        const j = (i + span) % count;
        if (isDiagonal(ring, 2 * i, 2 * j)) return i < j ? [i, j] : [j, i];
      }
    }
  }
  // A triangle can always be cut off a ring (Meisters, 1975).
  for (let i = 0; i < count; i++) {
    const j = (i + 2) % count;
    if (isDiagonal(ring, 2 * i, 2 * j)) return i < j ? [i, j] : [j, i];
  }
  // Only rings that cross themselves come here: a cut in two keeps at least their vertices.
  return [0, Math.floor(count / 2)];
}

/** Neighbours see much the same, so one after the other is tried far from the one before: steps near the golden section reach all. */
function scatteringStride(count: number): number {
  const divisor = (a: number, b: number): number => (b === 0 ? a : divisor(b, a % b));
  let stride = Math.max(1, Math.round(0.618 * count));
  while (divisor(count, stride) !== 1) stride++;
  return stride;
}

function isDiagonal(ring: Float64Array, i: number, j: number): boolean {
  const [ax, ay, bx, by] = [ring[i], ring[i + 1], ring[j], ring[j + 1]];
  if (ax === bx && ay === by) return false;
  return startsInside(ring, i, bx, by) && startsInside(ring, j, ax, ay) && isFree(ax, ay, bx, by, ring);
}
