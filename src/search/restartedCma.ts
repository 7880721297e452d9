import { inputError, type Problem, RimwrightError } from '../base/errors.ts';
import type { RandomSource } from '../base/random.ts';
import { checkCount } from './box.ts';
import { CmaEs } from './cmaEs.ts';
import { nelderMeadSteps } from './nelderMead.ts';
import { type Objective, rankableValue, type Scored } from './objective.ts';
import { type Regime, RestartSchedule } from './restartSchedule.ts';

/** Where a run of CMA-ES begins; see `CmaOptions`. */
export interface RunStart {
  start: Float64Array;
  sigma: number;
}

export interface RestartOptions {
  /** Draws the start of run 0, 1, 2 … */
  nextStart: (random: RandomSource, restartIndex: number) => RunStart;
  /** Evaluations granted in all; never exceeded. */
  budget: number;
  random: RandomSource;
  lower?: Float64Array;
  upper?: Float64Array;
  /** Natural length of each coordinate; all 1 if left out. */
  scale?: Float64Array;
  /**
   * Tolerances of each run, as in `CmaOptions`. Set tolFun to the least difference that matters: runs end
   * sooner, and more of them fit into the budget.
   */
  tolX?: number;
  tolFun?: number;
  /** Keep a tenth of the budget for a Nelder–Mead search from the best point; false if left out. */
  polish?: boolean;
}

export interface RestartResult extends Scored {
  evaluations: number;
  /** Runs of CMA-ES begun. */
  restarts: number;
}

/**
 * CMA-ES started again and again within a budget, with populations as `RestartSchedule` says.
 *
 * Ask, score, tell, until `ask` returns no points. Points of one `ask` may be scored side by side; what is
 * found does not depend on how.
 */
export class RestartedCma {
  private readonly options: RestartOptions;
  private readonly course: Generator<Float64Array[], void, ArrayLike<number>>;
  private pending: Float64Array[];
  private bestSoFar: Scored = { x: new Float64Array(), value: Number.POSITIVE_INFINITY };
  /** Standard deviations of the run that found the best point, after that generation. */
  private spreadAtBest: Float64Array = new Float64Array();
  private scored = 0;
  private runs = 0;

  /** @throws RimwrightError `input` where the budget, or the first start, is wrong */
  constructor(options: RestartOptions) {
    const problems: Problem[] = [];
    checkCount('budget', Number.isFinite(options.budget) ? options.budget : Number.NaN, 1, problems);
    if (problems.length > 0) throw inputError(problems);
    this.options = options;
    this.course = this.run();
    this.pending = this.course.next().value ?? [];
  }

  /** The points to score next; none when the search is over. */
  ask(): Float64Array[] {
    return this.pending.map((point) => point.slice());
  }

  /**
   * @param values one a point, in the order of `ask`; +Infinity for points that cannot be used
   * @throws RimwrightError `machine` at NaN, with the candidate; `input` at a wrong number of values, or
   * where `nextStart` gives a start outside the bounds
   */
  tell(values: ArrayLike<number>): void {
    const points = this.pending;
    if (values.length !== points.length) {
      throw new RimwrightError('input', `tell: ${values.length} values for ${points.length} points`);
    }
    for (const [k, x] of points.entries()) {
      const value = rankableValue(values[k], x, `candidate ${k + 1} of ${points.length}`);
      if (value < this.bestSoFar.value || this.scored === 0) this.bestSoFar = { x, value };
      this.scored++;
    }
    this.pending = this.course.next(values).value ?? [];
  }

  /** True when the budget is spent (or, with `polish`, when the polish has come to rest). */
  get done(): boolean {
    return this.pending.length === 0;
  }

  /** The best so far, and what it cost. */
  get result(): RestartResult {
    return { ...this.bestSoFar, evaluations: this.scored, restarts: this.runs };
  }

  private *run(): Generator<Float64Array[], void, ArrayLike<number>> {
    const { random, nextStart, budget, polish } = this.options;
    const granted = polish ? Math.ceil(0.9 * budget) : budget;
    let schedule: RestartSchedule | undefined;
    while (this.scored < granted) {
      const begin = nextStart(random, this.runs);
      schedule ??= new RestartSchedule(begin.start.length);
      const regime = schedule.next(granted - this.scored, random);
      const before = this.scored;
      this.runs++;
      yield* this.runOnce(begin, regime, granted);
      schedule.record(this.scored - before);
    }
    if (polish && Number.isFinite(this.bestSoFar.value)) yield* this.polish();
  }

  private *runOnce(
    { start, sigma }: RunStart,
    regime: Regime,
    granted: number,
  ): Generator<Float64Array[], void, ArrayLike<number>> {
    const { population, maxEvaluations } = regime;
    const cma = new CmaEs({
      ...this.options,
      start,
      sigma: sigma * regime.sigmaFactor,
      population,
      maxEvaluations,
    });
    while (cma.stopReason() === undefined && this.scored < granted) {
      const before = this.bestSoFar.x;
      const points = cma.ask().slice(0, granted - this.scored);
      const values = yield points;
      // The budget's last points may be too few to learn from; they count for the best all the same.
      if (points.length === population) cma.tell(values);
      if (this.bestSoFar.x !== before) this.spreadAtBest = cma.spread();
    }
  }

  /** Nelder–Mead from the best point, in units of the scale, with steps as wide as its run had last. */
  private *polish(): Generator<Float64Array[], void, ArrayLike<number>> {
    const { budget, lower, upper } = this.options;
    const best = this.bestSoFar;
    const n = best.x.length;
    const left = budget - this.scored;
    if (left < n + 1) return;
    const scale = this.options.scale ?? new Float64Array(n).fill(1);
    const unit = (v: Float64Array): Float64Array => v.map((x, i) => x / scale[i]);
    const steps = nelderMeadSteps(unit(best.x), {
      ...(lower && { lower: unit(lower) }),
      ...(upper && { upper: unit(upper) }),
      step: unit(this.spreadAtBest).map((step) => Math.max(step, 1e-9)),
      tolX: 1e-12,
      tolFun: 1e-15,
      maxEvaluations: left,
    });
    let next = steps.next();
    while (!next.done) {
      const point = next.value.map((x, i) => {
        // Going to the scale and back may round across a bound.
        return Math.min(upper?.[i] ?? Infinity, Math.max(lower?.[i] ?? -Infinity, x * scale[i]));
      });
      const values = yield [point];
      next = steps.next(values[0]);
    }
  }
}

/**
 * Runs a restarted search to its end.
 *
 * @returns the best point, its value, and what they cost (at most the budget)
 * @throws RimwrightError as `RestartedCma` does
 */
export function minimise(f: Objective, options: RestartOptions): RestartResult {
  const search = new RestartedCma(options);
  for (let points = search.ask(); points.length > 0; points = search.ask()) {
    search.tell(points.map((x) => f(x)));
  }
  return search.result;
}
