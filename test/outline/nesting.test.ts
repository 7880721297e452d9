import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ringArea } from '../../src/outline/area.ts';
import { orientByNesting } from '../../src/outline/nesting.ts';

/** A square of the given half side about (x, y), counter-clockwise. */
const square = (half: number, x = 0, y = 0) =>
  Float64Array.of(x - half, y - half, x + half, y - half, x + half, y + half, x - half, y + half);

const turned = (ring: Float64Array) =>
  Float64Array.from({ length: ring.length }, (_, i) => ring[ring.length - 2 - 2 * (i >> 1) + (i & 1)]);

describe('orientByNesting', () => {
  it('turns rings by their depth, whichever way and in whichever order they come', () => {
    // Outer, hole, piece in the hole, hole in that piece; and a second outer ring beside them.
    const rings = [square(4), square(3), square(2), square(1), square(1, 9, 0)];
    const signs = [1, -1, 1, -1, 1];
    fc.assert(
      fc.property(
        fc.array(fc.boolean(), { minLength: 5, maxLength: 5 }),
        fc.shuffledSubarray([0, 1, 2, 3, 4], { minLength: 5 }),
        (turns, order) => {
          const given = order.map((k) => (turns[k] ? turned(rings[k]) : rings[k]));
          const oriented = orientByNesting(given);
          expect(oriented.map((ring) => Math.sign(ringArea(ring)))).toEqual(order.map((k) => signs[k]));
          expect(oriented.map((ring) => Math.abs(ringArea(ring)))).toEqual(
            given.map((ring) => Math.abs(ringArea(ring))),
          );
        },
      ),
    );
  });

  it('keeps the first point, and rings that run the right way as they are', () => {
    const [kept, hole] = orientByNesting([square(2), square(1)]);
    expect(kept).toEqual(square(2));
    expect(Array.from(hole)).toEqual([-1, -1, -1, 1, 1, 1, 1, -1]);
  });

  it('is not misled by corners at the height of the point that is asked for', () => {
    // The ray from the first point of the inner ring passes through corners of the outer one.
    const star = Float64Array.of(-4, -4, 4, -4, 2, 0, 4, 4, -4, 4, -2, 0);
    const inner = Float64Array.of(0, 0, 0.5, -0.5, 1, 0);
    const beside = Float64Array.of(3, 0, 3.5, -0.2, 3.5, 0.2);
    const signs = orientByNesting([star, inner, beside]).map((ring) => Math.sign(ringArea(ring)));
    expect(signs).toEqual([1, -1, 1]);
  });
});
