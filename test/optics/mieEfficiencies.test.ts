import { describe, expect, it } from 'vitest';
import { forwardAmplitude } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';

type Index = [number, number];

const efficiencies = (x: number, m: Index) => mieEfficiencies(mieCoefficients(x, m));

/** (m² − 1)/(m² + 2) as [re, im]. */
function clausiusMossotti([n, k]: Index): [number, number] {
  const [re, im] = [n * n - k * k, 2 * n * k];
  const norm = (re + 2) ** 2 + im * im;
  return [((re - 1) * (re + 2) + im * im) / norm, (3 * im) / norm];
}

describe('mieEfficiencies', () => {
  it('holds the optical theorem: extinction = 4 Re S(0)/x² (Bohren & Huffman 1983, eq. 4.76)', () => {
    for (const x of [0.001, 2, 300]) {
      for (const m of [
        [1.33, 0],
        [1, 1e-6],
        [0.05, 4],
      ] as Index[]) {
        const coefficients = mieCoefficients(x, m);
        const { extinction } = mieEfficiencies(coefficients);
        expect((4 * forwardAmplitude(coefficients)[0]) / x ** 2 / extinction).toBeCloseTo(1, 13);
      }
    }
  });

  it('a lossless sphere scatters all it removes', () => {
    for (const x of [0.001, 0.3, 8, 900]) {
      for (const m of [0.7, 1.000_001, 1.33, 3]) {
        const { extinction, scattering, absorption } = efficiencies(x, [m, 0]);
        expect(scattering / extinction).toBeCloseTo(1, 13);
        expect(Math.abs(absorption) / extinction).toBeLessThan(1e-14);
      }
    }
  });

  it('extinction is scattering and absorption', () => {
    const { extinction, scattering, absorption } = efficiencies(9, [1.5, 0.02]);
    expect(scattering + absorption).toBeCloseTo(extinction, 13);
    expect(absorption).toBeGreaterThan(0.1);
  });

  it('small spheres: Rayleigh (Bohren & Huffman 1983, eq. 5.7, 5.8 and 5.9)', () => {
    const x = 0.001;
    for (const m of [
      [1.33, 0],
      [1.5, 0.1],
      [0.05, 4],
      [1.000_001, 0],
      [1, 1e-6],
    ] as Index[]) {
      const [re, im] = clausiusMossotti(m);
      const { scattering, absorption, backscatter, asymmetry } = efficiencies(x, m);
      expect(scattering / ((8 / 3) * x ** 4 * (re * re + im * im))).toBeCloseTo(1, 4);
      expect(backscatter / (4 * x ** 4 * (re * re + im * im))).toBeCloseTo(1, 4);
      if (im > 0) expect(absorption / (4 * x * im)).toBeCloseTo(1, 4);
      expect(Math.abs(asymmetry)).toBeLessThan(1e-6);
    }
  });

  it('large faint spheres: anomalous diffraction (van de Hulst 1957, section 11.22)', () => {
    for (const x of [300, 1000, 3000]) {
      const rho = 2 * x * 0.001;
      const expected = 2 - (4 / rho) * Math.sin(rho) + (4 / rho ** 2) * (1 - Math.cos(rho));
      expect(Math.abs(efficiencies(x, [1.001, 0]).extinction / expected - 1)).toBeLessThan(0.005);
    }
  });

  it('large absorbing spheres: twice the shadow, and the edge term 1.99 x^(−2/3) (Nussenzveig & Wiscombe 1980)', () => {
    for (const x of [1000, 20_000]) {
      const { extinction, scattering } = efficiencies(x, [1.5, 0.1]);
      expect(Math.abs(extinction - 2 - 1.992_386_1 * x ** (-2 / 3))).toBeLessThan(0.1 * x ** (-2 / 3));
      expect(scattering).toBeGreaterThan(1);
      expect(scattering).toBeLessThan(extinction);
    }
  });
});
