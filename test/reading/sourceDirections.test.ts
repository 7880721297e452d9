import { describe, expect, it } from 'vitest';
import { sourceDirections } from '../../src/reading/sourceDirections.ts';

describe('sourceDirections', () => {
  // Means of e^{iu t} over a disc are 2J₁(u)/u; J₁ from Abramowitz & Stegun (1964), table 9.1 (J₁(1), J₁(5), J₁(10)).
  it.each([
    [1, 0.4400505857],
    [5, -0.3275791376],
    [10, 0.0434727462],
  ])(
    'makes the means of a linear phase 2J₁(u)/u, as van Cittert and Zernike have it: u = %d',
    (swing, j1) => {
      const { tangents, weights } = sourceDirections(Math.atan(1e-3), swing);
      for (const turn of [0, 0.2, 0.9]) {
        let mean = 0;
        weights.forEach((weight, i) => {
          const along = tangents[2 * i] * Math.cos(turn) + tangents[2 * i + 1] * Math.sin(turn);
          mean += weight * Math.cos((swing * along) / 1e-3);
        });
        expect(Math.abs(mean - (2 * j1) / swing)).toBeLessThan(1e-5);
      }
    },
  );

  it('is one direction, the axis, for a point source', () => {
    expect(sourceDirections(0, 10)).toEqual({ tangents: new Float64Array(2), weights: Float64Array.of(1) });
  });
});
