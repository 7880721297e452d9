import { describe, expect, it } from 'vitest';
import { iapwsWater } from '../../src/optics/iapwsWater.ts';
import reference from '../reference/refractive-index.json' with { type: 'json' };

describe('iapwsWater', () => {
  it.each(reference.iapwsWater)(
    'gives $n at $temperatureK K, $densityKgM3 kg/m³, $wavelengthUm µm: $source',
    (row) => {
      const n = iapwsWater(
        { formula: 'iapws-r9-97', rangeM: [2e-7, 1.1e-6], ...row },
        row.wavelengthUm * 1e-6,
      );
      const digits = row.n.length - 2;
      // Densities are given to twelve digits, so that more than 1e-11 cannot be asked.
      expect(Math.abs(n - Number(row.n))).toBeLessThan(Math.max(0.51 * 10 ** -digits, 1e-11));
      if (row.recomputed !== undefined) expect(Math.abs(n - row.recomputed)).toBeLessThan(1e-11);
    },
  );
});
