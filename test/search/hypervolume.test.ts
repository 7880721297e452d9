import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { hypervolume } from '../../src/search/hypervolume.ts';
import { published } from './reference.ts';

/** ZDT1: f2 = 1 − √f1; ZDT2: f2 = 1 − f1² (Zitzler, Deb & Thiele 2000). */
const fronts: Record<string, (f1: number) => number> = {
  ZDT1: (f1) => 1 - Math.sqrt(f1),
  ZDT2: (f1) => 1 - f1 * f1,
};

/** All subsets: the union's measure by inclusion and exclusion. */
function byInclusion(points: number[][], reference: number[]): number {
  let total = 0;
  for (let subset = 1; subset < 2 ** points.length; subset++) {
    const chosen = points.filter((_, k) => (subset >> k) & 1);
    const sides = reference.map((r, j) => Math.max(0, r - Math.max(...chosen.map((p) => p[j]))));
    total += (chosen.length % 2 === 1 ? 1 : -1) * sides.reduce((a, b) => a * b);
  }
  return total;
}

describe('hypervolume', () => {
  // Exact staircase sums: test/reference/optimisation.json.
  it.each(published('hvset_'))('is exact for $id', ({ id, inputs, value }) => {
    const points = Array.from({ length: inputs.N }, (_, i) => {
      const f1 = i / (inputs.N - 1);
      return [f1, fronts[id.split('_')[1]](f1)];
    });
    const found = hypervolume(points, inputs.ref.split(',').map(Number));
    expect(Math.abs(found / Number(value) - 1)).toBeLessThan(1e-14);
  });

  // Closed forms r(r − 1) + r − 1/3 and − 2/3 of the whole fronts.
  it.each([...published('hv_ZDT1'), ...published('hv_ZDT2')])('nears the whole front: $id', (entry) => {
    const reference = entry.inputs.ref.map(Number);
    const count = 5000;
    const front = fronts[entry.id.split('_')[1]];
    const points = Array.from({ length: count + 1 }, (_, i) => [i / count, front(i / count)]);
    const missing = Number(entry.value) - hypervolume(points, reference);
    // A staircase of equal treads misses half a tread's area, up to the first steep one.
    expect(missing).toBeGreaterThan(0.49 / count);
    expect(missing).toBeLessThan(0.51 / count);
  });

  // DTLZ2 (Deb et al. 2005): r² − π/4 for the circle, r³ − π/6 for the sphere.
  it.each(published('hv_DTLZ2'))('holds the value between two staircases: $id', (entry) => {
    const [r, exact] = [Number(entry.inputs.ref), Number(entry.value)];
    const flat = entry.id.includes('M=2');
    const count = 60;
    const height = (a: number, b: number) => Math.sqrt(Math.max(0, 1 - a * a - b * b));
    const stairs = (shift: 0 | 1) => {
      const points: number[][] = [];
      for (let i = 0; i <= count; i++) {
        for (let j = 0; j <= (flat ? 0 : count); j++) {
          const top = height((i + shift) / count, flat ? 0 : (j + shift) / count);
          points.push(flat ? [i / count, top] : [i / count, j / count, top]);
        }
      }
      return hypervolume(points, flat ? [r, r] : [r, r, r]);
    };
    const [inner, outer] = [stairs(0), stairs(1)];
    expect(inner).toBeLessThan(exact);
    expect(outer).toBeGreaterThan(exact);
    expect(outer - inner).toBeLessThan(2.1 / count);
  });

  it.each([2, 3])('agrees with inclusion and exclusion for %i objectives', (objectives) => {
    const random = randomStream(3);
    for (let trial = 0; trial < 30; trial++) {
      const points = Array.from({ length: 7 }, () =>
        Array.from({ length: objectives }, () => Math.floor(8 * random.uniform()) / 8),
      );
      const reference = new Array<number>(objectives).fill(0.9);
      const found = hypervolume(points, reference);
      expect(found).toBeCloseTo(byInclusion(points, reference), 13);
      expect(hypervolume(points.toReversed(), reference)).toBeCloseTo(found, 14);
      expect(hypervolume([...points, ...points], reference)).toBeCloseTo(found, 14);
    }
  });

  it('is 0 for nothing, and for points that do not beat the reference', () => {
    expect(hypervolume([], [1, 1])).toBe(0);
    expect(
      hypervolume(
        [
          [1, 0],
          [Number.POSITIVE_INFINITY, -3],
        ],
        [1, 1],
      ),
    ).toBe(0);
  });

  it('refuses other numbers of objectives, and NaN', () => {
    expect(() => hypervolume([], [1])).toThrow('expected 2 or 3 finite numbers');
    expect(() => hypervolume([[1, 2, 3]], [1, 1])).toThrow('points[0]: found [1, 2, 3], expected 2 numbers');
    expect(() => hypervolume([[Number.NaN, 2]], [1, 1])).toThrow('points[0]: found [NaN, 2]');
  });
});
