/**
 * How many of 0, 1, 2 … `count` − 1 come before a condition fails, by bisection.
 *
 * @param holds true up to some number, and false from there on
 */
export function countWhile(count: number, holds: (i: number) => boolean): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (holds(middle)) low = middle + 1;
    else high = middle;
  }
  return low;
}
