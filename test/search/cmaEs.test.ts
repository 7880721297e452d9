import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { CmaEs } from '../../src/search/cmaEs.ts';
import type { CmaOptions } from '../../src/search/cmaOptions.ts';
import type { Objective } from '../../src/search/objective.ts';
import { ellipsoid, rosenbrock, sphere } from './functions.ts';
import { published } from './reference.ts';

const options = (over: Partial<CmaOptions> = {}): CmaOptions => ({
  start: Float64Array.of(1, 1, 1),
  sigma: 0.5,
  random: randomStream(1),
  ...over,
});

/** Runs until a stop, or until `enough` says so, and returns the points of all generations. */
function run(f: Objective, cma: CmaEs, enough = (_: CmaEs) => false): Float64Array[] {
  const seen: Float64Array[] = [];
  while (cma.stopReason() === undefined && !enough(cma)) {
    const points = cma.ask();
    seen.push(...points);
    cma.tell(points.map(f));
  }
  return seen;
}

describe('CmaEs: speed', () => {
  const cases = published('cma_evals_').map((entry) => ({
    ...entry,
    n: Number(/n(\d+)$/.exec(entry.id)?.[1]),
    f: entry.id.includes('sphere') ? sphere : entry.id.includes('ellipsoid') ? ellipsoid : rosenbrock,
  }));

  // Own runs of the tutorial's algorithm, 51 seeds: test/reference/optimisation.json.
  it.each(cases)(
    'reaches 1e-10 as fast as the tutorial: $id',
    ({ n, f, value }) => {
      const [start, sigma] = f === rosenbrock ? [0, 0.1] : [1, 1];
      // Large n takes long, and its counts scatter less.
      const seeds = n > 10 ? 9 : 21;
      const counts = Array.from({ length: seeds }, (_, seed) => {
        const cma = new CmaEs({
          start: new Float64Array(n).fill(start),
          sigma,
          random: randomStream(seed + 1),
        });
        run(f, cma, () => cma.best.value < 1e-10);
        return cma.best.value < 1e-10 ? cma.evaluations : Number.POSITIVE_INFINITY;
      });
      const median = counts.sort((a, b) => a - b)[(seeds - 1) / 2];
      expect(median).toBeLessThan(1.1 * value.own_active_tutorial.median);
      // Without negative weights the valleys take longer by more than a tenth: they are at work.
      if (f !== sphere) expect(median).toBeLessThan(0.92 * value.own_positive_weights.median);
      // Up to 350 000 evaluations: slow where the machine is busy.
    },
    60_000,
  );
});

describe('CmaEs: invariance', () => {
  it('gives the same numbers for the same seed, and others for another', () => {
    const points = (seed: number) => run(rosenbrock, new CmaEs(options({ random: randomStream(seed) })));
    expect(points(3)).toEqual(points(3));
    expect(points(3)).not.toEqual(points(4));
  });

  it('looks at ranks alone', () => {
    const few = { maxEvaluations: 300, tolFun: 0 };
    const plain = run(rosenbrock, new CmaEs(options(few)));
    const other = run((x) => 8 * rosenbrock(x) - 1024, new CmaEs(options(few)));
    expect(other).toEqual(plain);
  });

  it('takes units in by scale: the same search in other units', () => {
    const units = [2 ** -20, 4, 1024];
    const inUnits = run(
      (x) => rosenbrock(x.map((v, i) => v / units[i])),
      new CmaEs(
        options({
          start: Float64Array.from(units),
          scale: Float64Array.from(units),
          lower: Float64Array.from(units, (u) => -2 * u),
          maxEvaluations: 400,
        }),
      ),
    );
    const plain = run(
      rosenbrock,
      new CmaEs(options({ lower: new Float64Array(3).fill(-2), maxEvaluations: 400 })),
    );
    expect(inUnits.map((x) => x.map((v, i) => v / units[i]))).toEqual(plain);
  });
});

describe('CmaEs: bounds', () => {
  it.each([
    ['both', Float64Array.of(0, -1, 2), Float64Array.of(2, 1.5, 2.5)],
    ['lower', Float64Array.of(0, -1, 2), undefined],
  ])('finds an optimum in a corner and never steps outside: %s', (_, lower, upper) => {
    const cma = new CmaEs(
      options({
        start: Float64Array.of(1, 1.2, 2.4),
        random: randomStream(5),
        lower,
        ...(upper && { upper }),
        maxEvaluations: 4000,
      }),
    );
    const seen = run((x) => x[0] + 3 * x[1] + 0.1 * x[2], cma);
    for (const x of seen) {
      expect(x.every((v, i) => v >= lower[i] && v <= (upper?.[i] ?? Number.POSITIVE_INFINITY))).toBe(true);
    }
    for (const [i, v] of cma.best.x.entries()) expect(v).toBeCloseTo(lower[i], 9);
  });

  it('finds an optimum inside as well, from a start on a bound', () => {
    const box = { lower: new Float64Array(3).fill(0), upper: new Float64Array(3).fill(7) };
    const cma = new CmaEs(options({ start: Float64Array.of(0, 7, 0), ...box }));
    run(rosenbrock, cma);
    expect(cma.best.value).toBeLessThan(1e-10);
  });
});

