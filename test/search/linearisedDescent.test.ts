import { describe, expect, it } from 'vitest';
import type { Outcome } from '../../src/search/linearisedDescent.ts';
import { linearisedDescent } from '../../src/search/linearisedDescent.ts';

type Functions = (x: readonly number[]) => number[];

/** Problems of the literature: the largest of some functions is to be made small. Recalled from memory; see each test. */
const PROBLEMS: Record<string, { functions: Functions; start: number[]; optimum: number; at: number[] }> = {
  // Charalambous & Bandler (1976), Int. J. Circuit Theory Appl. 4, 1; two functions are active, in two unknowns.
  CB2: {
    functions: ([x, y]) => [x ** 2 + y ** 4, (2 - x) ** 2 + (2 - y) ** 2, 2 * Math.exp(y - x)],
    start: [2, 2],
    optimum: 1.9522245,
    at: [1.1390376, 0.8995599],
  },
  // The same authors; all three functions are active at the minimum.
  CB3: {
    functions: ([x, y]) => [x ** 4 + y ** 2, (2 - x) ** 2 + (2 - y) ** 2, 2 * Math.exp(y - x)],
    start: [2, 2],
    optimum: 2,
    at: [1, 1],
  },
  // Madsen (1975), J. Inst. Maths Applics 16, 321: the largest modulus of three functions.
  Madsen: {
    functions: ([x, y]) => {
      const values = [x * x + y * y + x * y, Math.sin(x), Math.cos(y)];
      return [...values, ...values.map((value) => -value)];
    },
    start: [3, 1],
    optimum: 0.6164324,
    at: [0.4532962, -0.9065925],
  },
  // Rosen & Suzuki (1965), Comm. ACM 8, 113, as a minimax problem after Charalambous (1979) with the penalty factor 10.
  'Rosen-Suzuki': {
    functions: ([a, b, c, d]) => {
      const f = a * a + b * b + 2 * c * c + d * d - 5 * a - 5 * b - 21 * c + 7 * d;
      return [
        f,
        f + 10 * (a * a + b * b + c * c + d * d + a - b + c - d - 8),
        f + 10 * (a * a + 2 * b * b + c * c + 2 * d * d - a - d - 10),
        f + 10 * (2 * a * a + b * b + c * c + 2 * a - b - d - 5),
      ];
    },
    start: [0, 0, 0, 0],
    optimum: -44,
    at: [0, 1, 2, -1],
  },
};

/** The largest function as one more unknown t: small t, under function − t ≤ 0. */
function asOutcome(functions: Functions) {
  return (x: Float64Array): Outcome => ({
    objective: x[0],
    limits: functions(Array.from(x.subarray(1))).map((value) => value - x[0]),
  });
}

function optionsFor(n: number, maxEvaluations = 5000, scale = 1, tolStep = 1e-7) {
  return {
    lower: new Float64Array(n).fill(-100),
    upper: new Float64Array(n).fill(100),
    scale: new Float64Array(n).fill(scale),
    weight: 2,
    bend: 0,
    maxEvaluations,
    tolStep,
  };
}

function solve(name: string, scale = 1) {
  const { functions, start } = PROBLEMS[name];
  const visited: number[][] = [];
  const outcome = asOutcome(functions);
  const result = linearisedDescent(
    (x) => {
      visited.push(Array.from(x.subarray(1)));
      return outcome(x);
    },
    Float64Array.from([Math.max(...functions(start)), ...start]),
    optionsFor(start.length + 1, 5000, scale),
  );
  return { ...result, at: Array.from(result.x.subarray(1)), visited };
}

