import { describe, expect, it } from 'vitest';
import { chebyshevFit, chebyshevFour, chebyshevPairs } from '../../src/numeric/chebyshev.ts';
import type { Complex } from '../../src/numeric/complex.ts';
import {
  add,
  divide,
  exponential,
  multiply,
  scale,
  square,
  squareRoot,
  subtract,
  timesI,
} from '../../src/numeric/complex.ts';
import { countWhile } from '../../src/numeric/countWhile.ts';
import { sparseSamples } from '../../src/numeric/sparseSamples.ts';
import { cellIntegrals, hermitePieces, slopeAtStart } from '../../src/numeric/uniformTable.ts';

/** Order of convergence from errors at a step and at half of it. */
const order = ([coarse, fine]: number[]) => Math.log2(coarse / fine);

describe('Chebyshev series', () => {
  const four = (x: number, out: Float64Array) => {
    out[0] = Math.exp(x);
    out[1] = Math.cos(5 * x);
    out[2] = 1 / (1 + 4 * x * x);
    out[3] = 3 + 2 * x - x ** 3;
  };

  // e^t: coefficients I_n(1), twice but for the first (Abramowitz & Stegun 9.6.34, Table 9.8 and 9.9).
  it('has the coefficients of e^t', () => {
    const series = chebyshevFit((x, out) => out.set([Math.exp(x)]), 1, -1, 1, 24);
    for (const [n, value] of [1.2660658777520084, 0.5651591039924851, 0.1357476697670383].entries()) {
      expect(series[n]).toBeCloseTo(n === 0 ? value : 2 * value, 14);
    }
  });

  it('is exact for a polynomial of lower degree, and gives the fitted functions back', () => {
    const series = chebyshevFit(four, 4, -0.5, 2, 60);
    const [out, exact] = [new Float64Array(4), new Float64Array(4)];
    for (let i = 0; i <= 50; i++) {
      const x = -0.5 + 2.5 * (i / 50);
      chebyshevFour(series, 60, (x - 0.75) / 1.25, out);
      four(x, exact);
      // 1/(1 + 4x²) has poles beside the interval: convergence is slow there.
      const bounds = [1e-13, 1e-13, 1e-9, 1e-13];
      for (let j = 0; j < 4; j++) expect(Math.abs(out[j] - exact[j])).toBeLessThan(bounds[j]);
    }
    const tail = series.filter((_, i) => i % 4 === 3 && i > 16);
    expect(tail.every((value) => Math.abs(value) < 1e-14)).toBe(true);
  });

  it('takes a single term for a constant', () => {
    const out = new Float64Array(4);
    chebyshevFour(
      chebyshevFit((_, o) => o.set([1, 2, 3, 4]), 4, 0, 1, 1),
      1,
      0.3,
      out,
    );
    expect(out).toEqual(Float64Array.of(1, 2, 3, 4));
  });

  it('continues pairs into the complex plane', () => {
    const series = chebyshevFit((x, o) => o.set([Math.cos(3 * x), Math.sin(3 * x), x * x, -x]), 4, -1, 1, 22);
    const out = new Float64Array(4);
    for (const t of [
      [0.3, 0],
      [0.9, 0.4],
      [-0.2, -0.5],
      [1.1, 0.1],
    ] as Complex[]) {
      chebyshevPairs(series, 22, t[0], t[1], out);
      const wave = exponential(scale(timesI(t), 3));
      const other = subtract(square(t), timesI(t));
      expect(Math.hypot(out[0] - wave[0], out[1] - wave[1])).toBeLessThan(1e-10);
      expect(Math.hypot(out[2] - other[0], out[3] - other[1])).toBeLessThan(1e-10);
    }
  });
});

describe('complex arithmetic', () => {
  const places: Complex[] = [
    [3, 4],
    [-3, 4],
    [-3, -4],
    [0.1, -20],
    [-1e-8, 1e-3],
    [2, 0],
    [-2, 0],
    [0, 5],
  ];

  it('squares what it takes the root of, with a real part of 0 or more', () => {
    for (const a of places) {
      const root = squareRoot(a);
      expect(root[0]).toBeGreaterThanOrEqual(0);
      const back = square(root);
      expect(Math.hypot(back[0] - a[0], back[1] - a[1]) / Math.hypot(...a)).toBeLessThan(4e-16);
    }
    expect(squareRoot([3, 4])).toEqual([2, 1]);
    expect(squareRoot([-4, 0])).toEqual([0, 2]);
    expect(squareRoot([0, 0])).toEqual([0, 0]);
    // Close to the negative axis the small part keeps its digits.
    expect(squareRoot([-4, 1e-20])[0]).toBeCloseTo(2.5e-21, 30);
  });

  it('undoes products by quotients, sums by differences', () => {
    for (const a of places) {
      for (const b of places) {
        const back = divide(multiply(a, b), b);
        expect(Math.hypot(back[0] - a[0], back[1] - a[1]) / Math.hypot(...a)).toBeLessThan(1e-15);
        expect(subtract(add(a, b), b)[0]).toBeCloseTo(a[0], 12);
      }
    }
    expect(timesI([1, 2])).toEqual([-2, 1]);
    expect(exponential([Math.log(2), Math.PI / 2])[1]).toBeCloseTo(2, 15);
  });
});

