import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { linearProgram } from '../../src/numeric/linearProgram.ts';

const of = (...values: number[]) => Float64Array.from(values);
/** x ≤ 1, y ≤ 2, x ≥ 0, y ≥ 0. */
const BOX = of(1, 0, 0, 1, -1, 0, 0, -1);
const BOX_BOUNDS = of(1, 2, 0, 0);

function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

/** Largest of A x − b: 0 or less where x is feasible. */
function excess(a: Float64Array, b: Float64Array, x: Float64Array): number {
  const n = x.length;
  return Math.max(...b.map((bound, i) => dot(a.subarray(i * n, (i + 1) * n), x) - bound));
}

/** Least c·x over all vertices: every choice of n rows that meet in a feasible point. */
function byVertices(c: Float64Array, a: Float64Array, b: Float64Array): number {
  const n = c.length;
  let least = Number.POSITIVE_INFINITY;
  const chosen: number[] = [];
  const choose = (from: number) => {
    if (chosen.length === n) {
      const x = solve(chosen.map((i) => [...a.subarray(i * n, (i + 1) * n), b[i]]));
      if (x !== null && excess(a, b, x) < 1e-9) least = Math.min(least, dot(c, x));
      return;
    }
    for (let i = from; i < b.length; i++) {
      chosen.push(i);
      choose(i + 1);
      chosen.pop();
    }
  };
  choose(0);
  return least;
}

/** Gauss's elimination with pivots; null where the rows are nearly dependent. */
function solve(rows: number[][]): Float64Array | null {
  const n = rows.length;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k; i < n; i++) if (Math.abs(rows[i][k]) > Math.abs(rows[pivot][k])) pivot = i;
    if (Math.abs(rows[pivot][k]) < 1e-9) return null;
    [rows[k], rows[pivot]] = [rows[pivot], rows[k]];
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const factor = rows[i][k] / rows[k][k];
      for (let j = k; j <= n; j++) rows[i][j] -= factor * rows[k][j];
    }
  }
  return Float64Array.from(rows, (row, k) => row[n] / row[k]);
}

/** A program with bounds of ±5 and rows that keep a known point feasible; a share of the rows pass through it. */
function randomProgram(n: number, more: number, random: ReturnType<typeof randomStream>, share: number) {
  const rows = 2 * n + more;
  const a = new Float64Array(rows * n);
  const b = new Float64Array(rows);
  const inside = Float64Array.from({ length: n }, () => random.normal());
  for (let i = 0; i < rows; i++) {
    if (i < 2 * n) {
      a[i * n + (i >> 1)] = i % 2 === 0 ? 1 : -1;
      b[i] = 5;
      continue;
    }
    for (let j = 0; j < n; j++) a[i * n + j] = random.normal();
    const room = random.uniform() < share ? 0 : Math.abs(random.normal());
    b[i] = dot(a.subarray(i * n, (i + 1) * n), inside) + room;
  }
  const c = Float64Array.from({ length: n }, () => random.normal());
  return { c, a, b };
}

