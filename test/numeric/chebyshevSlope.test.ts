import { describe, expect, it } from 'vitest';
import { chebyshevFit, chebyshevFour } from '../../src/numeric/chebyshev.ts';
import { chebyshevSlope } from '../../src/numeric/chebyshevSlope.ts';

describe('chebyshevSlope', () => {
  const [low, high, count] = [0.2, 1.7, 24];
  const sample = (x: number, out: Float64Array) => out.set([x ** 3, Math.sin(2 * x), Math.exp(x), 1]);
  const series = chebyshevFit(sample, 4, low, high, count);
  const slopes = chebyshevSlope(series, 4, count, (high - low) / 2);
  const at = (coefficients: Float64Array, x: number) => {
    const out = new Float64Array(4);
    chebyshevFour(coefficients, count, (2 * x - low - high) / (high - low), out);
    return out;
  };

  it('differentiates a cubic, a sine, an exponential and a constant, once and twice (calculus)', () => {
    const bends = chebyshevSlope(slopes, 4, count, (high - low) / 2);
    for (const x of [0.2, 0.5, 1.1, 1.7]) {
      const first = [3 * x * x, 2 * Math.cos(2 * x), Math.exp(x), 0];
      const second = [6 * x, -4 * Math.sin(2 * x), Math.exp(x), 0];
      at(slopes, x).forEach((value, j) => {
        expect(value).toBeCloseTo(first[j], 11);
      });
      at(bends, x).forEach((value, j) => {
        expect(value).toBeCloseTo(second[j], 9);
      });
    }
  });

  it('makes zero of a series of one term', () => {
    expect([...chebyshevSlope(Float64Array.of(3, 4), 2, 1, 0.5)]).toEqual([0, 0]);
  });
});
