import { linearProgram } from '../numeric/linearProgram.ts';

/** What is known of a point. */
export interface Outcome {
  /** To be made small. */
  objective: number;
  /** Each must come to 0 or below; relative to its own limit, so that 0.01 is a hundredth of it. The count never changes. */
  limits: ArrayLike<number>;
}

export interface DescentOptions {
  lower: Float64Array;
  upper: Float64Array;
  /** Natural length of each coordinate: the first steps are at most this long. */
  scale: Float64Array;
  /** What an excess L = log(1 + largest limit) weighs beside the objective: weight · L + bend · L². */
  weight: number;
  bend: number;
  maxEvaluations: number;
  /** Stop when the trusted step is below this share of the scale; 1e-5 if left out. */
  tolStep?: number;
}

export interface DescentResult {
  x: Float64Array;
  /** objective + weight · L + bend · L², L = log(1 + largest limit). */
  value: number;
  evaluations: number;
  stop: 'settled' | 'maxEvaluations' | 'stuck';
}

/** Difference for the derivatives, as a share of the scale. */
const DIFFERENCE = 1e-4;

/** A step that promises less than this has nothing left to gain. */
const LEAST_PROMISE = 1e-6;

/**
 * Descent by linear programs: at each point the objective and all limits are linearised by differences, and a linear
 * program finds the best step within a trusted box; the largest excess over the limits enters as one elastic variable.
 * Where as many limits hold with equality as there are coordinates it converges quadratically, which no simplex or
 * evolution does on such kinks. Source: Madsen (1975), J. Inst. Maths Applics 16, 321; Fletcher (1987), Practical
 * Methods of Optimization, section 14.5.
 *
 * @param evaluate gives null for a point that cannot be used
 */
