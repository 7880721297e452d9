import { arcLoopArea, arcLoopOf, isCurved } from './arcLoop.ts';
import { ringArea } from './area.ts';
import { polygonise } from './polygonise.ts';
import type { OutlineElement, Shape } from './shape.ts';

/**
 * A shape as it goes to files: points, and beside them its straight edges and arcs where it has only these.
 *
 * @param verticesPerTurn as for `polygonise`
 */
export function shapePoints(shape: Shape, verticesPerTurn: number): OutlineElement[] {
  return shape.elements.map(({ weight, loops, distanceM, share }) => {
    const rings = loops.map((loop) => polygonise(loop, verticesPerTurn));
    const curves = loops.map(arcLoopOf).filter((loop) => loop !== null);
    // Of an outline of straight edges alone the points say it all.
    const isExact = curves.length === loops.length && curves.some(isCurved);
    return {
      weight,
      ...(distanceM !== undefined && { distanceM }),
      ...(share !== undefined && { share }),
      rings,
      ...(isExact && { curves: curves.map((loop, r) => fitted(loop, rings[r])) }),
    };
  });
}

/**
 * A loop of the area that its points have on their grid of 1 nm: what is judged and what is cut must not differ. The grid takes or gives
 * some 1e-6 of an area, which is a tenth of a nanometre at the edge.
 */
function fitted(loop: Float64Array, ring: Float64Array): Float64Array {
  const scale = Math.sqrt(ringArea(ring) / arcLoopArea(loop));
  // About its own middle, so that thin pieces beside the axis stay where they are.
  const middle = centroid(ring);
  return loop.map((value, i) => (i % 3 === 2 ? value : middle[i % 3] + (value - middle[i % 3]) * scale));
}

/** Centre of the area within a ring. */
function centroid(ring: Float64Array): [x: number, y: number] {
  let [x, y] = [0, 0];
  const n = ring.length;
  for (let i = 0, j = n - 2; i < n; j = i, i += 2) {
    const cross = ring[j] * ring[i + 1] - ring[i] * ring[j + 1];
    x += (ring[j] + ring[i]) * cross;
    y += (ring[j + 1] + ring[i + 1]) * cross;
  }
  const area = ringArea(ring);
  return [x / (6 * area), y / (6 * area)];
}
