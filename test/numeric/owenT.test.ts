import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import type { Complex } from '../../src/numeric/complex.ts';
import { gaussLegendre } from '../../src/numeric/gaussLegendre.ts';
import { owenT, owenTComplex } from '../../src/numeric/owenT.ts';
import complexReference from '../reference/owen-complex.json' with { type: 'json' };
import reference from '../reference/special-functions.json' with { type: 'json' };

const rule = gaussLegendre(60);

/** The definition (Owen 1956) by quadrature in pieces over which the integrand turns by a radian at the most. */
function byDefinition([re, im]: Complex, a: number): Complex {
  const pieces = 4 + Math.ceil((Math.hypot(re, im) * a * a) / 2 + 4 * a);
  let [sumRe, sumIm] = [0, 0];
  for (let piece = 0; piece < pieces; piece++) {
    for (let i = 0; i < rule.nodes.length; i++) {
      const x = (a * (piece + (1 + rule.nodes[i]) / 2)) / pieces;
      const weight = (rule.weights[i] * a) / (4 * Math.PI * pieces * (1 + x * x));
      const modulus = weight * Math.exp((-re * (1 + x * x)) / 2);
      sumRe += modulus * Math.cos((im * (1 + x * x)) / 2);
      sumIm -= modulus * Math.sin((im * (1 + x * x)) / 2);
    }
  }
  return [sumRe, sumIm];
}

const gap = (a: readonly number[], b: readonly number[]) => Math.hypot(a[0] - b[0], a[1] - b[1]);

describe('owenT', () => {
  // Owen (1956), Patefield & Tandy (2000), and T(h, 1) = Φ(h)(1 − Φ(h))/2: the source stands beside each value.
  const records = reference.values.filter(({ id }) => id.startsWith('owenT'));

  it.each(records.map(({ id, inputs, value, digits }) => [id, inputs, value, digits] as const))(
    '%s',
    (_, inputs, value, digits) => {
      const { h, a } = inputs as { h: string; a: string };
      const published = Number(value);
      // Owen's table has six decimals.
      const allowed = digits <= 6 ? 5e-7 : 4e-15 * published;
      expect(Math.abs(owenT(Number(h), Number(a)) - published)).toBeLessThan(allowed);
    },
  );

  it('is even in h, odd in a, atan(a)/2π at h = 0, and ¼ erfc(|h|/√2) at a = ∞', () => {
    expect(owenT(-1.3, 0.7)).toBe(owenT(1.3, 0.7));
    expect(owenT(1.3, -0.7)).toBe(-owenT(1.3, 0.7));
    for (const a of [0.2, 1, 5, 1e9, 1e300]) expect(owenT(0, a)).toBeCloseTo(Math.atan(a) / 2 / Math.PI, 15);
    expect(owenT(1.2, 0)).toBe(0);
    // Abramowitz & Stegun, table 26.1: Q(1) = 0.158655253931457.
    expect(owenT(1, Number.POSITIVE_INFINITY)).toBeCloseTo(0.158655253931457 / 2, 14);
    expect(owenT(1, Number.NEGATIVE_INFINITY)).toBeCloseTo(-0.158655253931457 / 2, 14);
    expect(owenT(50, 3)).toBeCloseTo(0, 300);
  });
});

describe('owenTComplex', () => {
  it('keeps to references at high precision for |h²| from 1e-6 to 1e7 (make-owen-complex.py)', () => {
    expect(complexReference.values.length).toBeGreaterThan(100);
    for (const { hSquared, a, T } of complexReference.values) {
      const found = owenTComplex([hSquared[0], hSquared[1]], a);
      const error = gap(found, T.map(Number));
      expect(error, `h² = ${hSquared}, a = ${a}`).toBeLessThan(1e-15);
      // To itself as well, but for the rounding of the exponent.
      const rounding = 4e-15 + 1e-16 * Math.hypot(...hSquared) * (1 + a * a);
      const allowed = rounding * Math.hypot(...T.map(Number));
      expect(error, `h² = ${hSquared}, a = ${a}`).toBeLessThanOrEqual(allowed);
    }
  });

  it('keeps to quadrature of the definition at random places, on both sides of every branch', () => {
    const random = randomStream(8);
    for (let i = 0; i < 300; i++) {
      const angle = i % 5 === 0 ? Math.PI / 2 : Math.PI * (random.uniform() - 0.5);
      const a = i % 7 === 0 ? 1 + 1e-9 * (random.uniform() - 0.5) : 10 ** (2 * random.uniform() - 1.2);
      const modulus = (i % 3 === 0 ? 14 + 6 * random.uniform() : 100 * random.uniform() ** 2) / (a * a);
      const hSquared: Complex = [modulus * Math.max(0, Math.cos(angle)), modulus * Math.sin(angle)];
      const error = gap(owenTComplex(hSquared, a), byDefinition(hSquared, a));
      expect(error, `h² = ${hSquared}, a = ${a}`).toBeLessThan(3e-14);
    }
  });

  it('is conjugate at the conjugate, and joins the real function', () => {
    const [re, im] = owenTComplex([3, 40], 0.8);
    expect(owenTComplex([3, -40], 0.8)).toEqual([re, -im]);
    expect(owenTComplex([4, 0], 0.5)[0]).toBe(owenT(2, 0.5));
  });

  it('stays finite for a particle nearly on an edge: h → 0 and a → ∞ together', () => {
    for (const d of [1e-3, 1e-9, 1e-30, 1e-150, 1e-200, 1e-320]) {
      const [re, im] = owenTComplex([0, -2 * d * d], 3 / d);
      // To first order in d: ¼ − T(ah, 0) − …
      expect(Math.abs(re - 0.25) + Math.abs(im)).toBeLessThan(2 * d + 1e-15);
    }
  });
});
