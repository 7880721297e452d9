import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { localFit } from '../../src/search/localFit.ts';

describe('localFit', () => {
  const random = randomStream(6);
  const rows = Array.from({ length: 12 }, () => [1, random.normal(), random.normal()]);
  const plane = rows.map(([, a, b]) => 3 - 2 * a + 0.5 * b);

  it('finds the coefficients of a plane', () => {
    const found = localFit(rows).coefficients(plane) ?? [];
    for (const [j, value] of [3, -2, 0.5].entries()) expect(found[j]).toBeCloseTo(value, 7);
  });

  it('weighs the points so that the prediction follows for any values', () => {
    const values = rows.map(() => random.normal());
    const fit = localFit(rows);
    const at = [1, 0.3, -0.7];
    const [c, a, b] = fit.coefficients(values) ?? [];
    const predicted = (fit.weights(at) ?? []).reduce((sum, w, k) => sum + w * values[k], 0);
    expect(predicted).toBeCloseTo(c + 0.3 * a - 0.7 * b, 12);
  });

  it('shrinks a slope by its penalty', () => {
    const even = [-1, 1].map((x) => [1, x]);
    const [, slope] = localFit(even, [0, 1]).coefficients([-2, 2]) ?? [];
    expect(slope).toBeCloseTo(1, 8);
  });

  it('copes with columns that depend on each other, and says where nothing can be done', () => {
    const twice = rows.map(([one, a]) => [one, a, 2 * a]);
    const values = twice.map((row) => 1 + row[1]);
    const [c, a, b] = localFit(twice).coefficients(values) ?? [];
    expect(c).toBeCloseTo(1, 6);
    expect(a + 2 * b).toBeCloseTo(1, 6);
    expect(localFit(rows.map(() => [1, 0])).coefficients(plane)).toBeUndefined();
  });
});
