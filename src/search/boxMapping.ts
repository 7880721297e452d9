import type { Box } from './box.ts';

/**
 * Maps any real point smoothly into the box, so that CMA-ES can draw from an unbounded normal distribution.
 *
 * Well inside the box the map is the identity. Within a margin of a bound it bends into a parabola whose
 * vertex lies on the bound, and from there on it runs back as in a mirror. Why not resampling: near a bound
 * that would cut the distribution and pull it inwards, while the best designs often lie on a bound. Here
 * such an optimum becomes the smooth bottom of a valley, and each point of the box stays reachable.
 *
 * The margin is a twentieth of the box's width, or `step` where only one bound is there.
 */
export class BoxMapping {
  private readonly box: Box;
  private readonly margin: Float64Array;

  /** @param step a length for each coordinate, above 0: the first standard deviation of the search */
  constructor(box: Box, step: Float64Array) {
    this.box = box;
    this.margin = step.map((length, i) => {
      const width = box.upper[i] - box.lower[i];
      return Number.isFinite(width) ? width / 20 : length;
    });
  }

  /** The point of the box that stands for coordinate i of a free point. */
  inside(free: number, i: number): number {
    const [low, high, margin] = [this.box.lower[i], this.box.upper[i], this.margin[i]];
    const first = low - margin;
    const last = high + margin;
    let x = free;
    if (free < first || free > last) {
      // Two mirrors repeat with twice the distance between them; one does not.
      const period = 2 * (last - first);
      const beyond = free < first ? first - free : free - last;
      const folded = beyond % period;
      const depth = folded > period / 2 ? period - folded : folded;
      x = free < first ? first + depth : last - depth;
    }
    if (x < low + margin) x = low + (x - first) ** 2 / (4 * margin);
    else if (x > high - margin) x = high - (x - last) ** 2 / (4 * margin);
    // Rounding alone could step over a bound here.
    return Math.min(high, Math.max(low, x));
  }

  /** The free point nearest the box's middle that maps to coordinate i of x (inside the box). */
  free(x: number, i: number): number {
    const [low, high, margin] = [this.box.lower[i], this.box.upper[i], this.margin[i]];
    if (x < low + margin) return low - margin + 2 * Math.sqrt(margin * (x - low));
    if (x > high - margin) return high + margin - 2 * Math.sqrt(margin * (high - x));
    return x;
  }
}
