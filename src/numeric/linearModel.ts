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
  #columns = 0;
  #rows = 0;

  /** Use `LinearModels.open`. */
  constructor(solver: Highs, costs: Float64Array, upper: Float64Array) {
    this.#model = solver.createModel();
    this.#model.options.set('output_flag', false);
    this.addColumns(costs, upper, []);
  }

  get rows(): number {
    return this.#rows;
  }

  get columns(): number {
    return this.#columns;
  }

  /** Adds lower ≤ coefficients·x ≤ upper; either may be infinite. */
  addRow(coefficients: Float64Array, lower: number, upper: number): void {
    this.#model.addRow(lower, upper, nonZero(coefficients));
    this.#rows++;
  }

  /**
   * Adds variables.
   *
   * @param costs one a variable
   * @param upper largest value of each, may be infinite
   * @param columns of each, its coefficients in all rows; none where there are no rows yet
   */
  addColumns(costs: Float64Array, upper: Float64Array, columns: readonly Float64Array[]): void {
    const entries = columns.map(nonZero);
    const starts = new Int32Array(costs.length + 1);
    entries.forEach(({ values }, j) => {
      starts[j + 1] = starts[j] + values.length;
    });
    this.#model.addCols({
      cost: costs,
      lower: new Float64Array(costs.length),
      upper,
      matrix: {
        format: 'csc',
        numRows: this.#rows,
        numCols: costs.length,
        starts,
        indices: Int32Array.from(entries.flatMap(({ indices }) => indices)),
        values: Float64Array.from(entries.flatMap(({ values }) => values)),
      },
    });
    this.#columns += costs.length;
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

function nonZero(values: Float64Array): { indices: number[]; values: number[] } {
  const indices: number[] = [];
  values.forEach((value, i) => {
    if (value !== 0) indices.push(i);
  });
  return { indices, values: indices.map((i) => values[i]) };
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
