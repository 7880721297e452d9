import { describe, expect, it } from 'vitest';
import { complexErfc, faddeeva } from '../../src/numeric/complexError.ts';
import reference from '../reference/special-functions.json' with { type: 'json' };

const out = new Float64Array(2);
const w = (x: number, y: number): [number, number] => {
  faddeeva(x, y, out);
  return [out[0], out[1]];
};
const erfc = (x: number, y: number): [number, number] => {
  complexErfc(x, y, out);
  return [out[0], out[1]];
};

/** |a − b| over |b|. */
const distance = ([a, b]: readonly number[], [c, d]: readonly number[]) =>
  Math.hypot(a - c, b - d) / Math.hypot(c, d);

describe('faddeeva', () => {
  // Each record carries its source: Johnson (2012), and own computation at 30 digits on the grid of Abramowitz & Stegun's table 7.9.
  const records = reference.values.filter(({ id }) => id.startsWith('w_'));

  it('has records in both half planes, near the axes and far out', () => {
    expect(records.length).toBeGreaterThan(40);
  });

  it.each(records.map(({ id, inputs, value }) => [id, inputs, value] as const))(
    '%s: within 3e-15 of |w|',
    (_, inputs, value) => {
      const { x, y } = inputs as { x: string; y: string };
      const found = w(Number(x), Number(y));
      expect(distance(found, (value as string[]).map(Number))).toBeLessThan(3e-15);
    },
  );

  it('follows w(−x + iy) = conj w(x + iy) and w(z) + w(−z) = 2 e^(−z²)', () => {
    for (const [x, y] of [
      [0.3, 0.2],
      [2.5, 1.5],
      [7, 3],
      [0.01, 5],
    ]) {
      const [re, im] = w(x, y);
      expect(distance(w(-x, y), [re, -im])).toBeLessThan(1e-15);
      const [below, belowIm] = w(-x, -y);
      const modulus = 2 * Math.exp(y * y - x * x);
      const both = [modulus * Math.cos(2 * x * y), -modulus * Math.sin(2 * x * y)];
      expect(Math.hypot(re + below - both[0], im + belowIm - both[1])).toBeLessThan(
        1e-14 * (modulus + Math.hypot(re, im)),
      );
    }
  });

  it('is bounded and falls as i/(√π z) out to 1e8 in the upper half plane, and overflows only below it', () => {
    for (const x of [1e4, 1e6, 1e8]) {
      expect(distance(w(x, 0), [0, 1 / (Math.sqrt(Math.PI) * x)])).toBeLessThan(1e-8);
      expect(distance(w(0, x), [1 / (Math.sqrt(Math.PI) * x), 0])).toBeLessThan(1e-8);
    }
    expect(Number.isFinite(w(0.1, -26)[0])).toBe(true);
    expect(w(0, -27)[0]).toBe(Number.POSITIVE_INFINITY);
  });
});

describe('complexErfc', () => {
  it('knows erfc of real numbers (Abramowitz & Stegun 1964, table 7.1 and 7.3: erf 0.5, 1, 2)', () => {
    expect(1 - erfc(0.5, 0)[0]).toBeCloseTo(0.5204998778, 10);
    expect(1 - erfc(1, 0)[0]).toBeCloseTo(0.8427007929, 10);
    expect(1 - erfc(2, 0)[0]).toBeCloseTo(0.995322265, 10);
  });

  it('gives Fresnel’s integrals: C + iS = (1 + i)/2 erf(√π (1 − i) x/2) (DLMF 7.5.8; values of A&S table 7.7)', () => {
    const records = reference.values.filter(({ id }) => id.startsWith('fresnel'));
    expect(records.length).toBeGreaterThan(2);
    for (const { inputs, value } of records) {
      const x = Number((inputs as { x: string }).x);
      const { C, S } = value as { C: string; S: string };
      const half = (Math.sqrt(Math.PI) * x) / 2;
      const [re, im] = erfc(half, -half);
      const found = [(1 - re + im) / 2, (1 - re - im) / 2];
      expect(distance(found, [Number(C), Number(S)])).toBeLessThan(1e-14);
    }
  });

  it('is 2 − erfc(−z) on the left, 1 at 0, and conj at the conjugate', () => {
    expect(erfc(0, 0)[0]).toBeCloseTo(1, 15);
    const [re, im] = erfc(1.2, 0.7);
    expect(distance(erfc(-1.2, -0.7), [2 - re, -im])).toBeLessThan(1e-15);
    expect(distance(erfc(1.2, -0.7), [re, -im])).toBeLessThan(1e-15);
  });
});
