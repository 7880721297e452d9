import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { riccatiBessel } from '../../src/optics/riccatiBessel.ts';
import { sphereInterior } from '../../src/optics/sphereInterior.ts';

describe('sphereInterior', () => {
  it('f_n is the integral −∫ ψ_n(mt) ψ_n(t) dt / ψ_n(mx) (by quadrature)', () => {
    const { nodes, weights } = gaussLegendre(40);
    for (const [x, m] of [
      [0.8, 1.000_001],
      [5, 1.4],
      [5, 0.8],
      [12, 1.01],
    ]) {
      const { differenceRe, differenceIm } = sphereInterior(x, [m, 0], riccatiBessel(x, 20));
      for (let n = 1; n <= 8; n++) {
        let integral = 0;
        nodes.forEach((node, i) => {
          const t = (x / 2) * (1 + node);
          integral += (x / 2) * weights[i] * riccatiBessel(m * t, n).psi[n] * riccatiBessel(t, n).psi[n];
        });
        expect(differenceRe[n] / (-integral / riccatiBessel(m * x, n).psi[n])).toBeCloseTo(1, 11);
        expect(Math.abs(differenceIm[n])).toBe(0);
      }
    }
  });

  it("U_n and f_n fit together: U ψ − ψ' = (m² − 1) f", () => {
    const x = 6;
    for (const m of [
      [1.5, 0.3],
      [0.05, 4],
      [0.6, 0.1],
    ] as [number, number][]) {
      const outside = riccatiBessel(x, 24);
      const { slopeRe, slopeIm, differenceRe, differenceIm } = sphereInterior(x, m, outside);
      const contrast = [m[0] ** 2 - m[1] ** 2 - 1, 2 * m[0] * m[1]];
      for (let n = 1; n <= 10; n++) {
        const psi = outside.psi[n];
        const psiSlope = outside.psi[n - 1] - (n / x) * psi;
        const re = contrast[0] * differenceRe[n] - contrast[1] * differenceIm[n];
        const im = contrast[0] * differenceIm[n] + contrast[1] * differenceRe[n];
        expect(re).toBeCloseTo(slopeRe[n] * psi - psiSlope, 12);
        expect(im).toBeCloseTo(slopeIm[n] * psi, 12);
      }
    }
  });

  it('inside an absorbing sphere every mode loses energy: Im U_n < 0', () => {
    for (const x of [0.001, 3, 200]) {
      const { slopeIm } = sphereInterior(x, [1.33, 1e-8], riccatiBessel(x, 4));
      for (let n = 1; n <= 4; n++) expect(slopeIm[n]).toBeLessThan(0);
    }
  });
});
