import { expect } from 'vitest';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';

/** One sphere of a reference file, numbers as decimal text. */
export interface SphereRecord {
  Qext: string;
  Qsca: string;
  Qback: string;
  g: string;
  S0: string[];
  amplitudes: { cosTheta: number; S1: string[]; S2: string[] }[];
}

/** Largest relative errors of a sphere against its record. */
export interface SphereErrors {
  /** Of Qext, Qsca, g and Re S(0), each to itself, and of S(0). */
  totals: number;
  /** Of 4|S(180°)|²/x². */
  backscatter: number;
  /** |ΔS1| and |ΔS2| over the larger of |S1| and |S2| at that angle. */
  amplitudes: number;
}

export function sphereErrors(coefficients: MieCoefficients, record: SphereRecord): SphereErrors {
  const totals = mieEfficiencies(coefficients);
  const forward = forwardAmplitude(coefficients);
  const s0 = record.S0.map(Number);
  const out = new Float64Array(4);
  let amplitudes = 0;
  for (const { cosTheta, S1, S2 } of record.amplitudes) {
    scatteringAmplitudes(coefficients, cosTheta, out);
    const [re1, im1] = S1.map(Number);
    const [re2, im2] = S2.map(Number);
    const size = Math.max(Math.hypot(re1, im1), Math.hypot(re2, im2));
    const miss = Math.max(Math.hypot(out[0] - re1, out[1] - im1), Math.hypot(out[2] - re2, out[3] - im2));
    amplitudes = Math.max(amplitudes, miss / size);
  }
  return {
    totals: Math.max(
      relativeError(totals.extinction, record.Qext),
      relativeError(totals.scattering, record.Qsca),
      relativeError(totals.asymmetry, record.g),
      relativeError(forward[0], record.S0[0]),
      Math.hypot(forward[0] - s0[0], forward[1] - s0[1]) / Math.hypot(s0[0], s0[1]),
    ),
    backscatter: relativeError(totals.backscatter, record.Qback),
    amplitudes,
  };
}

export function relativeError(value: number, reference: string): number {
  return Math.abs(value / Number(reference) - 1);
}

/** One unit of the last digit of a printed number. */
export function lastDigit(printed: string): number {
  const [mantissa, exponent = '0'] = printed.toLowerCase().split('e');
  const decimals = mantissa.includes('.') ? mantissa.length - mantissa.indexOf('.') - 1 : 0;
  return 10 ** (Number(exponent) - decimals);
}

/** Holds a number to what a table prints, within `units` of the last digit (0.5 is correct rounding). */
export function expectPrinted(value: number, printed: string, units = 0.5, digit = lastDigit(printed)): void {
  // A millionth of a unit is the rounding of this very subtraction.
  const miss = Math.abs(value - Number(printed)) / digit;
  expect(miss, `${value} for ${printed}`).toBeLessThanOrEqual(units + 1e-6);
}
