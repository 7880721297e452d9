/**
 * Why CMA-ES stopped, after Hansen (2016), arXiv:1604.00772, appendix B.3:
 *
 * - `maxEvaluations`: the budget is spent
 * - `tolFun`: recent values differ by less than tolFun
 * - `equalFunValues`: the best value has not changed at all for many generations
 * - `tolX`: every standard deviation is below tolX
 * - `tolXUp`: the step size grew ten-thousandfold: it was far too small, or the values are flat
 * - `stagnation`: the medians of the best and of the middle values no longer fall
 * - `conditionCov`: axes of the distribution differ by more than 1e7 in length
 * - `noEffectAxis`, `noEffectCoord`: a step along an axis or a coordinate is lost to rounding
 */
export type CmaStop =
  | 'maxEvaluations'
  | 'tolFun'
  | 'equalFunValues'
  | 'tolX'
  | 'tolXUp'
  | 'stagnation'
  | 'conditionCov'
  | 'noEffectAxis'
  | 'noEffectCoord';

/** Remembers the values of past generations and tells from them when going on is no use. */
export class ValueHistory {
  private readonly best: number[] = [];
  private readonly middle: number[] = [];
  private latestWorst = Number.POSITIVE_INFINITY;
  /** Generations that the tests of flatness look back. */
  private readonly flatSpan: number;
  /** Least number of generations before stagnation is looked for. */
  private readonly stagnationSpan: number;

  constructor(dimension: number, population: number) {
    this.flatSpan = 10 + Math.ceil((30 * dimension) / population);
    this.stagnationSpan = Math.ceil(120 + (30 * dimension) / population);
  }

  /** @param sorted the values of one generation, ascending */
  record(sorted: readonly number[]): void {
    this.best.push(sorted[0]);
    this.middle.push(sorted[Math.floor(sorted.length / 2)]);
    this.latestWorst = sorted[sorted.length - 1];
  }

  stopReason(tolFun: number): CmaStop | undefined {
    if (this.best.length < this.flatSpan) return undefined;
    const recent = this.best.slice(-this.flatSpan);
    const least = Math.min(...recent);
    const most = Math.max(...recent);
    // Also true of an endless plain of +Infinity, where a difference would be NaN.
    if (least === most) return 'equalFunValues';
    if (Math.max(most, this.latestWorst) - least < tolFun) return 'tolFun';
    return this.stagnates() ? 'stagnation' : undefined;
  }

  /** Compares the first with the last 30 % of the last fifth of all generations. */
  private stagnates(): boolean {
    const generations = this.best.length;
    const span = Math.min(20_000, Math.max(this.stagnationSpan, Math.ceil(generations / 5)));
    if (generations < span) return false;
    const third = Math.ceil(0.3 * span);
    return [this.best, this.middle].every((values) => {
      const window = values.slice(-span);
      return median(window.slice(-third)) >= median(window.slice(0, third));
    });
  }
}

/** The middle value, the upper one of two. */
function median(values: number[]): number {
  return Float64Array.from(values).sort()[Math.floor(values.length / 2)];
}