export function linearisedDescent(
  evaluate: (x: Float64Array) => Outcome | null,
  start: Float64Array,
  options: DescentOptions,
): DescentResult {
  const { lower, upper, maxEvaluations, tolStep = 1e-5 } = options;
  const n = start.length;
  let x = start.slice();
  let evaluations = 1;
  let here = evaluate(x);
  if (here === null) return { x, value: Number.POSITIVE_INFINITY, evaluations, stop: 'stuck' };
  let value = merit(here, options);
  let trust = 1;
  while (trust > tolStep) {
    if (evaluations + n + 1 > maxEvaluations) return { x, value, evaluations, stop: 'maxEvaluations' };
    const slopes = differences(evaluate, x, here, options, maxEvaluations - evaluations);
    evaluations += slopes.evaluations;
    if (slopes.columns === null) {
      const stop = evaluations < maxEvaluations ? 'stuck' : 'maxEvaluations';
      return { x, value, evaluations, stop };
    }
    let moved = false;
    while (!moved && trust > tolStep) {
      if (evaluations >= maxEvaluations) return { x, value, evaluations, stop: 'maxEvaluations' };
      const { step, promise } = bestStep(x, here, slopes.columns, trust, options);
      if (promise < LEAST_PROMISE) return { x, value, evaluations, stop: 'settled' };
      const next = x.map((at, j) => Math.min(Math.max(at + step[j], lower[j]), upper[j]));
      const there = evaluate(next);
      evaluations++;
      const nextValue = there === null ? Number.POSITIVE_INFINITY : merit(there, options);
      const gained = (value - nextValue) / promise;
      if (there !== null && gained > 0.1) {
        x = next;
        here = there;
        value = nextValue;
        moved = true;
        if (gained > 0.7) trust = Math.min(1, trust * 2.5);
        else if (gained < 0.3) trust /= 2;
      } else {
        trust /= 4;
      }
    }
  }
  return { x, value, evaluations, stop: 'settled' };

  /**
   * Columns of derivatives times the scale: the objective first, then the limits; null where a coordinate has none, or
   * where more than `allowed` evaluations would be needed.
   */
  function differences(
    evaluateAt: typeof evaluate,
    at: Float64Array,
    from: Outcome,
    { lower: low, upper: high, scale: length }: DescentOptions,
    allowed: number,
  ): { columns: Float64Array[] | null; evaluations: number } {
    const columns: Float64Array[] = [];
    let spent = 0;
    for (let j = 0; j < n; j++) {
      // What its bounds hold in place has no say.
      let column = low[j] < high[j] ? null : new Float64Array(1 + from.limits.length);
      for (const side of at[j] + DIFFERENCE * length[j] <= high[j] ? [1, -1] : [-1]) {
        const moved = at.slice();
        moved[j] = Math.max(low[j], at[j] + side * DIFFERENCE * length[j]);
        const share = (moved[j] - at[j]) / length[j];
        if (share === 0) continue;
        if (spent === allowed) return { columns: null, evaluations: spent };
        const outcome = evaluateAt(moved);
        spent++;
        if (outcome === null) continue;
        column = new Float64Array(1 + from.limits.length);
        column[0] = (outcome.objective - from.objective) / share;
        for (let i = 0; i < from.limits.length; i++)
          column[i + 1] = (outcome.limits[i] - from.limits[i]) / share;
        break;
      }
      if (column === null) return { columns: null, evaluations: spent };
      columns.push(column);
    }
    return { columns, evaluations: spent };
  }

  /** The step (in x) that the linear model likes best within the trusted box, and what it promises. */
  function bestStep(
    at: Float64Array,
    from: Outcome,
    columns: readonly Float64Array[],
    trusted: number,
    { lower: low, upper: high, scale: length, weight, bend }: DescentOptions,
  ): { step: Float64Array; promise: number } {
    const excess = largest(from.limits);
    // Limits far below the largest cannot become active within this step's reach.
    const near: number[] = [];
    for (let i = 0; i < from.limits.length; i++) {
      let reach = 0;
      for (const column of columns) reach += Math.abs(column[i + 1]);
      if (from.limits[i] + trusted * reach > Math.min(0, excess)) near.push(i);
    }
    const unknowns = n + 1;
    const rows = near.length + 2 * n + 1;
    const a = new Float64Array(rows * unknowns);
    const b = new Float64Array(rows);
    near.forEach((i, row) => {
      for (let j = 0; j < n; j++) a[row * unknowns + j] = columns[j][i + 1];
      a[row * unknowns + n] = -1;
      b[row] = -from.limits[i];
    });
    for (let j = 0; j < n; j++) {
      const row = near.length + 2 * j;
      a[row * unknowns + j] = 1;
      b[row] = Math.min(trusted, (high[j] - at[j]) / length[j]);
      a[(row + 1) * unknowns + j] = -1;
      b[row + 1] = Math.min(trusted, (at[j] - low[j]) / length[j]);
    }
    a[rows * unknowns - 1] = -1;
    const c = new Float64Array(unknowns);
    for (let j = 0; j < n; j++) c[j] = columns[j][0];
    // What an excess weighs is linearised about where it stands.
    const stands = Math.max(0, excess);
    const slope = (weight + 2 * bend * Math.log1p(stands)) / (1 + stands);
    c[n] = slope;
    const start = new Float64Array(unknowns);
    start[n] = Math.max(0, excess) + 0.1;
    const { x: solution } = linearProgram(c, a, b, start);
    const step = new Float64Array(n);
    let promise = slope * (Math.max(0, excess) - Math.max(0, solution[n]));
    for (let j = 0; j < n; j++) {
      step[j] = solution[j] * length[j];
      promise -= columns[j][0] * solution[j];
    }
    return { step, promise };
  }
}

function merit({ objective, limits }: Outcome, { weight, bend }: DescentOptions): number {
  const excess = Math.log1p(Math.max(0, largest(limits)));
  return objective + weight * excess + bend * excess * excess;
}

function largest(values: ArrayLike<number>): number {
  let most = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < values.length; i++) most = Math.max(most, values[i]);
  return most;
}