describe('linearisedDescent', () => {
  it.each(Object.keys(PROBLEMS))('solves %s', (name) => {
    const { functions, optimum, at } = PROBLEMS[name];
    for (const scale of [1, 0.3]) {
      const result = solve(name, scale);
      expect(result.stop).toBe('settled');
      expect(result.visited.length).toBe(result.evaluations);
      expect(Math.abs(Math.max(...functions(result.at)) - optimum)).toBeLessThan(2e-5);
      for (const [i, value] of at.entries()) expect(Math.abs(result.at[i] - value)).toBeLessThan(2e-3);
    }
  });

  it.each(Object.keys(PROBLEMS))('%s: the values recalled are a minimum', (name) => {
    const { functions, optimum, at } = PROBLEMS[name];
    const worst = (x: number[]) => Math.max(...functions(x));
    expect(worst(at)).toBeCloseTo(optimum, 5);
    // Every step of 0.01 or 0.3 along a grid of directions makes it worse.
    const directions = at.reduce<number[][]>(
      (all, _) => all.flatMap((d) => [-1, -0.4, 0, 0.7, 1].map((e) => [...d, e])),
      [[]],
    );
    for (const direction of directions.filter((d) => d.some((e) => e !== 0))) {
      for (const length of [0.01, 0.3]) {
        expect(worst(at.map((value, i) => value + length * direction[i]))).toBeGreaterThan(optimum);
      }
    }
  });

  it('converges at least quadratically where as many limits are active as there are unknowns', () => {
    // CB3 with t has three unknowns and three active limits. The derivatives are differences, right to about 1e-4, so the
    // digits of the last step are theirs.
    const { functions, optimum } = PROBLEMS.CB3;
    const errors: number[] = [];
    const outcome = asOutcome(functions);
    let best = Number.POSITIVE_INFINITY;
    const start = [1.3, 0.8];
    linearisedDescent(
      (x) => {
        const here = outcome(x);
        const value = here.objective + 2 * Math.log1p(Math.max(0, ...Array.from(here.limits)));
        // Differences move a point by 1e-4 and are not steps.
        if (value < best - 1e-3 || (value < best && best - optimum < 1e-3)) errors.push(value - optimum);
        best = Math.min(best, value);
        return here;
      },
      Float64Array.from([Math.max(...functions(start)), ...start]),
      optionsFor(3),
    );
    const late = errors.filter((error) => error < 0.3);
    for (let i = 1; i < late.length; i++)
      expect(late[i]).toBeLessThan(Math.max(3 * late[i - 1] ** 2, 1e-4 * late[i - 1], 1e-12));
    // No step is taken that promises less than 1e-6.
    expect(late[late.length - 1]).toBeLessThan(1e-6);
    expect(errors.length).toBeLessThan(12);
  });

  it('keeps to bounds, and settles on them', () => {
    const seen: number[][] = [];
    const lower = Float64Array.of(-1, 0.5);
    const upper = Float64Array.of(2, 3);
    const result = linearisedDescent(
      (x) => {
        seen.push(Array.from(x));
        return { objective: (x[0] - 5) ** 2 + (x[1] + 1) ** 2, limits: [-1] };
      },
      Float64Array.of(2, 3),
      { ...optionsFor(2), lower, upper },
    );
    for (const x of seen) {
      for (const [i, value] of x.entries()) {
        expect(value).toBeGreaterThanOrEqual(lower[i]);
        expect(value).toBeLessThanOrEqual(upper[i]);
      }
    }
    expect(result.x[0]).toBeCloseTo(2, 9);
    expect(result.x[1]).toBeCloseTo(0.5, 9);
  });

  it('leaves a coordinate alone that its bounds hold in place', () => {
    const result = linearisedDescent(
      (x) => ({ objective: (x[0] - 3) ** 2 + x[1], limits: [-1] }),
      Float64Array.of(0, 7),
      { ...optionsFor(2), lower: Float64Array.of(-100, 7), upper: Float64Array.of(100, 7) },
    );
    expect(result.stop).toBe('settled');
    expect(result.x[0]).toBeCloseTo(3, 3);
    expect(result.x[1]).toBe(7);
  });

  it('gives way to the least excess where limits cannot be met', () => {
    // x ≥ 1 and x ≤ −1: both are missed by 1 in the middle.
    const result = linearisedDescent(
      (x) => ({ objective: 0, limits: [1 - x[0], x[0] + 1] }),
      Float64Array.of(0.7),
      optionsFor(1),
    );
    expect(result.x[0]).toBeCloseTo(0, 4);
    expect(result.value).toBeCloseTo(2 * Math.log(2), 4);
  });

  it.each([
    ['a whole plane', () => false],
    ['half a plane', (x: Float64Array) => x[1] > 1.4],
    ['all but a thin strip', (x: Float64Array) => Math.abs(x[1] - x[2] - 1) > 3e-4],
    // Every derivative takes two evaluations: the first side is always null.
    ['all that lies beyond the start', (x: Float64Array) => x[0] > 5 || x[1] > 1.4 || x[2] > 0.4],
  ] as const)('never spends more than it may, with null for %s', (_, isNull) => {
    const outcome = asOutcome(PROBLEMS.CB3.functions);
    for (let budget = 1; budget <= 60; budget++) {
      let spent = 0;
      const result = linearisedDescent(
        (x) => {
          spent++;
          return isNull(x) ? null : outcome(x);
        },
        Float64Array.of(5, 1.4, 0.4),
        optionsFor(3, budget),
      );
      expect(spent).toBeLessThanOrEqual(budget);
      expect(result.evaluations).toBe(spent);
      if (result.stop === 'maxEvaluations') expect(spent).toBeGreaterThan(budget - 5);
    }
  });

  it('takes differences the other way, and shorter steps, where points cannot be used', () => {
    // The minimum of (x − 1)² + y² lies in the forbidden half x > 0.
    const result = linearisedDescent(
      (x) => (x[0] > 0 ? null : { objective: (x[0] - 1) ** 2 + x[1] ** 2, limits: [-1] }),
      Float64Array.of(-2, 1),
      { ...optionsFor(2), tolStep: 1e-6 },
    );
    expect(result.x[0]).toBeLessThanOrEqual(0);
    expect(result.x[0]).toBeGreaterThan(-0.01);
  });

  it('stops at once where the start cannot be used, or nothing around it', () => {
    const nowhere = linearisedDescent(() => null, Float64Array.of(1, 2), optionsFor(2));
    expect(nowhere).toEqual({ x: Float64Array.of(1, 2), value: Infinity, evaluations: 1, stop: 'stuck' });
    const alone = linearisedDescent(
      (x) => (x[0] === 1 ? { objective: 4, limits: [-1] } : null),
      Float64Array.of(1),
      optionsFor(1),
    );
    expect(alone).toEqual({ x: Float64Array.of(1), value: 4, evaluations: 3, stop: 'stuck' });
  });

  it('does not change the start it is given', () => {
    const start = Float64Array.of(5, 2, 2);
    linearisedDescent(asOutcome(PROBLEMS.CB3.functions), start, optionsFor(3));
    expect(start).toEqual(Float64Array.of(5, 2, 2));
  });
});
