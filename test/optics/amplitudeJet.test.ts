import { describe, expect, it } from 'vitest';
import { amplitudeJet, JET_NUMBERS, jetAt } from '../../src/optics/amplitudeJet.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { sphereAmplitudes } from '../../src/optics/sphereAmplitudes.ts';

const WAVELENGTH_M = 635e-9;

describe('amplitudeJet', () => {
  const particle = { diameterM: 2e-6, index: constantIndex(1.59), material: '' };
  const sphere = sphereAmplitudes(particle, constantIndex(1), WAVELENGTH_M, 0.4);
  const jet = amplitudeJet(sphere);
  const coefficients = mieCoefficients(sphere.sizeParameter, [1.59, 0]);

  it('holds the amplitudes of Mie theory and their finite differences', () => {
    const step = 1e-4;
    const sums = [0, step, -step].map(() => new Float64Array(4));
    const out = new Float64Array(JET_NUMBERS);
    for (const mu of [0.95, 0.98, 0.999]) {
      [0, step, -step].forEach((shift, i) => {
        scatteringAmplitudes(coefficients, mu + shift, sums[i]);
      });
      jetAt(jet, [mu, 0], out);
      for (let j = 0; j < 4; j++) {
        const [here, above, below] = sums.map((sum) => sum[j]);
        expect(out[j]).toBeCloseTo(here, 9);
        expect(out[j + 4] / ((above - below) / (2 * step))).toBeCloseTo(1, 4);
        expect(out[j + 8] / ((above - 2 * here + below) / step ** 2)).toBeCloseTo(1, 4);
      }
    }
  });

  it('goes on beside the real axis as an analytic function does (its own power series)', () => {
    const real = new Float64Array(JET_NUMBERS);
    const beside = new Float64Array(JET_NUMBERS);
    const shift = 1e-4;
    jetAt(jet, [0.98, 0], real);
    jetAt(jet, [0.98, shift], beside);
    for (const j of [0, 2]) {
      const size = Math.hypot(real[j], real[j + 1]);
      const re = real[j] - shift * real[j + 5] - (shift ** 2 / 2) * real[j + 8];
      const im = real[j + 1] + shift * real[j + 4] - (shift ** 2 / 2) * real[j + 9];
      expect(Math.abs(beside[j] - re)).toBeLessThan(1e-8 * size);
      expect(Math.abs(beside[j + 1] - im)).toBeLessThan(1e-8 * size);
    }
  });
});
