import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { logGamma, regularisedBeta } from '../../src/numeric/incompleteBeta.ts';
import { studentQuantile, studentTail } from '../../src/numeric/studentT.ts';

const { studentT } = JSON.parse(
  readFileSync(new URL('../reference/gum-examples.json', import.meta.url), 'utf8'),
);

describe('studentQuantile', () => {
  it.each(Object.entries<number>(studentT.p95))('gives the GUM’s t for 95 % at %s degrees', (degrees, t) => {
    expect(Math.abs(studentQuantile(0.975, Number(degrees)) - t)).toBeLessThanOrEqual(0.005001);
  });

  it.each(Object.entries<number>(studentT.p99))('gives the GUM’s t for 99 % at %s degrees', (degrees, t) => {
    expect(Math.abs(studentQuantile(0.995, Number(degrees)) - t)).toBeLessThanOrEqual(0.005001);
  });

  it('has its closed forms for one and two degrees of freedom', () => {
    for (const p of [0.51, 0.9, 0.975, 0.9999, 0.02]) {
      expect(studentQuantile(p, 1) / Math.tan(Math.PI * (p - 0.5))).toBeCloseTo(1, 9);
      const two = ((2 * p - 1) * Math.SQRT2) / Math.sqrt(1 - (2 * p - 1) ** 2);
      expect(studentQuantile(p, 2) / two).toBeCloseTo(1, 9);
    }
    expect(studentQuantile(0.5, 7)).toBeCloseTo(0, 12);
  });

  it('undoes the tail, and goes over into the normal distribution without a step', () => {
    for (const degrees of [1.5, 3, 17.3, 400, 1e5, 1e7, Number.POSITIVE_INFINITY]) {
      for (const p of [0.6, 0.95, 0.999]) {
        expect(studentTail(studentQuantile(p, degrees), degrees)).toBeCloseTo(1 - p, 10);
      }
    }
    const [below, above] = [0.999e6, 1.001e6].map((degrees) => studentQuantile(0.975, degrees));
    expect(Math.abs(below - above)).toBeLessThan(1e-5);
  });
});

describe('the incomplete beta function', () => {
  it('has its closed forms for whole numbers, and its mirror', () => {
    const x = 0.37;
    expect(regularisedBeta(x, 1 - x, 3, 1)).toBeCloseTo(x ** 3, 14);
    expect(regularisedBeta(x, 1 - x, 1, 4)).toBeCloseTo(1 - (1 - x) ** 4, 14);
    expect(regularisedBeta(x, 1 - x, 2.5, 7) + regularisedBeta(1 - x, x, 7, 2.5)).toBeCloseTo(1, 14);
    expect([regularisedBeta(0, 1, 2, 3), regularisedBeta(1, 0, 2, 3)]).toEqual([0, 1]);
  });

  it('stands on a gamma function that holds to 14 digits', () => {
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 13);
    let factorial = 0;
    for (let n = 1; n <= 50; n++) {
      factorial += Math.log(n);
      expect(logGamma(n + 1) / (factorial || 1)).toBeCloseTo(n === 1 ? 0 : 1, 13);
    }
  });
});
