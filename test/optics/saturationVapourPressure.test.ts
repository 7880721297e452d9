import { describe, expect, it } from 'vitest';
import { saturationVapourPressure } from '../../src/optics/saturationVapourPressure.ts';

describe('saturationVapourPressure', () => {
  it('meets the table values of IAPWS-IF97 (1997), table 35 (from memory)', () => {
    expect(saturationVapourPressure(300)).toBeCloseTo(3536.58941, 4);
    expect(saturationVapourPressure(500)).toBeCloseTo(2638897.76, 1);
  });

  it('meets the triple point over ice (Wagner, Saul & Pruss 1994) and joins the two curves there', () => {
    expect(saturationVapourPressure(273.15 - 1e-9)).toBeCloseTo(611.15, 1);
    expect(saturationVapourPressure(273.15) - saturationVapourPressure(273.15 - 1e-9)).toBeCloseTo(0, 0);
  });
});
