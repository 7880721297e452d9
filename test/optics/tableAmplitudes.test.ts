import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { checkExtinction, interpolateAmplitudes, tableExtinction } from '../../src/optics/amplitudeTable.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import { layeredSphere } from '../../src/optics/layeredSphere.ts';
import { forwardAmplitude, scatteringAmplitudes } from '../../src/optics/mieAmplitudes.ts';
import type { MieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieCoefficients } from '../../src/optics/mieCoefficients.ts';
import { mieEfficiencies } from '../../src/optics/mieEfficiencies.ts';
import { readAmplitudeCsv } from '../../src/optics/readAmplitudeCsv.ts';
import { amplitudesAt, sphereAmplitudes } from '../../src/optics/sphereAmplitudes.ts';
import { tableAmplitudes } from '../../src/optics/tableAmplitudes.ts';
import { steps, tableOf } from './tableOf.ts';

const WAVENUMBER = 1e7;

/** Largest distance of S1 and S2 from the sphere's own over a cone, over |S(0)|. */
function largestError(
  coefficients: MieCoefficients,
  halfAngle: number,
  amplitudes: (angle: number, out: Float64Array) => void,
): number {
  const size = Math.hypot(...forwardAmplitude(coefficients));
  const true4 = new Float64Array(4);
  const ours = new Float64Array(4);
  let largest = 0;
  for (let i = 0; i <= 1777; i++) {
    const angle = (halfAngle * i) / 1777;
    scatteringAmplitudes(coefficients, Math.cos(angle), true4);
    amplitudes(angle, ours);
    for (let j = 0; j < 4; j++) largest = Math.max(largest, Math.abs(ours[j] - true4[j]) / size);
  }
  return largest;
}

const CASES = [
  { x: 0.5, m: [1.33, 0], step: 1, last: 30, halfAngle: 0.4 },
  { x: 5, m: [1.59, 0], step: 1, last: 60, halfAngle: 1 },
  { x: 5, m: [1.59, 0], step: 5, last: 60, halfAngle: (60 * Math.PI) / 180 },
  { x: 20, m: [1.59, 0], step: 1, last: 90, halfAngle: 1.5 },
  { x: 30, m: [1.5, 0.1], step: 1, last: 180, halfAngle: 0.3 },
  { x: 100, m: [1.33, 0], step: 0.2, last: 60, halfAngle: 1 },
  { x: 1000, m: [1.33, 0.001], step: 0.02, last: 30, halfAngle: 0.05 },
] as { x: number; m: [number, number]; step: number; last: number; halfAngle: number }[];

