import { RimwrightError } from '../base/errors.ts';

/** Outcome of a linear program. */
export interface LinearSolution {
  /** The solution, or where it has not converged the last step before it failed; always finite. */
  x: Float64Array;
  /** Whether the optimality conditions hold to the tolerance. */
  converged: boolean;
}

const MAX_STEPS = 60;
const TOLERANCE = 1e-9;

/**
 * Minimises c·x under A x ≤ b, for a dozen unknowns and hundreds of dense rows.
 *
 * Mehrotra's predictor–corrector interior-point method (Mehrotra 1992, SIAM J. Optim. 2, 575). Bounds are rows like any
 * other. The feasible set must be bounded in the direction of −c: without that, or without any feasible point, it does not
 * converge, and it may not where that set has no inside (an equation as two rows). Tolerances are absolute: scale unknowns and
 * costs to about 1.
 *
 * @param a rows × n matrix, row by row
 * @param start any point; better inside or near the feasible set
 * @throws RimwrightError `machine` where a number that comes in is not finite
 */
export function linearProgram(
  c: Float64Array,
  a: Float64Array,
  b: Float64Array,
  start: Float64Array,
): LinearSolution {
  if (![c, a, b, start].every((values) => values.every(Number.isFinite))) {
    throw new RimwrightError('machine', 'linearProgram: a cost, row, bound or start is not finite');
  }
  const n = c.length;
  const rows = b.length;
  let x = start.slice();
  const slack = new Float64Array(rows);
  const dual = new Float64Array(rows).fill(1);
  for (let i = 0; i < rows; i++) slack[i] = Math.max(b[i] - rowTimes(a, i, n, x), 1e-2);
  const matrix = new Float64Array(n * n);
  const primalGap = new Float64Array(rows);
  const centring = new Float64Array(rows);
  const dx = new Float64Array(n);
  const dSlack = new Float64Array(rows);
  const dDual = new Float64Array(rows);
  for (let step = 0; step < MAX_STEPS; step++) {
    let gap = 0;
    let worst = 0;
    const dualGap = c.slice();
    for (let i = 0; i < rows; i++) {
      primalGap[i] = rowTimes(a, i, n, x) + slack[i] - b[i];
      worst = Math.max(worst, Math.abs(primalGap[i]));
      gap += slack[i] * dual[i];
      for (let j = 0; j < n; j++) dualGap[j] += a[i * n + j] * dual[i];
    }
    const mean = gap / rows;
    for (const value of dualGap) worst = Math.max(worst, Math.abs(value));
    if (mean < TOLERANCE && worst < TOLERANCE * 100) return { x, converged: true };
    if (!factorNormal(matrix, a, slack, dual, n)) return { x, converged: false };
    // The predictor aims at zero gap; what it would reach tells how much centring the corrector needs.
    for (let i = 0; i < rows; i++) centring[i] = slack[i] * dual[i];
    direction(matrix, a, dualGap, primalGap, centring, slack, dual, dx, dSlack, dDual);
    const reach = Math.min(largestStep(slack, dSlack), largestStep(dual, dDual));
    let predicted = 0;
    for (let i = 0; i < rows; i++) predicted += (slack[i] + reach * dSlack[i]) * (dual[i] + reach * dDual[i]);
    const sigma = (predicted / gap) ** 3;
    for (let i = 0; i < rows; i++) centring[i] = slack[i] * dual[i] + dSlack[i] * dDual[i] - sigma * mean;
    direction(matrix, a, dualGap, primalGap, centring, slack, dual, dx, dSlack, dDual);
    const primalStep = 0.995 * largestStep(slack, dSlack);
    const dualStep = 0.995 * largestStep(dual, dDual);
    const next = x.map((value, j) => value + primalStep * dx[j]);
    if (!next.every(Number.isFinite)) return { x, converged: false };
    x = next;
    for (let i = 0; i < rows; i++) {
      slack[i] += primalStep * dSlack[i];
      dual[i] += dualStep * dDual[i];
    }
  }
  return { x, converged: false };
}

function rowTimes(a: Float64Array, row: number, n: number, x: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < n; j++) sum += a[row * n + j] * x[j];
  return sum;
}

/** Largest step in (0, 1] that keeps every value at or above zero. */
function largestStep(values: Float64Array, change: Float64Array): number {
  let step = 1;
  for (let i = 0; i < values.length; i++) if (change[i] < 0) step = Math.min(step, -values[i] / change[i]);
  return step;
}

/** Cholesky factor of Aᵀ diag(dual/slack) A, in the lower triangle; false where it breaks down. */
function factorNormal(
  m: Float64Array,
  a: Float64Array,
  slack: Float64Array,
  dual: Float64Array,
  n: number,
): boolean {
  m.fill(0);
  for (let i = 0; i < slack.length; i++) {
    const weight = dual[i] / slack[i];
    for (let j = 0; j < n; j++) {
      const scaled = weight * a[i * n + j];
      if (scaled !== 0) for (let k = 0; k <= j; k++) m[j * n + k] += scaled * a[i * n + k];
    }
  }
  for (let j = 0; j < n; j++) {
    for (let k = 0; k <= j; k++) {
      let sum = m[j * n + k];
      for (let l = 0; l < k; l++) sum -= m[j * n + l] * m[k * n + l];
      if (k < j) m[j * n + k] = sum / m[k * n + k];
      else {
        // A direction that no row sees any more: leave it alone.
        if (!(sum > 0)) return false;
        m[j * n + j] = Math.sqrt(sum);
      }
    }
  }
  return true;
}

/** One Newton direction: A dx + ds = −primalGap, Aᵀ dz = −dualGap, z ds + s dz = −centring. */
function direction(
  factor: Float64Array,
  a: Float64Array,
  dualGap: Float64Array,
  primalGap: Float64Array,
  centring: Float64Array,
  slack: Float64Array,
  dual: Float64Array,
  dx: Float64Array,
  dSlack: Float64Array,
  dDual: Float64Array,
): void {
  const n = dx.length;
  const rows = slack.length;
  for (let j = 0; j < n; j++) dx[j] = -dualGap[j];
  for (let i = 0; i < rows; i++) {
    const pull = (centring[i] - dual[i] * primalGap[i]) / slack[i];
    for (let j = 0; j < n; j++) dx[j] += a[i * n + j] * pull;
  }
  for (let j = 0; j < n; j++) {
    for (let k = 0; k < j; k++) dx[j] -= factor[j * n + k] * dx[k];
    dx[j] /= factor[j * n + j];
  }
  for (let j = n - 1; j >= 0; j--) {
    for (let k = j + 1; k < n; k++) dx[j] -= factor[k * n + j] * dx[k];
    dx[j] /= factor[j * n + j];
  }
  for (let i = 0; i < rows; i++) {
    dSlack[i] = -primalGap[i] - rowTimes(a, i, n, dx);
    dDual[i] = -(centring[i] + dual[i] * dSlack[i]) / slack[i];
  }
}
