import { describe, expect, it } from 'vitest';
import { chebyshevFour, settledFit } from '../../src/numeric/chebyshev.ts';

describe('settledFit', () => {
  const settled = (f: (x: number) => number, most = 200) =>
    settledFit((x, out) => out.fill(f(x)), -1, 1, { first: 12, most, tolerance: 1e-12 });

  it('is as long as it takes', () => {
    const { series, terms } = settled((x) => Math.cos(20 * x));
    expect(terms).toBeGreaterThan(24);
    expect(terms).toBeLessThan(60);
    const out = new Float64Array(4);
    chebyshevFour(series, terms, 0.37, out);
    expect(out[0]).toBeCloseTo(Math.cos(7.4), 11);
  });

  it('is one term for a constant, and for nothing at all', () => {
    expect(settled(() => 3).terms).toBe(1);
    expect(settled(() => 0).terms).toBe(1);
  });

  it('ends at the most', () => {
    expect(settled(Math.abs, 50).terms).toBeLessThanOrEqual(50);
  });
});
