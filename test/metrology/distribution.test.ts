import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { shortestInterval, symmetricInterval } from '../../src/metrology/coverageIntervals.ts';
import type { Distribution } from '../../src/metrology/distribution.ts';
import { draw, standardUncertainty } from '../../src/metrology/distribution.ts';
import { monteCarlo } from '../../src/metrology/monteCarlo.ts';
import { studentQuantile } from '../../src/numeric/studentT.ts';

function drawn(distribution: Distribution, count: number): Float64Array {
  const random = randomStream(11);
  return Float64Array.from({ length: count }, () => draw(distribution, random)).sort();
}

const momentsOf = (values: Float64Array) => {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return [mean, Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length)];
};

describe('draw', () => {
  it.each<Distribution>([
    { kind: 'normal', mean: 3, deviation: 0.5 },
    { kind: 'rectangular', mean: 3, half: 0.5 },
    { kind: 'triangular', mean: 3, half: 0.5 },
    { kind: 'arcsine', mean: 3, half: 0.5 },
    { kind: 'trapezoidal', mean: 3, half: 0.5, top: 0.3 },
    { kind: 'curvilinear', mean: 3, half: 0.5, blur: 0.2 },
  ])('has mean and standard deviation of $kind', (distribution) => {
    const [mean, deviation] = momentsOf(drawn(distribution, 100_000));
    expect(Math.abs(mean - 3)).toBeLessThan(0.006);
    expect(deviation / standardUncertainty(distribution)).toBeCloseTo(1, 2);
  });

  it.each<[Distribution, number, number]>([
    // What share lies below a value, by hand.
    [{ kind: 'triangular', mean: 0, half: 1 }, -0.5, 0.125],
    [{ kind: 'arcsine', mean: 0, half: 1 }, -0.5, 1 / 3],
    [{ kind: 'trapezoidal', mean: 0, half: 1, top: 0.5 }, -0.5, 1 / 6],
    [{ kind: 'rectangular', mean: 0, half: 1 }, -0.5, 0.25],
  ])('has the shape of %j', (distribution, at, share) => {
    const values = drawn(distribution, 100_000);
    expect(values.filter((value) => value < at).length / values.length).toBeCloseTo(share, 2);
    expect(Math.max(...[values[0], values.at(-1) ?? 0].map(Math.abs))).toBeLessThanOrEqual(1);
  });

  it.each([3, 4.5, 20])('has the quantiles of Student’s t with %d degrees of freedom', (degreesOfFreedom) => {
    const values = drawn({ kind: 'student', mean: 2, scale: 0.5, degreesOfFreedom }, 200_000);
    for (const p of [0.1, 0.5, 0.9, 0.975]) {
      const end = 2 + 0.5 * studentQuantile(p, degreesOfFreedom);
      const below = values.filter((value) => value < end).length;
      expect(Math.abs(below / values.length - p)).toBeLessThan(0.004);
    }
  });
});

describe('coverage intervals', () => {
  const skewed = Float64Array.from({ length: 10_000 }, (_, i) => -Math.log(1 - (i + 0.5) / 10_000));

  it('hold what they say, and are as long as an exponential asks for', () => {
    const held = ([low, high]: number[]) => skewed.filter((value) => value >= low && value <= high).length;
    const [symmetric, shortest] = [symmetricInterval(skewed, 0.95), shortestInterval(skewed, 0.95)];
    expect(Math.abs(held(symmetric) - 9500)).toBeLessThanOrEqual(1);
    expect(Math.abs(held(shortest) - 9500)).toBeLessThanOrEqual(1);
    expect(symmetric[0]).toBeCloseTo(-Math.log(0.975), 2);
    expect(symmetric[1]).toBeCloseTo(-Math.log(0.025), 2);
    expect(shortest[0]).toBeLessThan(1e-4);
    expect(shortest[1]).toBeCloseTo(-Math.log(0.05), 2);
  });
});

describe('monteCarlo', () => {
  const inputs = [{ name: 'x', distribution: { kind: 'normal', mean: 0, deviation: 1 } as const }];
  const run = (tolerance: number, most: number, seed = 1) =>
    monteCarlo(([x]) => x, inputs, { coverage: 0.95, seed, most, tolerance });

  it('ends when its figures keep still, and says whether they do', () => {
    const rough = run(0.05, 1_000_000);
    const fine = run(0.01, 1_000_000);
    const short = run(1e-5, 50_000);
    expect([rough.isStable, fine.isStable, short.isStable]).toEqual([true, true, false]);
    expect(rough.trials).toBeLessThan(fine.trials);
    expect(short.trials).toBe(50_000);
  });

  it('gives the same numbers for the same seed', () => {
    expect(run(0.05, 1e5)).toEqual(run(0.05, 1e5));
    expect(run(0.05, 1e5).mean).not.toBe(run(0.05, 1e5, 2).mean);
  });

  it('refuses correlations that it cannot have', () => {
    const three = [0, 1, 2].map((i) => ({ ...inputs[0], name: `x${i}` }));
    const against = [
      { between: [0, 1] as const, coefficient: -0.9 },
      { between: [0, 2] as const, coefficient: -0.9 },
      { between: [1, 2] as const, coefficient: -0.9 },
    ];
    const trials = { coverage: 0.95, seed: 1, most: 1e4, tolerance: 1 };
    expect(() => monteCarlo(([x]) => x, three, trials, against)).toThrow('no distribution can have');
    const flat = three.with(1, {
      name: 'flat',
      distribution: { kind: 'rectangular', mean: 0, half: 1 },
    } as never);
    expect(() => monteCarlo(([x]) => x, flat, trials, [against[0]])).toThrow(
      'flat is correlated, and not normal',
    );
  });
});
