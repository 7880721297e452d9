import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { climbDisc } from '../../src/numeric/climbDisc.ts';
import { climbLine } from '../../src/numeric/climbLine.ts';

describe('climbLine', () => {
  const climb = (f: (at: number) => number, from: number, evaluations = 12) => {
    let spent = 0;
    const counted = (at: number) => {
      expect(at).toBeGreaterThanOrEqual(0);
      expect(at).toBeLessThanOrEqual(1);
      spent++;
      return f(at);
    };
    const options = { step: 0.05, tolerance: 1e-12, evaluations };
    const reached = climbLine(counted, { at: from, value: f(from) }, [0, 1], options);
    return { ...reached, spent };
  };

  it('finds the top of a parabola, and of a bell, wherever it starts on the slope', () => {
    for (const from of [0, 0.2, 0.55, 1]) {
      expect(climb((at) => -((at - 0.4) ** 2), from).at).toBeCloseTo(0.4, 6);
      expect(climb((at) => Math.exp(-20 * (at - 0.63) ** 2), from).value).toBeCloseTo(1, 4);
    }
  });

  it('stops at an end where the slope leads there, and spends little then', () => {
    const { at, spent } = climb((x) => x, 0.9);
    expect(at).toBe(1);
    expect(spent).toBeLessThan(6);
    expect(climb((x) => -x, 0.02).at).toBe(0);
  });

  it('never ends below its start, nor spends more than granted', () => {
    const random = randomStream(8);
    for (let turn = 0; turn < 100; turn++) {
      const [a, b, from] = [30 * random.uniform(), 6 * random.uniform(), random.uniform()];
      const f = (x: number) => Math.sin(a * x + b);
      const { value, spent } = climb(f, from, 7);
      expect(value).toBeGreaterThanOrEqual(f(from));
      expect(spent).toBeLessThanOrEqual(7);
    }
  });
});

describe('climbDisc', () => {
  const climb = (f: (x: number, y: number) => number, x: number, y: number) =>
    climbDisc(
      (u, v) => {
        expect(Math.hypot(u, v)).toBeLessThan(1 + 1e-9);
        return f(u, v);
      },
      { x, y, value: f(x, y) },
      1,
      0.2,
      1e-4,
    );

  it('finds a top inside', () => {
    const { x, y } = climb((u, v) => -((u - 0.3) ** 2) - 2 * (v + 0.4) ** 2, -0.9, 0.1);
    expect(x).toBeCloseTo(0.3, 3);
    expect(y).toBeCloseTo(-0.4, 3);
  });

  it('walks along the rim to the best place there', () => {
    const { x, y } = climb((u, v) => u + v, -0.2, -0.9);
    expect(x).toBeCloseTo(Math.SQRT1_2, 3);
    expect(y).toBeCloseTo(Math.SQRT1_2, 3);
  });
});
