import type { LinearModel, LinearModels } from '../numeric/linearModel.ts';

/** The plane in small pieces that a mask may open, each in part. */
export interface MaskCells {
  /** Number of cells of a mask. */
  count: number;
  /** Fine cells in each of them, neighbours of each other: what the certificate is summed over. */
  split: number;
  /** Area of one fine cell over λz. */
  fineArea: number;
}

/** Which masks are meant: any at all, or outlines that every ray from the axis leaves once, and never enters again. */
export type MaskKind = 'any' | 'star';

/** The least mask that keeps some readings, and the proof of how little less any other needs. */
export interface LeastMask {
  /** Open share of each cell, 0 to 1. */
  shares: Float64Array;
  /** Its area over λz. */
  area: number;
  /** One a place: how much the area rises with its active limit. */
  prices: Float64Array;
  /** What they prove for every other mask. */
  prove: () => Proof;
}

export interface Proof {
  /** No mask that keeps these readings has less area over λz: see `MaskProgram`. */
  proven: number;
  /** What was taken off `proven` for the finite size of the fine cells and of the tables. */
  error: number;
}

/** Relative error of tabled readings; see `PHASE_STEP` of the radial tables and `perRadian` of the report's fineness. */
const READING_ERROR = 2e-6;

/**
 * The least area over λz of a mask that reads gain · extinction within the correction at every place that was added.
 *
 * A reading is linear in the mask's transmission t, so this is a linear program: minimise ∫ t da under
 * |∫ t ω_i da − g| ≤ ε g. Its prices y prove a bound for every mask, whatever its cells: since each place's limit l_i holds,
 *
 *     ∫ t da ≥ Σ y_i l_i + ∫ t (1 − Σ y_i ω_i) da ≥ Σ y_i l_i + ∫ min(0, 1 − Σ y_i ω_i) da ,
 *
 * for any prices at all that are ≥ 0 at lower limits and ≤ 0 at upper ones (weak duality). The last integral is summed over
 * fine cells; its error falls with the square of their size, and twice what halving them changes is taken off.
 *
 * Outlines about the axis, averaged over rotations, have a t that only falls with the radius: a mean of discs. Then the unknowns are
 * the discs' shares, of sum 1 at most, and the least over all discs of ∫ (1 − Σ y_i ω_i) da takes the place of the last integral.
 */
export class MaskProgram {
  readonly #cells: MaskCells;
  readonly #kind: MaskKind;
  readonly #model: LinearModel;
  readonly #rows: Float64Array[] = [];

  constructor(models: LinearModels, cells: MaskCells, kind: MaskKind) {
    this.#cells = cells;
    this.#kind = kind;
    const area = cells.split * cells.fineArea;
    const costs = new Float64Array(cells.count).fill(area);
    this.#model = models.open(
      kind === 'any' ? costs : cumulative(costs),
      new Float64Array(cells.count).fill(1),
    );
    if (kind === 'star') this.#model.addRow(new Float64Array(cells.count).fill(1), 0, 1);
  }

  get places(): number {
    return this.#rows.length;
  }

  /** Adds a place by what each fine cell adds to reading/extinction there. */
  add(fine: Float64Array): void {
    const coarse = merge(fine, this.#cells.split);
    this.#model.addRow(this.#kind === 'any' ? coarse : cumulative(coarse), -Infinity, Infinity);
    this.#rows.push(fine);
  }

  /** @returns null where no mask keeps all places */
  solve(gain: number, correction: number): LeastMask | null {
    const first = this.#kind === 'any' ? 0 : 1;
    const [lower, upper] = [gain * (1 - correction), gain * (1 + correction)];
    this.#rows.forEach((_, i) => {
      this.#model.setRow(first + i, lower, upper);
    });
    const optimum = this.#model.solve();
    if (optimum === null) return null;
    const prices = optimum.prices.slice(first);
    const shares = this.#kind === 'any' ? optimum.values : openShares(optimum.values);
    const area = shares.reduce((sum, share) => sum + share, 0) * this.#cells.split * this.#cells.fineArea;
    return { shares, area, prices, prove: () => this.#proof(prices, lower, upper) };
  }

  #proof(prices: Float64Array, lower: number, upper: number): Proof {
    const [fine, half] = [1, 2].map((size) => this.#certificate(prices, lower, upper, size));
    const size = prices.reduce((sum, price) => sum + Math.abs(price), 0);
    const error = 2 * Math.abs(half - fine) + READING_ERROR * upper * size;
    return { proven: fine - error, error };
  }

  dispose(): void {
    this.#model.dispose();
  }

  /** The bound that prices prove, with `size` fine cells to a piece of the integral. */
  #certificate(prices: Float64Array, lower: number, upper: number, size: number): number {
    const worth = new Float64Array((this.#cells.count * this.#cells.split) / size);
    worth.fill(size * this.#cells.fineArea);
    let sum = 0;
    prices.forEach((price, i) => {
      if (price === 0) return;
      sum += price * (price > 0 ? lower : upper);
      const row = merge(this.#rows[i], size);
      for (let j = 0; j < worth.length; j++) worth[j] -= price * row[j];
    });
    if (this.#kind === 'any') return worth.reduce((total, value) => total + Math.min(0, value), sum);
    return sum + cumulative(worth).reduce((least, value) => Math.min(least, value), 0);
  }
}

/** Sums of `size` neighbours each. */
function merge(fine: Float64Array, size: number): Float64Array {
  if (size === 1) return fine;
  const sums = new Float64Array(fine.length / size);
  for (let j = 0; j < fine.length; j++) sums[Math.floor(j / size)] += fine[j];
  return sums;
}

function cumulative(values: Float64Array): Float64Array {
  let sum = 0;
  return values.map((value) => {
    sum += value;
    return sum;
  });
}

/** The open share of each cell of a mean of discs: what all discs that reach as far weigh together. */
function openShares(discs: Float64Array): Float64Array {
  return cumulative(discs.slice().reverse()).reverse();
}
