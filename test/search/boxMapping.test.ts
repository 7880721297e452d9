import { describe, expect, it } from 'vitest';
import { BoxMapping } from '../../src/search/boxMapping.ts';

const box = (low: number, high: number) => ({ lower: Float64Array.of(low), upper: Float64Array.of(high) });
const [none, infinite] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];

describe('BoxMapping', () => {
  it.each([
    [0, 2],
    [-3e-6, 5e-6],
    [1, infinite],
    [none, -1],
    [none, infinite],
  ])('stays in [%f, %f], smooth, and is undone by free', (low, high) => {
    const width = Number.isFinite(high - low) ? high - low : 2;
    const mapping = new BoxMapping(box(low, high), Float64Array.of(0.3 * width));
    const middle = Number.isFinite(low) ? low + width / 2 : Number.isFinite(high) ? high - width / 2 : 0;
    const step = width / 97;
    let before = mapping.inside(middle - 5 * width, 0);
    for (let free = middle - 5 * width; free <= middle + 5 * width; free += step) {
      const x = mapping.inside(free, 0);
      expect(x).toBeGreaterThanOrEqual(low);
      expect(x).toBeLessThanOrEqual(high);
      // Slopes are at most 1: no jumps.
      expect(Math.abs(x - before)).toBeLessThanOrEqual(step * (1 + 1e-9));
      expect(Math.abs(mapping.inside(mapping.free(x, 0), 0) - x)).toBeLessThan(1e-12 * width);
      before = x;
    }
  });

  it('is the identity away from the bounds, and reaches the bounds', () => {
    const mapping = new BoxMapping(box(0, 2), Float64Array.of(1));
    for (const x of [0.1, 0.5, 1.9]) expect(mapping.inside(x, 0)).toBe(x);
    // The margin is a twentieth of the width, here 0.1.
    expect(mapping.inside(-0.1, 0)).toBeCloseTo(0, 15);
    expect(mapping.inside(2.1, 0)).toBeCloseTo(2, 15);
    expect(mapping.inside(-0.7, 0)).toBeCloseTo(0.5, 14);
    expect(mapping.inside(0.3 + 2 * 2.2, 0)).toBeCloseTo(0.3, 14);
    expect(mapping.free(0, 0)).toBe(-0.1);
  });
});
