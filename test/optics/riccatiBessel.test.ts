import { describe, expect, it } from 'vitest';
import { riccatiBessel } from '../../src/optics/riccatiBessel.ts';
import { seriesOrder } from '../../src/optics/seriesOrder.ts';

describe('riccatiBessel', () => {
  it('has the Wronskian ψ_{n−1} χ_n − ψ_n χ_{n−1} = 1 (Abramowitz & Stegun 10.1.31)', () => {
    for (const x of [0.001, 0.3, 1, 2, Math.PI, 47.7, 1234.5, 20_000]) {
      const order = seriesOrder(x);
      const { psi, chi } = riccatiBessel(x, order);
      for (let n = 1; n <= order; n++) {
        expect(Math.abs(psi[n - 1] * chi[n] - psi[n] * chi[n - 1] - 1)).toBeLessThan(1e-12);
      }
    }
  });

  it('has the closed forms of order 0 to 2 (Abramowitz & Stegun 10.1.11 and 10.1.12, times x and −x)', () => {
    const x = 2.7;
    const { psi, chi } = riccatiBessel(x, 2);
    expect(psi[0]).toBe(Math.sin(x));
    expect(chi[0]).toBe(Math.cos(x));
    expect(psi[1]).toBeCloseTo(Math.sin(x) / x - Math.cos(x), 15);
    expect(chi[1]).toBeCloseTo(Math.cos(x) / x + Math.sin(x), 15);
    expect(psi[2]).toBeCloseTo((3 / x ** 2 - 1) * Math.sin(x) - (3 / x) * Math.cos(x), 15);
    expect(chi[2]).toBeCloseTo((3 / x ** 2 - 1) * Math.cos(x) + (3 / x) * Math.sin(x), 15);
  });

  it('keeps its digits for small arguments: ψ_n → x^{n+1}/(2n+1)!! (Abramowitz & Stegun 10.1.2)', () => {
    const x = 0.001;
    const { psi } = riccatiBessel(x, 4);
    let leading = x;
    for (let n = 1; n <= 4; n++) {
      leading *= x / (2 * n + 1);
      const next = 1 - (x * x) / (2 * (2 * n + 3));
      expect(psi[n] / (leading * next)).toBeCloseTo(1, 13);
    }
  });
});
