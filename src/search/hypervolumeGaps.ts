import { ascending } from './ascending.ts';
import { checkHypervolumeInput, firstAtLeast } from './hypervolume.ts';

/** A place where a front leaves room: all that is below the corner is dominated by no point of the front. */
export interface Gap {
  corner: number[];
  /** For each objective the point that holds the corner there: its index, or −1 where that is the reference. */
  holders: number[];
}

/**
 * The gaps of a front: the largest corners below which no point lies. A point brings hypervolume if and only if it lies
 * below one of them; about two times as many as points for three objectives, one more than points for two.
 * (Local upper bounds: Klamroth, Lacour & Vanderpooten (2015), Eur. J. Oper. Res. 245, 767, found by a sweep here.)
 *
 * @param front rows of two or three objectives, none of which dominates another; what does not beat the reference is left out
 * @param reference finite
 * @throws RimwrightError `input` at another number of objectives, NaN or −Infinity
 */
export function hypervolumeGaps(
  front: readonly (readonly number[])[],
  reference: readonly number[],
): Gap[] {
  checkHypervolumeInput(front, reference);
  const last = reference.length - 1;
  const order = [...front.keys()]
    .filter((k) => front[k].every((x, j) => x < reference[j]))
    .sort((a, b) => ascending(front[a][last], front[b][last]));
  return last === 1 ? flatGaps(front, reference, order) : deepGaps(front, reference, order);
}

/** Between each two neighbours, the second objective rising, and beyond both ends. */
function flatGaps(
  front: readonly (readonly number[])[],
  reference: readonly number[],
  order: readonly number[],
): Gap[] {
  return Array.from({ length: order.length + 1 }, (_, i) => {
    const [low, high] = [order[i - 1] ?? -1, order[i] ?? -1];
    return {
      corner: [front[low]?.[0] ?? reference[0], front[high]?.[1] ?? reference[1]],
      holders: [low, high],
    };
  });
}

/** An inner corner of the stairs of the first two objectives ends where a point of larger third objective covers it. */
function deepGaps(
  front: readonly (readonly number[])[],
  reference: readonly number[],
  order: readonly number[],
): Gap[] {
  const gaps: Gap[] = [];
  // The steps, x rising and y falling, between two outermost ones; corner i lies between steps i and i + 1.
  const xs = [Number.NEGATIVE_INFINITY, reference[0]];
  const ys = [reference[1], Number.NEGATIVE_INFINITY];
  const points = [-1, -1];
  const since = [Number.NEGATIVE_INFINITY];
  const close = (i: number, z: number, holder: number) => {
    if (z > since[i]) {
      gaps.push({ corner: [xs[i + 1], ys[i], z], holders: [points[i + 1], points[i], holder] });
    }
  };
  for (const k of order) {
    const [x, y, z] = front[k];
    const first = firstAtLeast(xs, x);
    if (ys[first - 1] <= y || (xs[first] === x && ys[first] <= y)) continue;
    let end = first;
    while (ys[end] >= y) end++;
    // Equal coordinates leave an outer corner where it was.
    const left = xs[first] === x ? since[first - 1] : z;
    const right = ys[end - 1] === y ? since[end - 1] : z;
    for (let i = first - 1; i < end; i++) {
      if (!(i === first - 1 && left < z) && !(i === end - 1 && right < z)) close(i, z, k);
    }
    xs.splice(first, end - first, x);
    ys.splice(first, end - first, y);
    points.splice(first, end - first, k);
    since.splice(first - 1, end - first + 1, left, right);
  }
  for (let i = 0; i + 1 < xs.length; i++) close(i, reference[2], -1);
  return gaps;
}
