import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { leastSquares } from '../../src/numeric/leastSquares.ts';
import { evaluateTerms, sparseTerms, termWork } from '../../src/numeric/polynomialBasis.ts';

const KINDS = [
  { variable: 0, power: 9, ripples: true },
  { variable: 2, power: 3, ripples: false },
];

describe('leastSquares over sparse terms', () => {
  it('finds polynomials again that the terms can make, and nothing else in them', () => {
    const terms = sparseTerms(KINDS);
    const random = randomStream(4);
    const rows = 3 * terms.length;
    const matrix = new Float64Array(rows * terms.length);
    const values: number[] = [];
    const work = termWork(3);
    const wanted = ([u, , v]: Float64Array) => [1 + u ** 9 - 2 * u ** 4 * v ** 2 + v ** 3, u * v];
    const draw = () => Float64Array.from({ length: 3 }, () => 2 * random.uniform() - 1);
    for (let r = 0; r < rows; r++) {
      const point = draw();
      evaluateTerms(terms, point, matrix.subarray(r * terms.length, (r + 1) * terms.length), work);
      values.push(...wanted(point));
    }
    const found = leastSquares(matrix, terms.length, Float64Array.from(values), 2);
    const row = new Float64Array(terms.length);
    for (let n = 0; n < 20; n++) {
      const point = draw();
      evaluateTerms(terms, point, row, work);
      wanted(point).forEach((value, k) => {
        const sum = row.reduce((total, term, t) => total + term * found[k * terms.length + t], 0);
        expect(sum).toBeCloseTo(value, 6);
      });
    }
  });

  it('minimises squares where nothing fits: the mean of what is asked', () => {
    const found = leastSquares(Float64Array.of(1, 1, 1, 1), 1, Float64Array.of(1, 2, 3, 6), 1);
    expect(found[0]).toBeCloseTo(3, 12);
  });

  it('has no term of a variable that is not there, and no term twice', () => {
    const terms = sparseTerms(KINDS);
    const keys = terms.map((term) => JSON.stringify(Object.values(term)));
    expect(new Set(keys).size).toBe(keys.length);
    expect(terms.some(({ first, second }) => first === 1 || second === 1)).toBe(false);
  });

  it('refuses columns that depend on each other', () => {
    const same = Float64Array.of(1, -1, 2, -2, 3, -3);
    expect(() => leastSquares(same, 2, new Float64Array(3), 1)).toThrow(/depend on each other/);
  });
});
