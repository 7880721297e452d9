import type { Proof } from './maskProgram.ts';
import type { PlaneCells, PlaneRow } from './planeCells.ts';
import { FINE_SHARES } from './planeCells.ts';

/** What a proof needs to know of the cells: their areas over λz, and how to look at them closely. */
export type ProofCells = Pick<PlaneCells, 'areas' | 'fine' | 'around'>;

/** Relative error of a density from a table (see `DensityTable`). */
const DENSITY_ERROR = 2e-5;

/** What 1 − Σ y_i ω_i is above in the middle of a cell and of those beside it, where it is not below 0 anywhere in it. */
const WELL_ABOVE = 0.3;

/** Part of the difference from coarser sums that is taken off. */
const SAFETY = 1 / 3;

/**
 * The bound that prices prove for every mask: Σ y_i l_i + ∫ min(0, 1 − Σ y_i ω_i) da (see `MaskProgram`).
 *
 * The integral is summed over nine places in each cell, in thirds of its sides. The sum over the middles of whole cells, and that
 * over the cells' means, err by about nine times as much; what they differ from the first, the larger of both, is therefore
 * eight times its error. A third of it is taken off.
 *
 * @param prices one a row, ≥ 0 where its lower limit holds and ≤ 0 where its upper one does
 * @param lower, upper least and largest reading/extinction
 */
export function planeProof(
  cells: ProofCells,
  rows: readonly PlaneRow[],
  prices: Float64Array,
  lower: number,
  upper: number,
): Proof {
  const { areas } = cells;
  let limits = 0;
  let size = 0;
  const told = rows.flatMap((row, i) => {
    const price = prices[i];
    if (price === 0) return [];
    limits += price * (price > 0 ? lower : upper);
    size += Math.abs(price);
    return [{ row, price }];
  });
  // 1 − Σ y_i ω_i in the middles: where it is well above 0 all around, no finer look is needed.
  const middles = new Float64Array(areas.length).fill(1);
  for (const { row, price } of told) {
    for (let j = 0; j < middles.length; j++) middles[j] -= (price * row.middles[j]) / areas[j];
  }
  const chosen = cells.around(middles, WELL_ABOVE);
  const looked = Array.from(areas.keys()).filter((cell) => chosen[cell] === 1);
  const many = FINE_SHARES.length;
  const worth = new Float64Array(many * looked.length);
  for (let j = 0; j < worth.length; j++) worth[j] = areas[looked[Math.floor(j / many)]];
  for (const { row, price } of told) {
    const values = cells.fine(row, chosen);
    for (let j = 0; j < worth.length; j++) worth[j] -= price * values[j];
  }
  let [thirds, whole, means] = [limits, limits, limits];
  for (let n = 0; n < looked.length; n++) {
    let mean = 0;
    for (let j = 0; j < many; j++) {
      const value = FINE_SHARES[j] * worth[many * n + j];
      mean += value;
      thirds += Math.min(0, value);
    }
    means += Math.min(0, mean);
    whole += Math.min(0, worth[many * n + (many - 1) / 2]);
  }
  const differs = Math.max(Math.abs(whole - thirds), Math.abs(means - thirds));
  const error = SAFETY * differs + DENSITY_ERROR * upper * size;
  return { proven: thirds - error, error };
}
