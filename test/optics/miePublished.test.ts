import { describe, expect, it } from 'vitest';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import { mieCoefficients, mieCoefficientsConductor } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';
import reference from '../reference/mie.json' with { type: 'json' };
import { expectPrinted, lastDigit, relativeError, sphereErrors } from './mieReference.ts';

/** Relative, against values recomputed with mpmath. */
const TOTALS = 1e-13;
const BACKSCATTER = 1e-11;
/** Of S1 and S2: 1e-12 of this is the rounding of the cosine at x = 10 000. */
const AMPLITUDES = 1e-11;
/** Last digits by which printed tables miss the recomputed values; 0.5 is correct rounding. */
const UNITS = {
  /** Printed by a program in single precision. */
  angles: 0.6,
  /** MIEV0's driver likewise; amplitudes in digits of the larger of S1 and S2 at that angle. */
  miev0: {
    case_2: 3.1,
    case_3: 0.8,
    case_4: 1.4,
    case_6: 4,
    case_12: 4.1,
    case_15: 0.8,
    case_19: 0.8,
  } as Record<string, number>,
  /** The twelve-digit backscatter of the absorbing sphere. */
  backscatter: 1.2,
};

type Index = [number, number];

/** Our S1re, S1im, S2re, S2im as MIEV0 prints them, with time factor exp(+iωt). */
function miev0Amplitudes(x: number, m: number[] | null): number[][] {
  const coefficients = m === null ? mieCoefficientsConductor(x) : mieCoefficients(x, m as Index);
  return [0, 30, 60, 90, 120, 150, 180].map((degrees) => {
    const out = new Float64Array(4);
    scatteringAmplitudes(coefficients, Math.cos((degrees * Math.PI) / 180), out);
    return [out[0], -out[1], out[2], -out[3]];
  });
}

describe('the sphere of Bohren & Huffman (1983), Appendix A', () => {
  it.each(reference.bohrenHuffman)('$m: $source', ({ radiusUm, wavelengthUm, m, published, recomputed }) => {
    const coefficients = mieCoefficients((2 * Math.PI * radiusUm) / wavelengthUm, m as Index);
    const totals = mieEfficiencies(coefficients);
    const forward = forwardAmplitude(coefficients);
    expectPrinted(totals.extinction, published.Qext);
    expectPrinted(totals.scattering, published.Qsca);
    expectPrinted(totals.backscatter, published.Qback, UNITS.backscatter);
    expectPrinted(totals.asymmetry, published.g);
    expect(relativeError(totals.extinction, recomputed.Qext)).toBeLessThan(TOTALS);
    expect(relativeError(totals.scattering, recomputed.Qsca)).toBeLessThan(TOTALS);
    expect(relativeError(totals.backscatter, recomputed.Qback_BH)).toBeLessThan(BACKSCATTER);
    expect(relativeError(totals.asymmetry, recomputed.g)).toBeLessThan(TOTALS);
    expect(relativeError(forward[0], recomputed.S0[0])).toBeLessThan(TOTALS);
    expect(relativeError(forward[1], recomputed.S0[1])).toBeLessThan(TOTALS);
  });

  it('has the printed scattering matrix at every angle (p. 482)', () => {
    const { radiusUm, wavelengthUm, m } = reference.bohrenHuffman[0];
    const coefficients = mieCoefficients((2 * Math.PI * radiusUm) / wavelengthUm, m as Index);
    const forward = forwardAmplitude(coefficients);
    const s11Forward = forward[0] ** 2 + forward[1] ** 2;
    const s = new Float64Array(4);
    for (const row of reference.bohrenHuffmanAngles.rows) {
      scatteringAmplitudes(coefficients, Math.cos((row.thetaDeg * Math.PI) / 180), s);
      const across = s[0] ** 2 + s[1] ** 2;
      const along = s[2] ** 2 + s[3] ** 2;
      const s11 = (along + across) / 2;
      // Eq. 4.77: S12 = (|S2|² − |S1|²)/2, S33 = Re(S1 S2*), S34 = Im(S2 S1*).
      expectPrinted(s11 / s11Forward, row.S11norm, UNITS.angles);
      expectPrinted(-(along - across) / 2 / s11, row.POL, UNITS.angles);
      expectPrinted((s[0] * s[2] + s[1] * s[3]) / s11, row.S33, UNITS.angles);
      expectPrinted((s[3] * s[0] - s[2] * s[1]) / s11, row.S34, UNITS.angles);
    }
  });
});

