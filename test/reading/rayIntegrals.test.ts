import { describe, expect, it } from 'vitest';
import { rayIntegrals } from '../../src/reading/rayIntegrals.ts';

describe('rayIntegrals', () => {
  const [cells, step] = [40, 0.05];

  it('integrates powers of s along rays: ∫₀¹ (t²s)^a t^{order + 1} dt = s^a/(2a + order + 2) (calculus)', () => {
    const columns = [
      { order: 0, twofold: 0 },
      { order: 1, twofold: 0 },
      { order: 4, twofold: 0 },
      { order: 7, twofold: 0 },
      { order: 1, twofold: 1 },
    ] as const;
    for (const power of [0, 1, 2, 3]) {
      const samples = new Float64Array((cells + 5) * columns.length);
      for (let i = 0; i < cells + 5; i++) {
        columns.forEach(({ twofold }, c) => {
          samples[i * columns.length + c] = (i * step) ** (power + twofold);
        });
      }
      const pieces = rayIntegrals(samples, columns, step, cells);
      for (const position of [0.3, 1.5, 7.2, 39.9]) {
        const cell = Math.floor(position);
        const t = position - cell;
        columns.forEach(({ order, twofold }, c) => {
          const at = 4 * (cell * columns.length + c);
          const value = pieces[at] + t * (pieces[at + 1] + t * (pieces[at + 2] + t * pieces[at + 3]));
          const s = position * step;
          const expected = s ** power / (2 * (power + twofold) + order + 2);
          // What counts is the value with its ν^order, which is small near the axis.
          const error = Math.abs(value - expected) * s ** (order / 2);
          expect(error).toBeLessThan(twofold === 1 && cell === 0 ? 2e-4 : 2e-8);
        });
      }
    }
  });
});
