import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import type { IndexModel } from '../../src/optics/indexModel.ts';
import { constantIndex, coversWavelength, refractiveIndex } from '../../src/optics/indexModel.ts';

const dust: IndexModel = {
  formula: 'tabulated',
  rangeM: [4e-7, 8e-7],
  wavelengthM: [4e-7, 5e-7, 8e-7],
  n: [1.6, 1.5, 1.53],
  k: [0.02, 0.01, 0.04],
};

describe('refractiveIndex', () => {
  it('is constant where the index is given as a number', () => {
    expect(refractiveIndex(constantIndex(1.5, 0.1), 2e-6)).toEqual([1.5, 0.1]);
    expect(refractiveIndex(constantIndex(1.332), 635e-9)).toEqual([1.332, 0]);
  });

  it('is linear between the wavelengths of a table and exact at them', () => {
    expect(refractiveIndex(dust, 4e-7)).toEqual([1.6, 0.02]);
    expect(refractiveIndex(dust, 5e-7)).toEqual([1.5, 0.01]);
    expect(refractiveIndex(dust, 8e-7)).toEqual([1.53, 0.04]);
    const [n, k] = refractiveIndex(dust, 6e-7);
    expect(n).toBeCloseTo(1.51, 12);
    expect(k).toBeCloseTo(0.02, 12);
  });

  it('refuses wavelengths outside the range, and says which are known', () => {
    for (const wavelengthM of [3.99e-7, 8.01e-7, Number.NaN, -5e-7, 0]) {
      expect(() => refractiveIndex(dust, wavelengthM)).toThrow(RimwrightError);
    }
    expect(() => refractiveIndex(dust, 1.064e-6)).toThrow(
      'found 1064 nm, expected a vacuum wavelength from 400 nm to 800 nm, where the index (tabulated) is known',
    );
  });

  it('accepts an end of the range that a change of units has moved by a rounding error', () => {
    expect(coversWavelength(dust, 4e-7 * (1 - 2e-16))).toBe(true);
    expect(refractiveIndex(dust, 8e-7 * (1 + 4e-16))).toEqual([1.53, 0.04]);
    expect(refractiveIndex(dust, 4e-7 * (1 - 4e-16))).toEqual([1.6, 0.02]);
  });

  it('is plain data: the same after a clone and after JSON', () => {
    expect(structuredClone(dust)).toEqual(dust);
    expect(JSON.parse(JSON.stringify(constantIndex(1.5)))).toEqual(constantIndex(1.5));
  });
});