describe('Wiscombe (1979), NCAR/TN-140+STR', () => {
  it.each(reference.wiscombe1979)('m = $m, x = $x', ({ x, m, published, recomputed }) => {
    const totals = mieEfficiencies(mieCoefficients(x, m as Index));
    expectPrinted(totals.extinction, published.Qext);
    expectPrinted(totals.scattering, published.Qsca);
    expectPrinted(totals.asymmetry, published.g);
    expect(relativeError(totals.extinction, recomputed.Qext)).toBeLessThan(TOTALS);
    expect(relativeError(totals.scattering, recomputed.Qsca)).toBeLessThan(TOTALS);
    expect(relativeError(totals.asymmetry, recomputed.g)).toBeLessThan(TOTALS);
  });
});

describe('MIEV0 test driver, Wiscombe (1996)', () => {
  // Case 1 prints a small-particle approximation, 6e-3 off: only its recomputed values count.
  it.each(reference.miev0.filter(({ id }) => id !== 'case_1'))('prints $id', ({ id, x, m, published }) => {
    const units = UNITS.miev0[id] ?? 0.5;
    const coefficients = m === null ? mieCoefficientsConductor(x) : mieCoefficients(x, m as Index);
    const totals = mieEfficiencies(coefficients);
    expectPrinted(totals.extinction, published.Qext, units);
    expectPrinted(totals.scattering, published.Qsca, units);
    expectPrinted(totals.asymmetry * totals.scattering, published.gQsca, units);
    miev0Amplitudes(x, m).forEach((ours, i) => {
      const printed = [...published.S1[i], ...published.S2[i]];
      const digit = Math.max(...printed.map(lastDigit));
      for (let j = 0; j < 4; j++) expectPrinted(ours[j], printed[j], units, digit);
    });
  });

  it.each(reference.miev0)('recomputed $id', ({ x, m, recomputed }) => {
    const coefficients = m === null ? mieCoefficientsConductor(x) : mieCoefficients(x, m as Index);
    const totals = mieEfficiencies(coefficients);
    const forward = forwardAmplitude(coefficients);
    expect(relativeError(totals.extinction, recomputed.Qext)).toBeLessThan(TOTALS);
    expect(relativeError(totals.scattering, recomputed.Qsca)).toBeLessThan(TOTALS);
    expect(relativeError(totals.asymmetry, recomputed.g)).toBeLessThan(TOTALS);
    expect(relativeError(totals.backscatter, recomputed.Qback)).toBeLessThan(BACKSCATTER);
    expect(relativeError(forward[0], recomputed.SFORW_miev0[0])).toBeLessThan(TOTALS);
    miev0Amplitudes(x, m).forEach((ours, i) => {
      const theirs = recomputed.S1S2_at_0_30_180_miev0[i].map(Number);
      const size = Math.max(...theirs.map(Math.abs));
      for (let j = 0; j < 4; j++) expect(Math.abs(ours[j] - theirs[j]) / size).toBeLessThan(AMPLITUDES);
    });
  });
});

describe('own grid, mpmath 60 digits', () => {
  it.each(reference.grid)('x = $x, m = $m', (sphere) => {
    const amplitudes = sphere.amplitudes.map(({ theta_deg, S1, S2 }) => ({
      cosTheta: Math.cos((Number(theta_deg) * Math.PI) / 180),
      S1,
      S2,
    }));
    const errors = sphereErrors(mieCoefficients(sphere.x, sphere.m as Index), {
      ...sphere,
      Qback: sphere.Qback_BH,
      amplitudes,
    });
    expect(errors.totals).toBeLessThan(TOTALS);
    expect(errors.backscatter).toBeLessThan(BACKSCATTER);
    expect(errors.amplitudes).toBeLessThan(AMPLITUDES);
  });
});