describe('uniformTable', () => {
  // All derivatives are the function itself: none vanishes anywhere.
  const f = (x: number) => Math.exp(-x);
  const integral = (a: number, b: number) => Math.exp(-a) - Math.exp(-b);
  const samples = (step: number, count: number) =>
    Float64Array.from({ length: count }, (_, i) => f(i * step));

  it('integrates cells with errors of the seventh power of the step, at the start too', () => {
    for (const cell of [0, 1, 2, 10]) {
      const errors = [0.4, 0.2].map((step) => {
        const found = cellIntegrals(samples(step, 30), 20)[cell] * step;
        return Math.abs(found - integral(cell * step, (cell + 1) * step)) / f(cell * step);
      });
      expect(order(errors)).toBeGreaterThan(6.3);
      expect(errors[1]).toBeLessThan(0.2 ** 7 / 60);
    }
  });

  it('is exact for polynomials of the fifth degree', () => {
    const values = Float64Array.from({ length: 12 }, (_, i) => i ** 5 - 3 * i ** 2);
    const exact = (i: number) => i ** 6 / 6 - i ** 3;
    cellIntegrals(values, 9).forEach((found, i) => {
      expect(found / (exact(i + 1) - exact(i))).toBeCloseTo(1, 12);
    });
    expect(slopeAtStart(Float64Array.from({ length: 6 }, (_, i) => 2 + 7 * i - i ** 5))).toBeCloseTo(7, 11);
  });

  it('has slopes with errors of the sixth power, counted in steps', () => {
    const errors = [0.1, 0.05].map((step) => Math.abs(slopeAtStart(samples(step, 6)) + step));
    expect(order(errors)).toBeGreaterThan(5.5);
  });

  it('joins values and slopes by cubics with errors of the fourth power, at most h⁴/384', () => {
    const errors = [0.2, 0.1].map((step) => {
      const cells = 20;
      const slopes = Float64Array.from({ length: cells + 1 }, (_, i) => -step * f(i * step));
      const pieces = hermitePieces(samples(step, cells + 1), slopes, cells);
      let worst = 0;
      for (let i = 0; i < 10 * cells; i++) {
        const t = (i % 10) / 10;
        const [a, b, c, d] = pieces.subarray(4 * Math.floor(i / 10), 4 * Math.floor(i / 10) + 4);
        worst = Math.max(worst, Math.abs(a + t * (b + t * (c + t * d)) - f((i * step) / 10)));
      }
      expect(worst).toBeLessThan(step ** 4 / 384);
      expect(worst).toBeGreaterThan(step ** 4 / 460);
      return worst;
    });
    expect(Math.abs(order(errors) - 4)).toBeLessThan(0.15);
  });
});

describe('sparseSamples', () => {
  const fall = (h: number) => (place: number, out: Float64Array) =>
    out.set([Math.exp(-h * place), h * place]);

  it('follows slow functions with errors of the sixth power of the distance between computed places', () => {
    const errors = [0.04, 0.02].map((h) => {
      const samples = sparseSamples(161, 2, 8, fall(h));
      let worst = 0;
      for (let i = 0; i < 161; i++) {
        worst = Math.max(worst, Math.abs(samples[2 * i] - Math.exp(-h * i)));
        expect(samples[2 * i + 1]).toBeCloseTo(h * i, 12);
      }
      expect(worst).toBeLessThan(0.17 * (8 * h) ** 6);
      return worst;
    });
    expect(order(errors)).toBeGreaterThan(5.5);
  });

  it('computes few places, none beyond the last sample', () => {
    for (const [count, stride, most] of [
      [1, 8, 6],
      [2, 8, 6],
      [6, 8, 6],
      [7, 8, 6],
      [100, 8, 14],
      [50, 1, 50],
      [40, 2.5, 17],
    ]) {
      const places: number[] = [];
      const samples = sparseSamples(count, 1, stride, (place, out) => {
        places.push(place);
        out[0] = 2 + place - 0.01 * place ** 3;
      });
      expect(places).toHaveLength(most);
      expect(Math.max(...places)).toBeLessThanOrEqual(Math.max(count - 1, 5));
      expect(samples).toHaveLength(count);
      samples.forEach((value, i) => {
        expect(value).toBeCloseTo(2 + i - 0.01 * i ** 3, 9);
      });
    }
    expect(sparseSamples(0, 1, 8, (_, out) => out.fill(1))).toHaveLength(0);
  });
});

describe('countWhile', () => {
  it('counts what comes before the condition fails', () => {
    for (let limit = 0; limit <= 20; limit++) expect(countWhile(20, (i) => i < limit)).toBe(limit);
    expect(countWhile(0, () => true)).toBe(0);
  });
});
