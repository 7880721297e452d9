import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { mieCoefficients, mieCoefficientsConductor } from '../../src/optics/mieCoefficients.ts';
import extra from '../reference/mie-extra.json' with { type: 'json' };
import type { SphereErrors } from './mieReference.ts';
import { sphereErrors } from './mieReference.ts';

type Index = [number, number];

/** Largest relative errors for size parameters up to `x`; faint means |m − 1| up to 1e-3. */
const TOLERANCES = [
  { x: 1, faint: false, totals: 4e-15, backscatter: 4e-15, amplitudes: 4e-15 },
  { x: 1, faint: true, totals: 4e-15, backscatter: 4e-15, amplitudes: 4e-15 },
  { x: 100, faint: false, totals: 2e-13, backscatter: 5e-12, amplitudes: 3e-12 },
  { x: 100, faint: true, totals: 2e-14, backscatter: 2e-12, amplitudes: 2e-12 },
  { x: 2000, faint: false, totals: 1e-13, backscatter: 5e-11, amplitudes: 2e-11 },
  { x: 2000, faint: true, totals: 1e-13, backscatter: 5e-11, amplitudes: 3e-11 },
  { x: 20_000, faint: false, totals: 1e-13, backscatter: 1e-10, amplitudes: 1e-10 },
  // Backwards S is down to 5e-10 of S(0): the rounding of a_n and b_n themselves is felt.
  { x: 20_000, faint: true, totals: 1e-12, backscatter: 1e-9, amplitudes: 1e-9 },
];
const KEYS = ['totals', 'backscatter', 'amplitudes'] as const;

describe('against mpmath with 120 digits (mie-extra.json)', () => {
  const regimes = TOLERANCES.map((line, i) => {
    const from = i >= 2 ? TOLERANCES[i - 2].x : 0;
    const spheres = extra.cases.filter(({ x, m }) => {
      const faint = Math.hypot(m[0] - 1, m[1]) < 2e-3;
      return x > from && x <= line.x && faint === line.faint;
    });
    return { ...line, spheres };
  });

  it.each(regimes)('x up to $x, faint: $faint', ({ spheres, ...allowed }) => {
    const worst: SphereErrors = { totals: 0, backscatter: 0, amplitudes: 0 };
    for (const sphere of spheres) {
      const errors = sphereErrors(mieCoefficients(sphere.x, sphere.m as Index), sphere);
      for (const key of KEYS) {
        worst[key] = Math.max(worst[key], errors[key]);
        expect(errors[key], `${key} of x = ${sphere.x}, m = ${sphere.m}`).toBeLessThan(allowed[key]);
      }
    }
    // A tolerance that is far too wide hides what breaks: tighten it when this fails.
    for (const key of KEYS) expect(worst[key], `${key} could be tighter`).toBeGreaterThan(allowed[key] / 30);
  });

  it('reads every stored sphere once', () => {
    expect(regimes.reduce((sum, { spheres }) => sum + spheres.length, 0)).toBe(extra.cases.length);
  });
});

describe('what every sphere obeys', () => {
  const sizes = [0.001, 0.05, 1, 7.3, 60, 1500];

  it('lossless: |2a − 1| = 1, energy kept in every mode', () => {
    for (const x of sizes) {
      for (const m of [0.4, 0.98, 1.000_01, 1.33, 2.5]) {
        const { order, aRe, aIm, bRe, bIm } = mieCoefficients(x, [m, 0]);
        for (let i = 0; i < order; i++) {
          expect(aRe[i] / (aRe[i] ** 2 + aIm[i] ** 2)).toBeCloseTo(1, 13);
          expect(bRe[i] / (bRe[i] ** 2 + bIm[i] ** 2)).toBeCloseTo(1, 13);
        }
      }
    }
  });

  it('absorbing: no mode gives energy', () => {
    for (const x of sizes) {
      for (const m of [
        [1, 1e-6],
        [1.33, 1e-8],
        [0.05, 4],
        [3, 2],
      ] as Index[]) {
        const { order, aRe, aIm, bRe, bIm } = mieCoefficients(x, m);
        for (let i = 0; i < order; i++) {
          expect(aRe[i]).toBeGreaterThanOrEqual((aRe[i] ** 2 + aIm[i] ** 2) * (1 - 1e-15));
          expect(bRe[i]).toBeGreaterThanOrEqual((bRe[i] ** 2 + bIm[i] ** 2) * (1 - 1e-15));
        }
      }
    }
  });

  it('near the medium the coefficients are linear in m − 1 (first Born approximation)', () => {
    for (const x of [0.001, 1, 30]) {
      const once = mieCoefficients(x, [1 + 2 ** -19, 0]);
      const twice = mieCoefficients(x, [1 + 2 ** -18, 0]);
      expect(twice.aIm[0] / once.aIm[0]).toBeCloseTo(2, 4);
      expect(twice.bIm[0] / once.bIm[0]).toBeCloseTo(2, 4);
    }
  });

  it('does not jump where the plain difference takes over (x ln m = −2)', () => {
    const m: Index = [0.9, 0.001];
    const x = -2 / Math.log(Math.hypot(...m));
    const before = mieCoefficients(x * (1 - 1e-13), m);
    const after = mieCoefficients(x * (1 + 1e-13), m);
    for (let i = 0; i < 20; i++) {
      expect(after.aIm[i] / before.aIm[i]).toBeCloseTo(1, 10);
      expect(after.bRe[i] / before.bRe[i]).toBeCloseTo(1, 10);
    }
  });

  it('a conductor is the limit of a large index', () => {
    const metal = mieCoefficients(5, [0, 100]);
    const conductor = mieCoefficientsConductor(5);
    for (let i = 0; i < 8; i++) {
      expect(Math.abs(metal.aRe[i] - conductor.aRe[i])).toBeLessThan(0.02);
      expect(Math.abs(metal.bIm[i] - conductor.bIm[i])).toBeLessThan(0.02);
    }
  });
});

describe('refuses', () => {
  it.each([
    [0.000_999, [1.5, 0]],
    [20_001, [1.5, 0]],
    [Number.NaN, [1.5, 0]],
    [1, [1.5, -0.1]],
    [1, [-1.5, 0]],
    [1, [1, 0]],
    [1, [1 + 9e-7, 0]],
    [1, [0.009, 0]],
    [1, [80, 80]],
    [1, [Number.NaN, 0]],
  ] as [number, Index][])('x = %d, m = %s', (x, m) => {
    expect(() => mieCoefficients(x, m)).toThrow(RimwrightError);
    expect(() => mieCoefficients(x, m)).toThrow(/^(x|relativeIndex): found .*, expected /);
  });

  it('a conductor of no size', () => {
    expect(() => mieCoefficientsConductor(0)).toThrow(
      'x: found 0, expected a size parameter from 0.001 to 20000',
    );
  });

  it('takes the ends of the range', () => {
    for (const x of [0.001, 20_000]) {
      for (const m of [
        [1 + 1e-6, 0],
        [1 - 1e-6, 0],
        [1, 1e-6],
        [0.01, 0],
        [0, 100],
      ] as Index[]) {
        const { aRe, bRe } = mieCoefficients(x, m);
        expect([...aRe, ...bRe].every((value) => value >= 0 && value <= 1)).toBe(true);
      }
    }
  });
});
