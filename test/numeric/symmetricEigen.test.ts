import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { symmetricEigen } from '../../src/numeric/symmetricEigen.ts';

describe('symmetricEigen', () => {
  it('knows [[2, 1], [1, 2]]: 1 along (1, −1), 3 along (1, 1)', () => {
    const { values, vectors } = symmetricEigen(Float64Array.of(2, 1, 1, 2), 2);
    expect(values[0]).toBeCloseTo(1, 14);
    expect(values[1]).toBeCloseTo(3, 14);
    expect(vectors[0]).toBeCloseTo(-vectors[2], 14);
    expect(vectors[1]).toBeCloseTo(vectors[3], 14);
  });

  it('gives back the matrix as V diag(values) Vᵀ, with orthonormal columns', () => {
    const n = 12;
    const random = randomStream(4);
    const a = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j <= i; j++) a[i * n + j] = a[j * n + i] = random.normal();
    }
    const { values, vectors: v } = symmetricEigen(a, n);
    for (let i = 0; i < n; i++) {
      if (i > 0) expect(values[i]).toBeGreaterThanOrEqual(values[i - 1]);
      for (let j = 0; j < n; j++) {
        let [entry, dot] = [0, 0];
        for (let k = 0; k < n; k++) {
          entry += v[i * n + k] * values[k] * v[j * n + k];
          dot += v[k * n + i] * v[k * n + j];
        }
        expect(entry).toBeCloseTo(a[i * n + j], 12);
        expect(dot).toBeCloseTo(i === j ? 1 : 0, 13);
      }
    }
  });

  it('refuses what is not finite', () => {
    expect(() => symmetricEigen(Float64Array.of(1, Number.NaN, Number.NaN, 1), 2)).toThrow('not finite');
  });
});
