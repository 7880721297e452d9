import { isFree, startsInside } from './diagonal.ts';

/**
 * One ring around an opening with holes: a straight slit of no width joins each hole to the rest. Area stays as it is.
 *
 * @param outer counter-clockwise, flat [x0, y0, x1, y1, …]
 * @param holes clockwise, within `outer`, apart from each other
 */
export function keyholed(outer: Float64Array, holes: readonly Float64Array[]): Float64Array {
  // From the hole that reaches farthest to the right: nothing but the ring made so far is to the right of it
  // (Eberly, Triangulation by Ear Clipping, 2002).
  const waiting = holes
    .map((hole) => ({ hole, at: rightmost(hole) }))
    .sort((a, b) => b.hole[b.at] - a.hole[a.at]);
  let ring = outer;
  waiting.forEach(({ hole, at }, k) => {
    const others = waiting.slice(k).map((one) => one.hole);
    ring = joined(ring, nearestSeen(ring, hole, at, others), hole, at);
  });
  return ring;
}

function rightmost(ring: Float64Array): number {
  let best = 0;
  for (let i = 2; i < ring.length; i += 2) if (ring[i] > ring[best]) best = i;
  return best;
}

/** The nearest vertex of the ring that a hole's vertex sees. */
function nearestSeen(
  ring: Float64Array,
  hole: Float64Array,
  at: number,
  others: readonly Float64Array[],
): number {
  const [x, y] = [hole[at], hole[at + 1]];
  const far = (i: number) => (ring[i] - x) ** 2 + (ring[i + 1] - y) ** 2;
  const order = Array.from({ length: ring.length / 2 }, (_, k) => 2 * k).sort((i, j) => far(i) - far(j));
  const seen = order.find(
    (i) =>
      startsInside(ring, i, x, y) &&
      startsInside(hole, at, ring[i], ring[i + 1]) &&
      isFree(ring[i], ring[i + 1], x, y, ring) &&
      others.every((other) => isFree(ring[i], ring[i + 1], x, y, other)),
  );
  // There is always one; should rounding have made a hole touch its surroundings, the nearest will do.
  return seen ?? order[0];
}

/** The ring up to vertex `i`, around the hole from vertex `at` back to it, and on from vertex `i`. */
function joined(ring: Float64Array, i: number, hole: Float64Array, at: number): Float64Array {
  const made = new Float64Array(ring.length + hole.length + 4);
  made.set(ring.subarray(0, i + 2));
  made.set(hole.subarray(at), i + 2);
  made.set(hole.subarray(0, at + 2), i + 2 + hole.length - at);
  made.set(ring.subarray(i), i + 4 + hole.length);
  return made;
}
