import { describe, expect, it } from 'vitest';
import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieCoefficients, mieCoefficientsConductor } from '../../src/optics/mieCoefficients.ts';
import { riccatiBessel } from '../../src/optics/riccatiBessel.ts';
import { FIELD_NUMBERS, scatteredField } from '../../src/optics/scatteredField.ts';
import { cartesianField, times } from './cartesianField.ts';

function field(coefficients: MieCoefficients, kr: number, versine: number): Float64Array {
  const out = new Float64Array(FIELD_NUMBERS);
  scatteredField(coefficients, kr, versine, out);
  return out;
}

/** A sphere of which only the order n answers. */
function oneOrder(n: number, a: [number, number], b: [number, number]): MieCoefficients {
  const column = (value: number) => {
    const all = new Float64Array(n);
    all[n - 1] = value;
    return all;
  };
  return { order: n, aRe: column(a[0]), aIm: column(a[1]), bRe: column(b[0]), bIm: column(b[1]), x: 1 };
}

function relativeDifference(found: ArrayLike<number>, expected: readonly number[]): number {
  const size = Math.max(...expected.map(Math.abs));
  return Math.max(...expected.map((value, j) => Math.abs(found[j] - value))) / size;
}

describe('scatteredField', () => {
  it('is the field of a dipole at any distance where only a_1 answers (Jackson 1999, eq. 9.18)', () => {
    for (const kr of [0.3, 2, 40, 1e7]) {
      for (const theta of [0.4, 2.2]) {
        const found = field(oneOrder(1, [1, 0], [0, 0]), kr, 1 - Math.cos(theta));
        const cos = Math.cos(theta);
        const sin = Math.sin(theta);
        const near = 1 / (kr * kr);
        const expected = [
          ...[cos * (1 - near), cos / kr, 1 - near, 1 / kr, 2 * sin * near, (-2 * sin) / kr],
          ...[1, 1 / kr, cos, cos / kr, 0, 0],
        ].map((value) => 1.5 * value);
        expect(relativeDifference(found, expected)).toBeLessThan(1e-14);
      }
    }
  });

  it('is the sum of Bohren & Huffman (1983), eq. 4.45 with 4.47 and 4.50, term by term', () => {
    const spheres = [mieCoefficients(5, [1.5, 0]), mieCoefficients(30, [1.33, 0.01])];
    for (const sphere of [...spheres, mieCoefficientsConductor(8)]) {
      for (const kr of [1.5 * sphere.x, 300]) {
        for (const cosTheta of [1, 0.96, 0.3, 0, -0.5, -1]) {
          const found = field(sphere, kr, 1 - cosTheta);
          const difference = relativeDifference(found, plainField(sphere, kr, cosTheta));
          expect(difference).toBeLessThan(2e-12);
        }
      }
    }
  });

  it('becomes S1 and S2 far away, ten times nearer to them at ten times the distance', () => {
    const sphere = mieCoefficients(12, [1.5, 0.02]);
    const s = new Float64Array(4);
    for (const cosTheta of [1, 0.9, -0.3, -1]) {
      scatteringAmplitudes(sphere, cosTheta, s);
      const expected = [s[2], s[3], s[0], s[1], 0, 0, s[0], s[1], s[2], s[3], 0, 0];
      const [near, far, farthest] = [1e5, 1e6, 1e13].map((kr) =>
        relativeDifference(field(sphere, kr, 1 - cosTheta), expected),
      );
      expect(near / far).toBeGreaterThan(9.9);
      expect(near / far).toBeLessThan(10.1);
      expect(farthest).toBeLessThan(1e-10);
    }
  });

  it('keeps its digits for high orders at 1e7: p_n is the finite sum of Abramowitz & Stegun 10.1.16', () => {
    for (const n of [3, 400, 2000]) {
      for (const kr of [2e6, 1e7]) {
        const found = field(oneOrder(n, [0, 0], [1, 0]), kr, 0);
        const [re, im] = finiteSum(n, kr);
        // π_n(1) = n(n+1)/2
        expect(Math.hypot(found[0] / (n + 0.5) - re, found[1] / (n + 0.5) - im)).toBeLessThan(2e-13);
      }
    }
  });

  it("obeys Maxwell's curl E = ik H and curl H = −ik E, by differences", () => {
    const sphere = mieCoefficients(3, [1.5, 0.1]);
    const step = 1e-3;
    for (const at of [
      [2, 3, 4],
      [-3, 1, -2.5],
      [0.4, -0.2, 5],
    ]) {
      // ∂F_j/∂x_i of all six components, by five points; k = 1.
      const slopes = [0, 1, 2].map((axis) => {
        const moved = (by: number) =>
          cartesianField(
            sphere,
            at.map((x, i) => (i === axis ? x + by * step : x)),
          );
        const [a, b, c, d] = [-2, -1, 1, 2].map(moved);
        return a.map((value, j) => (value - 8 * b[j] + 8 * c[j] - d[j]) / (12 * step));
      });
      const here = cartesianField(sphere, at);
      const size = Math.max(...here.map(Math.abs));
      for (const [from, to, sign] of [
        [0, 6, 1],
        [6, 0, -1],
      ]) {
        for (let i = 0; i < 3; i++) {
          const j = (i + 1) % 3;
          const l = (i + 2) % 3;
          const curlRe = slopes[j][from + 2 * l] - slopes[l][from + 2 * j];
          const curlIm = slopes[j][from + 2 * l + 1] - slopes[l][from + 2 * j + 1];
          expect(Math.abs(curlRe + sign * here[to + 2 * i + 1]) / size).toBeLessThan(1e-10);
          expect(Math.abs(curlIm - sign * here[to + 2 * i]) / size).toBeLessThan(1e-10);
        }
      }
    }
  });
});

