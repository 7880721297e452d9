import { RimwrightError } from '../base/errors.ts';
import { ascending } from './ascending.ts';
import { BoxMapping } from './boxMapping.ts';
import { CmaDistribution } from './cmaDistribution.ts';
import { type CheckedCmaOptions, type CmaOptions, checkedCmaOptions } from './cmaOptions.ts';
import { cmaParameters } from './cmaParameters.ts';
import { type CmaStop, ValueHistory } from './cmaStop.ts';
import { rankableValue, type Scored } from './objective.ts';

/**
 * CMA-ES with active update: a normal distribution that learns the shape of a valley from ranks alone.
 * Source: Hansen (2016), The CMA Evolution Strategy: A Tutorial, arXiv:1604.00772.
 *
 * Ask for a generation, score it anywhere, tell the values in the same order, until there is a stop reason.
 * Inside, coordinates are divided by their scale and know no bounds; `BoxMapping` leads into the box.
 */
export class CmaEs {
  readonly dimension: number;
  readonly population: number;
  private readonly options: CheckedCmaOptions;
  private readonly mapping: BoxMapping;
  private readonly distribution: CmaDistribution;
  private readonly history: ValueHistory;
  /** The generation that is out for scoring. */
  private pending: Float64Array[] | undefined;
  private scored = 0;
  private bestSoFar: Scored;
  private stop: CmaStop | undefined;

  /** @throws RimwrightError `input` that lists every mistake in the options */
  constructor(options: CmaOptions) {
    this.options = checkedCmaOptions(options);
    const { start, sigma, scale, box, population } = this.options;
    this.dimension = start.length;
    this.population = population;
    const firstDeviations = scale.map((length) => length * sigma);
    this.mapping = new BoxMapping(box, firstDeviations);
    const mean = start.map((x, i) => this.mapping.free(x, i) / scale[i]);
    this.distribution = new CmaDistribution(cmaParameters(start.length, population), mean, sigma);
    this.history = new ValueHistory(start.length, population);
    this.bestSoFar = { x: start.slice(), value: Number.POSITIVE_INFINITY };
  }

  /** Points scored so far. */
  get evaluations(): number {
    return this.scored;
  }

  /** The best point told so far; the start with +Infinity before that. */
  get best(): Scored {
    return this.bestSoFar;
  }

  /** Why there is no use in asking again; undefined while there is. */
  stopReason(): CmaStop | undefined {
    return this.stop;
  }

  /** Standard deviation of the next generation along each coordinate (away from bounds). */
  spread(): Float64Array {
    return this.options.scale.map((length, i) => length * this.distribution.deviation(i));
  }

  /**
   * Draws the next generation: `population` new points, all inside the bounds.
   *
   * @throws RimwrightError `input` where the last generation has not been told
   */
  ask(): Float64Array[] {
    if (this.pending) throw new RimwrightError('input', 'ask: the last generation has not been told yet');
    const { random, scale } = this.options;
    this.pending = this.distribution
      .drawGeneration(random)
      .map((free) => free.map((value, i) => this.mapping.inside(scale[i] * value, i)));
    // Copies go out: the caller may do with them what it likes.
    return this.pending.map((point) => point.slice());
  }

  /**
   * Learns from the last generation.
   *
   * @param values one a point, in the order of `ask`; +Infinity ranks last
   * @throws RimwrightError `machine` at NaN, with the candidate; `input` at a wrong number of values
   */
  tell(values: ArrayLike<number>): void {
    const points = this.pending;
    if (!points) throw new RimwrightError('input', 'tell: no generation has been asked for');
    const count = points.length;
    if (values.length !== count) {
      throw new RimwrightError('input', `tell: ${values.length} values for ${count} points`);
    }
    const checked = points.map((x, k) => rankableValue(values[k], x, `candidate ${k + 1} of ${count}`));
    const order = [...checked.keys()].sort((a, b) => ascending(checked[a], checked[b]));
    const sorted = order.map((k) => checked[k]);
    if (sorted[0] < this.bestSoFar.value) this.bestSoFar = { x: points[order[0]], value: sorted[0] };
    this.pending = undefined;
    this.scored += count;

    this.distribution.learn(order);
    if (sorted[0] === sorted[Math.ceil(0.7 * count) - 1]) this.distribution.widen();
    this.history.record(sorted);
    this.stop = this.findStop();
  }

  private findStop(): CmaStop | undefined {
    const { maxEvaluations, tolFun, tolX } = this.options;
    if (this.scored >= maxEvaluations) return 'maxEvaluations';
    return this.history.stopReason(tolFun) ?? this.distribution.stopReason(tolX);
  }
}
