import type { LinearModel, LinearModels } from '../numeric/linearModel.ts';
import type { LeastMask } from './maskProgram.ts';
import type { PlaneRow } from './planeCells.ts';
import type { ProofCells } from './planeProof.ts';
import { planeProof } from './planeProof.ts';

/** Cells that enter the program at once, at most, and rounds of that. */
const MOST_ENTERING = 1500;
const ROUNDS = 60;

/** Share of the bound that cells outside the program may still take from it. */
const TAKEN = 1e-5;

/** What a reading that is missed by the whole extinction costs, in whole circles. */
const MISSED = 300;

/**
 * The least area over λz of a mask of cells in the plane, as `MaskProgram` finds it for annuli, with many more cells than a solver can take.
 *
 * Nearly all cells stay closed. So the program begins with none, and with costly slack at every place; what the prices of a solution say of
 * each cell tells which would pay, and the best of them enter, until none does (sifting: Bixby, Gregory, Lustig, Marsten and Shanno 1992).
 */
export class PlaneProgram {
  readonly #cells: ProofCells;
  readonly #model: LinearModel;
  readonly #rows: PlaneRow[] = [];
  /** What stands in each column of the model: a cell, or −1 for slack. */
  readonly #columns: number[] = [];
  readonly #isIn: Uint8Array;
  readonly #whole: number;

  constructor(models: LinearModels, cells: ProofCells) {
    this.#cells = cells;
    this.#model = models.open(new Float64Array(0), new Float64Array(0));
    this.#isIn = new Uint8Array(cells.areas.length);
    this.#whole = cells.areas.reduce((sum, area) => sum + area, 0);
  }

  get places(): number {
    return this.#rows.length;
  }

  /** Adds a place by what each cell adds to reading/extinction there. */
  add(row: PlaneRow): void {
    const coefficients = Float64Array.from(this.#columns, (cell) => (cell < 0 ? 0 : row.added[cell]));
    this.#model.addRow(coefficients, -Infinity, Infinity);
    this.#rows.push(row);
    const [more, less] = [1, -1].map((sign) => {
      const column = new Float64Array(this.#rows.length);
      column[this.#rows.length - 1] = sign;
      return column;
    });
    const cost = MISSED * this.#whole;
    this.#enter([-1, -1], Float64Array.of(cost, cost), Infinity, [more, less]);
  }

  /** @returns null where no mask keeps all places */
  solve(gain: number, correction: number): LeastMask | null {
    const [lower, upper] = [gain * (1 - correction), gain * (1 + correction)];
    this.#rows.forEach((_, i) => {
      this.#model.setRow(i, lower, upper);
    });
    let best: { prices: Float64Array; bound: number } | null = null;
    let values: Float64Array = new Float64Array(0);
    for (let round = 0; round < ROUNDS; round++) {
      const optimum = this.#model.solve();
      if (optimum === null) return null;
      const { prices } = optimum;
      values = optimum.values;
      const worth = this.#worth(prices);
      const taken = this.#takenBy(worth);
      if (best === null || optimum.objective + taken > best.bound)
        best = { prices, bound: optimum.objective + taken };
      if (best.bound > this.#whole && this.#isImpossible(best.prices, lower, upper)) return null;
      if (-taken <= TAKEN * optimum.objective) break;
      this.#enterBest(worth);
    }
    if (best === null) return null;
    const shares = this.#sharesOf(values);
    const area = shares.reduce((sum, share, cell) => sum + share * this.#cells.areas[cell], 0);
    const { prices } = best;
    const prove = () => planeProof(this.#cells, this.#rows, prices, lower, upper);
    return { shares, area, prices, prove };
  }

  dispose(): void {
    this.#model.dispose();
  }

  /** Whether the prices prove more than the whole circle, by far more than what cells and their middles differ in. */
  #isImpossible(prices: Float64Array, lower: number, upper: number): boolean {
    const limits = prices.reduce((sum, price) => sum + price * (price > 0 ? lower : upper), 0);
    const [means, middles] = (['added', 'middles'] as const).map((which) =>
      this.#worth(prices, which).reduce((sum, value) => sum + Math.min(0, value), limits),
    );
    return means - 2 * Math.abs(means - middles) > this.#whole;
  }

  /** Area less what the prices pay, for each cell. */
  #worth(prices: Float64Array, which: 'added' | 'middles' = 'added'): Float64Array {
    const worth = this.#cells.areas.slice();
    prices.forEach((price, i) => {
      if (price === 0) return;
      const row = this.#rows[i][which];
      for (let j = 0; j < worth.length; j++) worth[j] -= price * row[j];
    });
    return worth;
  }

  /** What cells outside the program would take from its value, at most. */
  #takenBy(worth: Float64Array): number {
    return worth.reduce((sum, value, cell) => (this.#isIn[cell] === 1 ? sum : sum + Math.min(0, value)), 0);
  }

  #enterBest(worth: Float64Array): void {
    const { areas } = this.#cells;
    const paying: number[] = [];
    worth.forEach((value, cell) => {
      if (value < 0 && this.#isIn[cell] === 0) paying.push(cell);
    });
    const entering = paying.sort((p, q) => worth[p] / areas[p] - worth[q] / areas[q]).slice(0, MOST_ENTERING);
    const columns = entering.map((cell) => Float64Array.from(this.#rows, ({ added }) => added[cell]));
    for (const cell of entering) this.#isIn[cell] = 1;
    this.#enter(
      entering,
      Float64Array.from(entering, (cell) => areas[cell]),
      1,
      columns,
    );
  }

  #enter(cells: readonly number[], costs: Float64Array, most: number, columns: Float64Array[]): void {
    this.#model.addColumns(costs, new Float64Array(costs.length).fill(most), columns);
    this.#columns.push(...cells);
  }

  #sharesOf(values: Float64Array): Float64Array {
    const shares = new Float64Array(this.#cells.areas.length);
    this.#columns.forEach((cell, column) => {
      if (cell >= 0) shares[cell] = Math.min(1, Math.max(0, values[column]));
    });
    return shares;
  }
}