/** Σ_k (i/(2kr))^k (n+k)!/(k! (n−k)!) */
function finiteSum(n: number, kr: number): [number, number] {
  const sum: [number, number] = [0, 0];
  let size = 1;
  for (let k = 0; k <= n; k++) {
    sum[k % 2] += k % 4 < 2 ? size : -size;
    size *= ((n + k + 1) * (n - k)) / ((k + 1) * 2 * kr);
    if (size < 1e-20) break;
  }
  return sum;
}

/** Eq. 4.45 as it stands, divided by e^{ikr}/(−ikr) at the end. */
function plainField({ order, aRe, aIm, bRe, bIm }: MieCoefficients, kr: number, cosTheta: number): number[] {
  const { psi, chi } = riccatiBessel(kr, order);
  const sums = Array.from({ length: 6 }, () => [0, 0]);
  const add = (which: number, factor: number, [re, im]: number[]) => {
    sums[which][0] += factor * re;
    sums[which][1] += factor * im;
  };
  let before = 0;
  let pi = 1;
  let turn = [0, 1];
  for (let n = 1; n <= order; n++) {
    const tau = n * cosTheta * pi - (n + 1) * before;
    const xi = [psi[n], -chi[n]];
    const slope = [psi[n - 1] - (n / kr) * psi[n], -(chi[n - 1] - (n / kr) * chi[n])];
    const a = [aRe[n - 1], aIm[n - 1]];
    const b = [bRe[n - 1], bIm[n - 1]];
    const c = turn.map((part) => (part * (2 * n + 1)) / (n * (n + 1)));
    const ci = times(c, [0, 1]);
    const radial = (Math.sqrt(1 - cosTheta ** 2) * n * (n + 1)) / kr;
    add(0, tau, times(ci, times(a, slope)));
    add(0, -pi, times(c, times(b, xi)));
    // E_φ and its factor differ in sign.
    add(1, pi, times(ci, times(a, slope)));
    add(1, -tau, times(c, times(b, xi)));
    add(2, radial * pi, times(ci, times(a, xi)));
    add(3, tau, times(ci, times(b, slope)));
    add(3, -pi, times(c, times(a, xi)));
    add(4, pi, times(ci, times(b, slope)));
    add(4, -tau, times(c, times(a, xi)));
    add(5, radial * pi, times(ci, times(b, xi)));
    [before, pi] = [pi, ((2 * n + 1) * cosTheta * pi - (n + 1) * before) / n];
    turn = times(turn, [0, 1]);
  }
  const farPhase = times([Math.cos(kr), -Math.sin(kr)], [0, -1]);
  return sums.flatMap((sum) => times(sum, farPhase));
}
