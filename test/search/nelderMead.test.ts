import { describe, expect, it } from 'vitest';
import { nelderMead, nelderMeadSteps } from '../../src/search/nelderMead.ts';
import type { Objective } from '../../src/search/objective.ts';
import { rosenbrock, sphere, sum } from './functions.ts';
import { published } from './reference.ts';

const squares = (residuals: number[]) => residuals.reduce((total, r) => total + r * r, 0);

/** Moré, Garbow & Hillstrom (1981), ACM Trans. Math. Softw. 7, 17, by the names in the reference file. */
const functions: Record<string, Objective> = {
  rosen: rosenbrock,
  'Rosenbrock n=2 (MGH 1)': rosenbrock,
  'Beale (MGH 5)': ([x, y]) => squares([1, 2, 3].map((i) => [1.5, 2.25, 2.625][i - 1] - x * (1 - y ** i))),
  'Powell singular (MGH 13)': ([a, b, c, d]) =>
    squares([a + 10 * b, Math.sqrt(5) * (c - d), (b - 2 * c) ** 2, Math.sqrt(10) * (a - d) ** 2]),
  'Wood (MGH 14)': ([a, b, c, d]) =>
    100 * (b - a * a) ** 2 +
    (1 - a) ** 2 +
    90 * (d - c * c) ** 2 +
    (1 - c) ** 2 +
    10 * (b + d - 2) ** 2 +
    (b - d) ** 2 / 10,
  'Helical valley (MGH 7)': ([a, b, c]) => {
    const turns = Math.atan(b / a) / (2 * Math.PI) + (a < 0 ? 0.5 : 0);
    return squares([10 * (c - 10 * turns), 10 * (Math.hypot(a, b) - 1), c]);
  },
  'Brown-Dennis (MGH 16)': ([a, b, c, d]) =>
    sum(20, (i) => {
      const t = (i + 1) / 5;
      return ((a + t * b - Math.exp(t)) ** 2 + (c + d * Math.sin(t) - Math.cos(t)) ** 2) ** 2;
    }),
};

describe('nelderMead', () => {
  // Published examples, and runs of an independent implementation of Lagarias et al. (1998): see each source.
  it.each(published('nm_'))('takes the published number of steps: $id', ({ id, inputs, value }) => {
    const f = functions[id.split('_')[1]];
    const tolerance = inputs['xatol=fatol'];
    const found = nelderMead(f, Float64Array.from(inputs.x0), { tolX: tolerance, tolFun: tolerance });
    expect([found.iterations, found.evaluations]).toEqual([value.nit, value.nfev]);
    expect(Math.abs(found.value / Number(value.f) - 1)).toBeLessThan(1e-9);
    expect(found.value).toBe(f(found.x));
    expect(found.stop).toBe('tolerance');
  });

  it('never spends more than was granted', () => {
    for (let granted = 4; granted < 120; granted++) {
      let count = 0;
      const found = nelderMead(
        (x) => {
          count++;
          return rosenbrock(x);
        },
        Float64Array.of(-1.2, 1, 3),
        { maxEvaluations: granted },
      );
      expect(count).toBe(granted);
      expect(found).toMatchObject({
        evaluations: granted,
        stop: 'maxEvaluations',
        value: rosenbrock(found.x),
      });
    }
  });

  it('keeps within bounds and finds an optimum on one', () => {
    const lower = Float64Array.of(0.5, -1);
    const upper = Float64Array.of(2, 3);
    const found = nelderMead(
      (x) => {
        expect(x.every((v, i) => v >= lower[i] && v <= upper[i])).toBe(true);
        return sphere(x);
      },
      Float64Array.of(2, 3),
      { lower, upper, tolX: 1e-9, tolFun: 1e-12, step: Float64Array.of(0.3, 0.3) },
    );
    expect(found.x[0]).toBeCloseTo(0.5, 12);
    expect(found.x[1]).toBeCloseTo(0, 6);
  });

  it('ends on a plain, and where nothing can be used', () => {
    expect(nelderMead(() => 1, Float64Array.of(1, 2)).stop).toBe('tolerance');
    expect(nelderMead(() => Number.POSITIVE_INFINITY, Float64Array.of(1, 2)).stop).toBe('tolerance');
  });

  it('stops loudly at NaN and names the point', () => {
    expect(() => nelderMead((x) => (x[0] > 1 ? Number.NaN : 0), Float64Array.of(1))).toThrow(
      'evaluation 2 scored NaN at [1.05]',
    );
  });

  it('can be driven step by step', () => {
    const steps = nelderMeadSteps(Float64Array.of(-1.2, 1));
    let next = steps.next();
    while (!next.done) next = steps.next(rosenbrock(next.value));
    expect(next.value).toEqual(nelderMead(rosenbrock, Float64Array.of(-1.2, 1)));
  });

  it('lists every mistake in the options', () => {
    const run = () =>
      nelderMead(sphere, Float64Array.of(1, 9), {
        upper: Float64Array.of(2, 2),
        step: Float64Array.of(0, 1),
        tolX: 0,
        maxEvaluations: 2,
      });
    expect(run).toThrow(
      [
        'start[1]: found 9, expected a number from -Infinity to 2',
        'tolX: found 0, expected a finite number above 0',
        'maxEvaluations: found 2, expected a whole number, at least 3',
        'step[0]: found 0, expected a finite number other than 0',
      ].join('\n'),
    );
  });
});
