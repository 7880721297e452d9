import type { Highs, Model } from 'highs';
import { RimwrightError } from '../base/errors.ts';

/** The optimum of a linear program. */
export interface LinearOptimum {
  objective: number;
  /** One a variable. */
  values: Float64Array;
  /** One a row, in order: how much the objective rises with the row's active limit; ≥ 0 at the lower one, ≤ 0 at the upper one. */
  prices: Float64Array;
}

/**
 * A linear program that grows: minimise costs·x under 0 ≤ x ≤ upper and lower ≤ rows·x ≤ upper, solved again after each change
 * from where it stood. For thousands of variables and hundreds of dense rows; `linearProgram` is for the small ones within a search.
 *
 * Solved by HiGHS (Huangfu and Hall 2018, Math. Prog. Comp. 10, 119), whose memory must be given back: call `dispose`.
 */
export class LinearModel {
  readonly #model: Model;
  readonly #indices: Int32Array;
  #rows = 0;

  /** Use `LinearModels.open`. */
  constructor(solver: Highs, costs: Float64Array, upper: Float64Array) {
    const count = costs.length;
    this.#model = solver.createModel();
    this.#model.options.set('output_flag', false);
    this.#indices = Int32Array.from({ length: count }, (_, j) => j);
    this.#model.addCols({
      cost: costs,
      lower: new Float64Array(count),
      upper,
      matrix: {
        format: 'csc',
        numRows: 0,
        numCols: count,
        starts: new Int32Array(count + 1),
        indices: new Int32Array(0),
        values: new Float64Array(0),
      },
    });
  }

  get rows(): number {
    return this.#rows;
  }

  /** Adds lower ≤ coefficients·x ≤ upper; either may be infinite. */
  addRow(coefficients: Float64Array, lower: number, upper: number): void {
    this.#model.addRow(lower, upper, { indices: this.#indices, values: coefficients });
    this.#rows++;
  }

  /** Changes the limits of a row. */
  setRow(row: number, lower: number, upper: number): void {
    this.#model.changeRowBounds(row, lower, upper);
  }

  /**
   * @returns null where no x keeps all rows
   * @throws RimwrightError `machine` where the solver fails
   */
  solve(): LinearOptimum | null {
    const { modelStatus } = this.#model.run();
    if (modelStatus === INFEASIBLE) return null;
    if (modelStatus !== OPTIMAL) {
      throw new RimwrightError('machine', `a linear program ended with status ${modelStatus}`);
    }
    const { colValue, rowDual } = this.#model.getSolution();
    return { objective: this.#model.getObjectiveValue(), values: colValue, prices: rowDual };
  }

  dispose(): void {
    this.#model.dispose();
  }
}

/** The solver's own numbers for how a run ended. */
const OPTIMAL = 7;
const INFEASIBLE = 8;

/** Opens linear programs; holds the loaded solver, which takes a tenth of a second to load. */
export class LinearModels {
  readonly #solver: Highs;

  private constructor(solver: Highs) {
    this.#solver = solver;
  }

  static async load(): Promise<LinearModels> {
    // Its types describe the CommonJS face; what Node imports has the loader itself as its default.
    const { default: load } = (await import('highs')) as unknown as { default: () => Promise<Highs> };
    return new LinearModels(await load());
  }

  /**
   * @param costs one a variable
   * @param upper largest value of each, may be infinite
   */
  open(costs: Float64Array, upper: Float64Array): LinearModel {
    return new LinearModel(this.#solver, costs, upper);
  }
}
