import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { energyBalance } from '../../src/optics/energyBalance.ts';
import { mieCoefficients, mieCoefficientsConductor } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';

/** Small spheres lose digits close by, faint ones far away: there Im S(0) is 1e3 and more times Re S(0). */
const spheres = [
  { sphere: mieCoefficients(0.01, [1.5, 0.1]), tolerance: 1e-10 },
  { sphere: mieCoefficients(0.5, [1.33, 0]), tolerance: 3e-11 },
  { sphere: mieCoefficients(5, [1.59, 0]), tolerance: 3e-12 },
  { sphere: mieCoefficients(40, [1.000_1, 0]), tolerance: 2e-9 },
  { sphere: mieCoefficients(247, [1.5, 0]), tolerance: 2e-12 },
  { sphere: mieCoefficients(500, [1.33, 1e-3]), tolerance: 2e-12 },
  { sphere: mieCoefficientsConductor(25), tolerance: 2e-12 },
];

describe('energyBalance', () => {
  it('finds the same extinction and scattering at every radius (Poynting; Bohren & Huffman 1983, eq. 4.61 and 4.62)', () => {
    for (const { sphere, tolerance } of spheres) {
      const totals = mieEfficiencies(sphere);
      for (const times of [1, 1.5, 4, 1000]) {
        const kr = Math.min(times * sphere.x, 4000);
        const found = energyBalance(sphere, kr);
        expect(Math.abs(found.extinction / totals.extinction - 1)).toBeLessThan(tolerance);
        expect(Math.abs(found.scattering / totals.scattering - 1)).toBeLessThan(tolerance);
        expect(found.extinctionError).toBeCloseTo(found.extinction / totals.extinction - 1, 15);
        expect(found.scatteringError).toBeCloseTo(found.scattering / totals.scattering - 1, 15);
      }
    }
  });

  it('refuses a radius inside the sphere, or one that takes too long', () => {
    for (const kr of [4.9, 20_001, Number.NaN]) {
      expect(() => energyBalance(spheres[2].sphere, kr)).toThrow(RimwrightError);
    }
    expect(() => energyBalance(spheres[2].sphere, 4.9)).toThrow(
      'kr: found 4.9, expected a number from x = 5 to 20000',
    );
  });
});
