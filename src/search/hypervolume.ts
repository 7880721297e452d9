import { RimwrightError } from '../base/errors.ts';

/**
 * Exact hypervolume: the measure of all that the points dominate inside the corner spanned by a reference
 * point. Smaller objectives are better; a larger hypervolume is a better front. (Zitzler & Thiele (1999),
 * IEEE Trans. Evol. Comput. 3, 257.)
 *
 * Three objectives are swept along the third, with the stairs of the first two kept in order: n log n
 * comparisons (Beume, Fonseca, López-Ibáñez, Paquete & Vahrenhold (2009), IEEE Trans. Evol. Comput. 13, 1075).
 *
 * @param points rows of two or three objectives, in any order, dominated ones and repeats allowed; a point
 * that does not beat the reference in every objective adds nothing
 * @param reference two or three finite numbers
 * @throws RimwrightError `input` at another number of objectives, NaN or −Infinity
 */
export function hypervolume(points: readonly (readonly number[])[], reference: readonly number[]): number {
  checkHypervolumeInput(points, reference);
  const inside = points.filter((point) => point.every((x, j) => x < reference[j]));
  const sorted = inside.toSorted((a, b) => a[a.length - 1] - b[b.length - 1]);
  return reference.length === 2 ? area(sorted, reference) : volume(sorted, reference);
}

/**
 * Refuses what has no hypervolume.
 *
 * @throws RimwrightError `input`
 */
export function checkHypervolumeInput(
  points: readonly (readonly number[])[],
  reference: readonly number[],
): void {
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
}

/** Strips from one step of the staircase to the next, the second objective rising. */
function area(sorted: readonly (readonly number[])[], reference: readonly number[]): number {
  let sum = 0;
  let right = reference[0];
  for (const [x, y] of sorted) {
    if (x >= right) continue;
    sum += (right - x) * (reference[1] - y);
    right = x;
  }
  return sum;
}

/** Slices between successive values of the third objective, each as large as the area of the points below it. */
function volume(sorted: readonly (readonly number[])[], reference: readonly number[]): number {
  const stairs = new Stairs(reference);
  let sum = 0;
  let slice = 0;
  for (const [k, [x, y, z]] of sorted.entries()) {
    slice += stairs.add(x, y);
    sum += slice * ((sorted[k + 1]?.[2] ?? reference[2]) - z);
  }
  return sum;
}

/** The edge of what points of a plane dominate: steps with x rising and y falling, an outermost one at either end. */
class Stairs {
  private readonly x: number[];
  private readonly y: number[];

  constructor([x, y]: readonly number[]) {
    this.x = [Number.NEGATIVE_INFINITY, x];
    this.y = [y, Number.NEGATIVE_INFINITY];
  }

  /** Adds a point and returns the area that it alone brings. */
  add(x: number, y: number): number {
    const first = firstAtLeast(this.x, x);
    if (this.y[first - 1] <= y || (this.x[first] === x && this.y[first] <= y)) return 0;
    let gained = 0;
    let left = x;
    let top = this.y[first - 1];
    let end = first;
    for (; this.y[end] >= y; end++) {
      gained += (this.x[end] - left) * (top - y);
      left = this.x[end];
      top = this.y[end];
    }
    gained += (this.x[end] - left) * (top - y);
    this.x.splice(first, end - first, x);
    this.y.splice(first, end - first, y);
    return gained;
  }
}

/** Index of the first of some rising numbers that is not below `value`; their count where all are. */
export function firstAtLeast(rising: readonly number[], value: number): number {
  let low = 0;
  let high = rising.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (rising[middle] >= value) high = middle;
    else low = middle + 1;
  }
  return low;
}
