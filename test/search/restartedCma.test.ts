import { describe, expect, it } from 'vitest';
import type { RandomSource } from '../../src/base/random.ts';
import { randomStream } from '../../src/base/random.ts';
import { minimise, RestartedCma, type RestartOptions } from '../../src/search/restartedCma.ts';
import { rastrigin, rosenbrock, sphere } from './functions.ts';

const box = (n: number) => ({ lower: new Float64Array(n).fill(-5), upper: new Float64Array(n).fill(5) });
const anywhere = (n: number) => (random: RandomSource) => ({
  start: Float64Array.from({ length: n }, () => -5 + 10 * random.uniform()),
  sigma: 2,
});
const options = (n: number, over: Partial<RestartOptions> = {}): RestartOptions => ({
  ...box(n),
  nextStart: anywhere(n),
  budget: 2000,
  random: randomStream(1),
  ...over,
});

describe('minimise', () => {
  it.each([1, 9, 500, 1234])('spends the budget of %i and no more', (budget) => {
    let count = 0;
    const found = minimise(
      (x) => {
        count++;
        expect(x.every((v) => v >= -5 && v <= 5)).toBe(true);
        return rastrigin(x);
      },
      options(3, { budget }),
    );
    expect(count).toBe(budget);
    expect(found.evaluations).toBe(budget);
    expect(found.value).toBe(rastrigin(found.x));
  });

  it('never spends more with a polish either, whatever the scale', () => {
    for (const budget of [1, 20, 700]) {
      const scale = Float64Array.of(1, 3, 1e-3);
      const over = { budget, scale, polish: true };
      let count = 0;
      const f = (x: Float64Array) => {
        count++;
        expect(x.every((v) => v >= -5 && v <= 5)).toBe(true);
        return -x[0] + x[1] + (x[2] - 1) ** 2;
      };
      expect(minimise(f, options(3, over)).evaluations).toBe(count);
      expect(count).toBeLessThanOrEqual(budget);
    }
  });

  it('finds what one run misses: the lowest of many dents', () => {
    const hits = (restarts: boolean) =>
      Array.from({ length: 8 }, (_, seed) => {
        const over = { budget: 12_000, tolFun: 1e-6, random: randomStream(seed) };
        const search = new RestartedCma(options(3, over));
        while (!search.done && (restarts || search.result.restarts === 1)) {
          search.tell(search.ask().map(rastrigin));
        }
        return search.result.value < 1e-6;
      }).filter(Boolean).length;
    const [once, again] = [hits(false), hits(true)];
    expect(once).toBeLessThan(3);
    expect(again).toBeGreaterThan(5);
  });

  it('numbers the runs for nextStart', () => {
    const seen: number[] = [];
    const nextStart = (random: RandomSource, index: number) => {
      seen.push(index);
      return anywhere(3)(random);
    };
    const { restarts } = minimise(sphere, options(3, { nextStart, budget: 5000 }));
    expect(restarts).toBeGreaterThan(3);
    expect(seen).toEqual(Array.from({ length: restarts }, (_, k) => k));
  });

  it('gives the same numbers for the same seed, scored at once or step by step', () => {
    const over = () => ({ random: randomStream(7), polish: true });
    const plain = minimise(rosenbrock, options(4, over()));
    expect(minimise(rosenbrock, options(4, over()))).toEqual(plain);

    const search = new RestartedCma(options(4, over()));
    while (!search.done) {
      const points = search.ask();
      const values = new Float64Array(points.length);
      // Last first, as workers might.
      for (let k = points.length - 1; k >= 0; k--) values[k] = rosenbrock(points[k]);
      search.tell(values);
    }
    expect(search.result).toEqual(plain);
  });

  it('polishes: runs cut short end lower with Nelder–Mead from their best point', () => {
    const median = (polish: boolean) =>
      Array.from({ length: 11 }, (_, seed) => {
        const over = { budget: 500, random: randomStream(seed), polish };
        return minimise(rosenbrock, options(2, over)).value;
      }).sort((a, b) => a - b)[5];
    expect(median(true)).toBeLessThan(0.01 * median(false));
  });

  it('keeps a point even where none can be used', () => {
    const found = minimise(() => Number.POSITIVE_INFINITY, options(2, { budget: 300, polish: true }));
    expect(found.value).toBe(Number.POSITIVE_INFINITY);
    expect(found.x).toHaveLength(2);
  });

  it('says what is wrong', () => {
    expect(() => minimise(sphere, options(2, { budget: 0 }))).toThrow(
      'budget: found 0, expected a whole number, at least 1',
    );
    const outside = () => ({ start: Float64Array.of(9, 0), sigma: 1 });
    expect(() => minimise(sphere, options(2, { nextStart: outside }))).toThrow('start[0]: found 9');
    expect(() => minimise(() => Number.NaN, options(2))).toThrow('candidate 1 of 6 scored NaN at [');
    expect(() => new RestartedCma(options(2)).tell([1])).toThrow('tell: 1 values for 6 points');
  });
});