describe('linearProgram', () => {
  it.each([
    { name: 'a corner', start: of(0.5, 0.5) },
    { name: 'a corner, from far outside', start: of(500, -300) },
    { name: 'a corner, from a vertex', start: of(0, 0) },
  ])('finds $name', ({ start }) => {
    const { x, converged } = linearProgram(of(-1, -1), BOX, BOX_BOUNDS, start);
    expect(converged).toBe(true);
    expect(Math.abs(x[0] - 1) + Math.abs(x[1] - 2)).toBeLessThan(1e-8);
  });

  // Dantzig (1963) in two unknowns: 3x + 5y, x ≤ 4, 2y ≤ 12, 3x + 2y ≤ 18: 36 at (2, 6) (the example of Hillier & Lieberman's textbook).
  it('knows a textbook program', () => {
    const { x } = linearProgram(
      of(-3, -5),
      of(1, 0, 0, 2, 3, 2, -1, 0, 0, -1),
      of(4, 12, 18, 0, 0),
      of(1, 1),
    );
    expect(x[0]).toBeCloseTo(2, 8);
    expect(x[1]).toBeCloseTo(6, 8);
  });

  it('copes with more rows through a corner than it takes, and with the same row twice', () => {
    const a = of(1, 0, 0, 1, 1, 1, 1, 1, 2, 2, -1, 0, 0, -1);
    const { x, converged } = linearProgram(of(-1, -1), a, of(1, 1, 2, 2, 4, 0, 0), of(0, 0));
    expect(converged).toBe(true);
    expect(Math.abs(x[0] - 1) + Math.abs(x[1] - 1)).toBeLessThan(1e-8);
  });

  it('takes some point of a whole edge of solutions', () => {
    const { x, converged } = linearProgram(of(-1, -1), of(1, 1, -1, 0, 0, -1), of(1, 0, 0), of(0.1, 0.1));
    expect(converged).toBe(true);
    expect(x[0] + x[1]).toBeCloseTo(1, 8);
  });

  it('solves where the feasible set is a line without any inside', () => {
    const { x, converged } = linearProgram(
      of(1, 0),
      of(1, 1, -1, -1, -1, 0, 0, -1),
      of(1, -1, 0, 0),
      of(0.1, 0.1),
    );
    expect(converged).toBe(true);
    expect(Math.abs(x[0]) + Math.abs(x[1] - 1)).toBeLessThan(1e-7);
  });

  it('agrees with the best of all vertices', () => {
    const random = randomStream(17);
    for (let turn = 0; turn < 60; turn++) {
      const n = 1 + (turn % 4);
      const { c, a, b } = randomProgram(n, 6, random, 0.2);
      const start = Float64Array.from({ length: n }, () => 3 * random.normal());
      const { x, converged } = linearProgram(c, a, b, start);
      expect(converged).toBe(true);
      expect(excess(a, b, x)).toBeLessThan(1e-7);
      expect(Math.abs(dot(c, x) - byVertices(c, a, b))).toBeLessThan(1e-6);
    }
  });

  // A dozen unknowns and hundreds of rows, as in a descent.
  it('meets the conditions of Karush, Kuhn & Tucker with many rows: no feasible point can be better', () => {
    const random = randomStream(5);
    for (let turn = 0; turn < 30; turn++) {
      const n = 4 + (turn % 9);
      const { c, a, b } = randomProgram(n, 400, random, 0);
      const { x, converged } = linearProgram(c, a, b, new Float64Array(n));
      expect(converged).toBe(true);
      expect(excess(a, b, x)).toBeLessThan(1e-7);
      const row = (i: number) => a.subarray(i * n, (i + 1) * n);
      const tight = [...b.keys()].filter((i) => b[i] - dot(row(i), x) < 1e-6);
      expect(tight).toHaveLength(n);
      // −c is a sum of the tight rows, none of them taken negatively.
      const prices = solve(Array.from(c, (cost, j) => [...tight.map((i) => row(i)[j]), -cost]));
      expect(prices).not.toBeNull();
      for (const price of prices ?? []) expect(price).toBeGreaterThan(-1e-7);
    }
  });

  it('says so, with finite numbers, where there is nothing to find', () => {
    const programs = [
      // x ≤ 0 and x ≥ 1
      linearProgram(of(1), of(1, -1), of(0, -1), of(0.5)),
      // no bound on the way down
      linearProgram(of(-1, 0), of(-1, 0, 0, 1, 0, -1), of(0, 1, 1), of(0.5, 0)),
      // an unknown that no row sees
      linearProgram(of(1, 0), of(-1, 0), of(0), of(0.5, 7)),
      linearProgram(of(1), of(), of(), of(3)),
    ];
    for (const { x, converged } of programs) {
      expect(converged).toBe(false);
      expect(x.every(Number.isFinite)).toBe(true);
    }
  });

  it('refuses what is not finite', () => {
    for (const bad of [Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => linearProgram(of(bad, 1), BOX, BOX_BOUNDS, of(0, 0))).toThrow('not finite');
      expect(() => linearProgram(of(1, 1), of(1, bad, 0, 1, -1, 0, 0, -1), BOX_BOUNDS, of(0, 0))).toThrow(
        'not finite',
      );
      expect(() => linearProgram(of(1, 1), BOX, of(bad, 2, 0, 0), of(0, 0))).toThrow('not finite');
      expect(() => linearProgram(of(1, 1), BOX, BOX_BOUNDS, of(0, bad))).toThrow('not finite');
    }
  });
});