describe('a tabulated sphere', () => {
  it.each(CASES)('x = $x in steps of $step° comes back', ({ x, m, step, last, halfAngle }) => {
    const coefficients = mieCoefficients(x, m);
    const table = readAmplitudeCsv(tableOf(coefficients, steps(step, last)), 'a.csv');
    const between = largestError(coefficients, halfAngle, (angle, out) =>
      interpolateAmplitudes(table, angle, out),
    );
    expect(between).toBeLessThan(Math.max(1e-13, 0.12 * table.misfit));
    const sphere = tableAmplitudes(table, WAVENUMBER, halfAngle);
    const series = largestError(coefficients, halfAngle, (angle, out) =>
      amplitudesAt(sphere, Math.cos(angle), out),
    );
    expect(series).toBeLessThan(1e-10 + 0.2 * table.misfit);
  });

  it('keeps few terms where the numbers are rounded, and stays within their misfit', () => {
    const coefficients = mieCoefficients(100, [1.33, 0]);
    const table = readAmplitudeCsv(tableOf(coefficients, steps(0.02, 90), 5), 'a.csv');
    const sphere = tableAmplitudes(table, WAVENUMBER, 1);
    expect(sphere.terms).toBeLessThan(100);
    const error = largestError(coefficients, 1, (angle, out) => amplitudesAt(sphere, Math.cos(angle), out));
    expect(error).toBeLessThan(table.misfit);
  });

  it('has what a solved sphere has', () => {
    const radiusM = 1e-6;
    const particle = { diameterM: 2 * radiusM, index: constantIndex(1.59), material: '1.59' };
    const solved = sphereAmplitudes(particle, constantIndex(1), 635e-9, 0.5);
    const coefficients = mieCoefficients(solved.sizeParameter, [1.59, 0]);
    const table = readAmplitudeCsv(tableOf(coefficients, steps(0.5, 40)), 'a.csv');
    const tabled = tableAmplitudes(table, solved.wavenumber, 0.5);
    expect(tabled.extinctionM2 / solved.extinctionM2).toBeCloseTo(1, 14);
    expect(tabled.forward[1] / solved.forward[1]).toBeCloseTo(1, 14);
    expect(tabled.cosLimit).toBe(solved.cosLimit);
    expect(tabled.wavenumber).toBe(solved.wavenumber);
  });

  it('serves for layered spheres too', () => {
    const coefficients = layeredSphere([
      { x: 8, m: [1.33, 0] },
      { x: 10, m: [1.5, 0.1] },
    ]);
    const table = readAmplitudeCsv(tableOf(coefficients, steps(1, 60)), 'a.csv');
    const sphere = tableAmplitudes(table, WAVENUMBER, 1);
    const error = largestError(coefficients, 1, (angle, out) => amplitudesAt(sphere, Math.cos(angle), out));
    expect(error).toBeLessThan(0.2 * table.misfit);
  });

  it('the opaque disc that lends its size is near the sphere, where that is large and dark', () => {
    const coefficients = mieCoefficients(200, [1.5, 1]);
    const table = readAmplitudeCsv(tableOf(coefficients, steps(0.1, 20)), 'a.csv');
    const { sizeParameter, index } = tableAmplitudes(table, WAVENUMBER, 0.3);
    expect(sizeParameter / 200).toBeCloseTo(1, 1);
    expect(index).toEqual([Number.NaN, Number.NaN]);
  });
});

describe('refuses', () => {
  const coefficients = mieCoefficients(5, [1.59, 0]);
  const table = readAmplitudeCsv(tableOf(coefficients, steps(1, 30)), 'a.csv');

  it('a cone wider than the table', () => {
    const tooWide = () => tableAmplitudes(table, WAVENUMBER, 0.6);
    expect(tooWide).toThrow(RimwrightError);
    expect(tooWide).toThrow(
      'found amplitudes up to 30 deg, expected amplitudes up to 34.3775 deg, where detectors may reach',
    );
    expect(() => tableAmplitudes(table, WAVENUMBER, Math.PI / 6)).not.toThrow();
  });

  it('an extinction that the optical theorem does not give', () => {
    const extinctionM2 = (mieEfficiencies(coefficients).extinction * Math.PI * 25) / WAVENUMBER ** 2;
    expect(tableExtinction(table, WAVENUMBER) / extinctionM2).toBeCloseTo(1, 14);
    for (const factor of [0.991, 1, 1.009]) {
      expect(() => checkExtinction(table, WAVENUMBER, extinctionM2 * factor, 'a.csv')).not.toThrow();
    }
    for (const factor of [0.98, 1.02, Number.NaN]) {
      expect(() => checkExtinction(table, WAVENUMBER, extinctionM2 * factor, 'a.csv')).toThrow(
        RimwrightError,
      );
    }
    // The wave number of vacuum for a particle in water.
    expect(() => checkExtinction(table, WAVENUMBER / 1.33, extinctionM2, 'a.csv')).toThrow(
      `a.csv: found amplitudes whose 4π Re S(0)/k² is ${(extinctionM2 * 1.33 ** 2).toPrecision(4)} m², ` +
        `expected the stated extinction of ${extinctionM2.toPrecision(4)} m² within 1 %: ` +
        'S1 and S2 as in Bohren & Huffman, of the same wavelength and medium',
    );
  });
});