describe('CmaEs: values', () => {
  it('ranks +Infinity last and finds the optimum at the edge of what can be used', () => {
    const cma = new CmaEs(options({ start: Float64Array.of(3, 3, 3), random: randomStream(2) }));
    const f: Objective = (x) => (x[0] + x[1] + x[2] < 3 ? Number.POSITIVE_INFINITY : sphere(x));
    run(f, cma);
    expect(cma.best.value).toBeGreaterThanOrEqual(3 - 1e-12);
    expect(cma.best.value).toBeLessThan(3.001);
  });

  it('ends by itself where nothing can be used', () => {
    const cma = new CmaEs(options());
    run(() => Number.POSITIVE_INFINITY, cma);
    expect(cma.stopReason()).toBe('tolXUp');
    expect(cma.best).toEqual({ x: Float64Array.of(1, 1, 1), value: Number.POSITIVE_INFINITY });
  });

  it.each([Number.NaN, Number.NEGATIVE_INFINITY])('stops loudly at %s and names the candidate', (bad) => {
    const cma = new CmaEs(options());
    const points = cma.ask();
    const told = () => cma.tell(points.map((_, k) => (k === 2 ? bad : 1)));
    expect(told).toThrow(`candidate 3 of 7 scored ${bad} at [${points[2].join(', ')}]`);
    expect(told).toThrow(expect.objectContaining({ code: 'machine' }));
  });

  it('refuses to be told or asked out of turn', () => {
    const cma = new CmaEs(options());
    expect(() => cma.tell([1])).toThrow('tell: no generation has been asked for');
    cma.ask();
    expect(() => cma.ask()).toThrow('ask: the last generation has not been told yet');
    expect(() => cma.tell([1, 2])).toThrow('tell: 2 values for 7 points');
  });

  it('does not mind what the caller does to the points', () => {
    const plain = new CmaEs(options({ maxEvaluations: 70 }));
    run(rosenbrock, plain);
    const abused = new CmaEs(options({ maxEvaluations: 70 }));
    run((x) => {
      const value = rosenbrock(x);
      x.fill(0);
      return value;
    }, abused);
    expect(abused.best).toEqual(plain.best);
  });
});

describe('CmaEs: stop reasons', () => {
  const stopOf = (f: Objective, over: Partial<CmaOptions>) => {
    const cma = new CmaEs(options(over));
    run(f, cma);
    return cma.stopReason();
  };
  it.each<[string, Objective, Partial<CmaOptions>]>([
    ['maxEvaluations', sphere, { maxEvaluations: 100 }],
    ['tolX', sphere, { tolX: 1e-3 }],
    ['tolFun', sphere, { tolFun: 1e-3 }],
    ['equalFunValues', (x) => Math.floor(sphere(x) / 1000), { tolFun: 0, tolX: 0 }],
    ['tolXUp', (x) => -x[0], {}],
    ['conditionCov', (x) => x[0] ** 2 + 1e16 * x[1] ** 2 + x[2] ** 2, { tolFun: 0, tolX: 0 }],
  ])('%s', (wanted, f, over) => {
    expect(stopOf(f, over)).toBe(wanted);
  });

  it('noEffectAxis or noEffectCoord: where rounding swallows every step', () => {
    const stop = stopOf((x) => sphere(x.map((v) => v - 1)), { tolFun: 0, tolX: 0 });
    expect(stop).toMatch(/^noEffect(Axis|Coord)$/);
  });

  it('stagnation: where noise is all that is left', () => {
    const noise = randomStream(8);
    expect(stopOf((x) => sphere(x) + noise.uniform(), { tolX: 0 })).toBe('stagnation');
  });

  it('tells the spread in the units of each coordinate', () => {
    const cma = new CmaEs(options({ scale: Float64Array.of(1, 10, 1e-6), sigma: 0.5 }));
    expect([...cma.spread()]).toEqual([0.5, 5, 0.5e-6]);
  });

  it('works in one dimension', () => {
    const cma = new CmaEs(options({ start: Float64Array.of(4) }));
    run((x) => (x[0] - 1) ** 2, cma);
    expect(cma.best.x[0]).toBeCloseTo(1, 5);
  });
});

describe('CmaEs: options', () => {
  const message = (over: Partial<CmaOptions>) => {
    try {
      new CmaEs(options(over));
    } catch (error) {
      expect(error).toMatchObject({ name: 'RimwrightError', code: 'input' });
      return (error as Error).message.split('\n');
    }
    return [];
  };

  it('lists every mistake, one a line', () => {
    expect(
      message({
        start: Float64Array.of(1, Number.NaN),
        sigma: 0,
        lower: Float64Array.of(2, 0),
        upper: Float64Array.of(3),
        population: 3.5,
        scale: Float64Array.of(1, -1),
        maxEvaluations: 0,
        tolX: -1,
        tolFun: Number.NaN,
      }),
    ).toEqual([
      'upper: found 1 numbers, expected 2, one a coordinate',
      'start[0]: found 1, expected a number from 2 to 3',
      'start[1]: found NaN, expected a number from 0 to Infinity',
      'sigma: found 0, expected a finite number above 0',
      'scale[1]: found -1, expected a finite number above 0',
      'population: found 3.5, expected a whole number, at least 4',
      'maxEvaluations: found 0, expected a whole number, at least 1',
      'tolX: found -1, expected a number, at least 0',
      'tolFun: found NaN, expected a number, at least 0',
    ]);
  });

  it('wants room between the bounds, and a coordinate at least', () => {
    expect(message({ lower: Float64Array.of(0, 1, 0), upper: Float64Array.of(2, 1, 2) })).toEqual([
      'lower[1]: found 1, expected less than upper[1] = 1',
    ]);
    expect(message({ start: new Float64Array() })).toEqual([
      'start: found no coordinates, expected at least one',
    ]);
  });
});
