import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { orientation } from '../../src/outline/orientation.ts';

/** The plain formula in whole numbers, where nothing is rounded. */
function exactly(ax: bigint, ay: bigint, bx: bigint, by: bigint, cx: bigint, cy: bigint): number {
  const determinant = (ax - cx) * (by - cy) - (ay - cy) * (bx - cx);
  return determinant > 0n ? 1 : determinant < 0n ? -1 : 0;
}

describe('orientation', () => {
  it('tells left from right and from on the line', () => {
    expect(orientation(0, 0, 1, 0, 0, 1)).toBe(1);
    expect(orientation(0, 0, 1, 0, 0, -1)).toBe(-1);
    expect(orientation(0, 0, 1, 0, 5, 0)).toBe(0);
  });

  // Kettner, Mehlhorn, Pion, Schirra & Yap (2008), Computational Geometry 40, 61: near the line through (12, 12) and
  // (24, 24) the rounded determinant is wrong at many points of this grid.
  it('is exact where the rounded determinant is not', () => {
    let wrongWhenRounded = 0;
    for (let i = 0; i < 32; i++) {
      for (let j = 0; j < 32; j++) {
        const [x, y] = [0.5 + i * 2 ** -53, 0.5 + j * 2 ** -53];
        const exact = Math.sign(y - x); // doubles near each other subtract exactly
        expect(orientation(x, y, 12, 12, 24, 24) + 0).toBe(exact);
        const rounded = (x - 24) * (12 - 24) - (y - 24) * (12 - 24);
        if (Math.sign(rounded) !== exact) wrongWhenRounded++;
      }
    }
    expect(wrongWhenRounded).toBeGreaterThan(50);
  });

  it('agrees with whole numbers, however large and however near a line', () => {
    const large = fc.integer({ min: -(2 ** 42), max: 2 ** 42 });
    const small = fc.integer({ min: -2, max: 2 });
    const factor = fc.integer({ min: -500, max: 500 });
    fc.assert(
      fc.property(large, large, factor, small, small, (x, y, times, dx, dy) => {
        // Three points on a line through 0, but for the small steps dx and dy of the last.
        const points = [x, y, -3 * x, -3 * y, times * x + dx, times * y + dy];
        const [a, b, c, d, e, f] = points.map(BigInt);
        const [p, q, r, s, t, u] = points;
        expect(orientation(p, q, r, s, t, u) + 0).toBe(exactly(a, b, c, d, e, f));
      }),
      { numRuns: 2000 },
    );
  });
});
