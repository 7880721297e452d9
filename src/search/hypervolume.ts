import { RimwrightError } from '../base/errors.ts';

/**
 * Exact hypervolume: the measure of all that the points dominate inside the corner spanned by a reference
 * point. Smaller objectives are better; a larger hypervolume is a better front. (Zitzler & Thiele (1999),
 * IEEE Trans. Evol. Comput. 3, 257.)
 *
 * @param points rows of two or three objectives, in any order, dominated ones and repeats allowed; a point
 * that does not beat the reference in every objective adds nothing
 * @param reference two or three finite numbers
 * @throws RimwrightError `input` at another number of objectives, NaN or −Infinity
 */
export function hypervolume(points: readonly (readonly number[])[], reference: readonly number[]): number {
  if ((reference.length !== 2 && reference.length !== 3) || !reference.every(Number.isFinite)) {
    throw new RimwrightError(
      'input',
      `reference: found [${reference.join(', ')}], expected 2 or 3 finite numbers`,
    );
  }
  for (const [k, point] of points.entries()) {
    if (point.length !== reference.length || !point.every((x) => x > Number.NEGATIVE_INFINITY)) {
      throw new RimwrightError(
        'input',
        `points[${k}]: found [${point.join(', ')}], expected ${reference.length} numbers`,
      );
    }
  }
  const inside = points.filter((point) => point.every((x, j) => x < reference[j]));
  return reference.length === 2 ? area(inside, reference) : volume(inside, reference);
}

/** Strips from one step of the staircase to the next, the first objective rising. */
function area(points: readonly (readonly number[])[], reference: readonly number[]): number {
  const sorted = points.toSorted((a, b) => a[0] - b[0]);
  let sum = 0;
  let height = reference[1];
  for (const [x, y] of sorted) {
    if (y >= height) continue;
    sum += (reference[0] - x) * (height - y);
    height = y;
  }
  return sum;
}

/** Slices between successive values of the third objective, each the area of the points below it. */
function volume(points: readonly (readonly number[])[], reference: readonly number[]): number {
  const sorted = points.toSorted((a, b) => a[2] - b[2]);
  let sum = 0;
  let stairs: (readonly number[])[] = [];
  for (const [k, point] of sorted.entries()) {
    const isCovered = stairs.some((step) => step[0] <= point[0] && step[1] <= point[1]);
    if (!isCovered) {
      stairs = stairs.filter((step) => step[0] < point[0] || step[1] < point[1]);
      stairs.push(point);
    }
    const top = sorted[k + 1]?.[2] ?? reference[2];
    if (top > point[2]) sum += area(stairs, reference) * (top - point[2]);
  }
  return sum;
}
