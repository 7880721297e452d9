import { isFree, startsInside } from './diagonal.ts';

/** Ways to share out vertices that are tried at every vertex, from halves on. */
const WAYS = 24;

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

/** Two vertices that see each other, as many on one side as on the other as far as possible. */
function findDiagonal(ring: Float64Array): [from: number, to: number] {
  const count = ring.length / 2;
  // In the end a triangle can always be cut off a ring (Meisters, 1975).
  const spans = Array.from({ length: WAYS }, (_, k) => Math.floor((count / 2) * (1 - k / WAYS)));
  for (const span of [...spans.filter((one) => one > 2), 2]) {
    for (let i = 0; i < count; i++) {
      const j = (i + span) % count;
      if (isDiagonal(ring, 2 * i, 2 * j)) return i < j ? [i, j] : [j, i];
    }
  }
  // Only rings that cross themselves come here: a cut in two keeps at least their vertices.
  return [0, Math.floor(count / 2)];
}

function isDiagonal(ring: Float64Array, i: number, j: number): boolean {
  const [ax, ay, bx, by] = [ring[i], ring[i + 1], ring[j], ring[j + 1]];
  if (ax === bx && ay === by) return false;
  return startsInside(ring, i, bx, by) && startsInside(ring, j, ax, ay) && isFree(ax, ay, bx, by, ring);
}
