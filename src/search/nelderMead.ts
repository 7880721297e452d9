import { inputError, type Problem } from '../base/errors.ts';
import { ascending } from './ascending.ts';
import { checkCount, checkedBox, checkPositive, checkStart } from './box.ts';
import { BoxMapping } from './boxMapping.ts';
import { type Objective, rankableValue, type Scored } from './objective.ts';

/** How far to go. Everything may be left out. */
export interface NelderMeadOptions {
  /** Bounds, themselves allowed. Beyond them the search goes on as in a mirror, see `BoxMapping`. */
  lower?: Float64Array;
  upper?: Float64Array;
  /** First step along each coordinate, not 0; 5 % of the start, 0.00025 where that is 0, if left out. */
  step?: Float64Array;
  /** Stop when no corner is farther than tolX from the best along any coordinate, and no value than tolFun. */
  tolX?: number;
  tolFun?: number;
  /** No limit if left out; else at least n + 1, and never exceeded. */
  maxEvaluations?: number;
}

export interface NelderMeadResult extends Scored {
  evaluations: number;
  /** The first simplex counts as one, as in the published examples. */
  iterations: number;
  stop: 'tolerance' | 'maxEvaluations';
}

/** A corner of the simplex: its place without bounds, and the point it stands for. */
interface Corner extends Scored {
  free: Float64Array;
}

/**
 * Nelder–Mead simplex search with the usual coefficients (reflection 1, expansion 2, contraction and
 * shrinkage ½). Source: Lagarias, Reeds, Wright & Wright (1998), SIAM J. Optim. 9, 112, section 2.
 *
 * @param start n coordinates, inside the bounds
 * @param options tolerances are 1e-4 if left out
 * @throws RimwrightError `input` that lists every mistake in the options; `machine` where f gives NaN
 */
export function nelderMead(
  f: Objective,
  start: Float64Array,
  options: NelderMeadOptions = {},
): NelderMeadResult {
  const steps = nelderMeadSteps(start, options);
  let next = steps.next();
  while (!next.done) next = steps.next(f(next.value));
  return next.value;
}

/** The same search step by step: yields a point, takes its value, returns the result. */
export function* nelderMeadSteps(
  start: Float64Array,
  options: NelderMeadOptions = {},
): Generator<Float64Array, NelderMeadResult, number> {
  const { box, step, tolX, tolFun, maxEvaluations } = checkedOptions(start, options);
  // Cutting steps off at a bound would flatten the simplex for good: so it moves in a space without bounds.
  const mapping = new BoxMapping(box, step.map(Math.abs));
  const n = start.length;
  let evaluations = 0;
  let iterations = 1;

  function* score(free: Float64Array): Generator<Float64Array, Corner, number> {
    evaluations++;
    const x = free.map((value, i) => mapping.inside(value, i));
    // A copy goes out: the corner stays what it was whatever the caller does to it.
    const value = rankableValue(yield x.slice(), x, `evaluation ${evaluations}`);
    return { free, x, value };
  }

  const first = start.map((x, i) => mapping.free(x, i));
  const corners: Corner[] = [yield* score(first)];
  for (let i = 0; i < n; i++) corners.push(yield* score(first.map((x, j) => (i === j ? x + step[i] : x))));
  sortCorners(corners);

  const result = (stop: NelderMeadResult['stop']) => {
    const { x, value } = corners[0];
    return { x, value, evaluations, iterations, stop };
  };
  while (!isWithin(corners, tolX, tolFun)) {
    if (evaluations >= maxEvaluations) return result('maxEvaluations');
    const worst = corners[n];
    const centre = centroid(corners, n);
    const along = (t: number) => centre.map((c, i) => (1 - t) * c + t * worst.free[i]);

    const reflected = yield* score(along(-1));
    let accepted: Corner | undefined = reflected;
    const mayGoOn = evaluations < maxEvaluations;
    if (reflected.value < corners[0].value) {
      if (mayGoOn) {
        const expanded = yield* score(along(-2));
        if (expanded.value < reflected.value) accepted = expanded;
      }
    } else if (reflected.value >= corners[n - 1].value) {
      const outside = reflected.value < worst.value;
      if (!mayGoOn) return result('maxEvaluations');
      const contracted = yield* score(along(outside ? -0.5 : 0.5));
      const better = outside ? contracted.value <= reflected.value : contracted.value < worst.value;
      accepted = better ? contracted : undefined;
    }

    if (accepted) {
      corners[n] = accepted;
    } else {
      for (let i = 1; i <= n; i++) {
        if (evaluations >= maxEvaluations) break;
        const best = corners[0].free;
        corners[i] = yield* score(corners[i].free.map((x, j) => best[j] + 0.5 * (x - best[j])));
      }
    }
    iterations++;
    sortCorners(corners);
  }
  return result('tolerance');
}

/** Best first. The sort is stable, so a new corner comes after old ones of its value, as the paper wants. */
function sortCorners(corners: Corner[]): void {
  corners.sort((a, b) => ascending(a.value, b.value));
}

/** Mean of the n best corners. */
function centroid(corners: readonly Corner[], n: number): Float64Array {
  const sum = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) sum[i] += corners[k].free[i];
  }
  return sum.map((s) => s / n);
}

function isWithin(corners: readonly Corner[], tolX: number, tolFun: number): boolean {
  const best = corners[0];
  return corners.every(
    (corner) =>
      // Two infinities are equal, though their difference is NaN.
      (corner.value === best.value || corner.value - best.value <= tolFun) &&
      corner.free.every((x, i) => Math.abs(x - best.free[i]) <= tolX),
  );
}

function checkedOptions(start: Float64Array, options: NelderMeadOptions) {
  const n = start.length;
  const problems: Problem[] = [];
  const box = checkedBox(options, n, problems);
  checkStart(start, box, problems);
  const { tolX = 1e-4, tolFun = 1e-4, maxEvaluations = Number.POSITIVE_INFINITY } = options;
  checkPositive('tolX', tolX, problems);
  checkPositive('tolFun', tolFun, problems);
  checkCount('maxEvaluations', maxEvaluations, n + 1, problems);
  const step = options.step ?? start.map((x) => (x === 0 ? 0.00025 : 1.05 * x - x));
  if (step.length !== n) problems.push({ key: 'step', found: `${step.length} numbers`, expected: `${n}` });
  for (const [i, length] of step.entries()) {
    if (!Number.isFinite(length) || length === 0) {
      problems.push({ key: `step[${i}]`, found: `${length}`, expected: 'a finite number other than 0' });
    }
  }
  if (problems.length > 0) throw inputError(problems);
  return { box, step, tolX, tolFun, maxEvaluations };
}
