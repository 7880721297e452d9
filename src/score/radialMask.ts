import { linearProgram } from '../numeric/linearProgram.ts';
import { ringLoop } from '../outline/families/rings.ts';
import type { Judge } from './judge.ts';

/** A mask that depends on the radius alone: the open share of each cell of phase. */
export interface RadialMask {
  /** Ends of the cells in phase η, ascending from 0; one more than there are shares. */
  ends: Float64Array;
  /** Transmission of each cell, 0 to 1. */
  shares: Float64Array;
  /** Σ share · width, in phase. Since κ = π/(λz), it is the area over λz. */
  openPhase: number;
  /** Whether the mask keeps the correction at the sampled places. */
  feasible: boolean;
}

/** Cells of a mask. The time of the linear program goes with their cube; rims found between cells are refined later. */
const CELLS = 160;

/**
 * The least radial mask that reads gain · extinction within the correction, at every scenario and sampled position.
 *
 * The reading is linear in a mask's transmission, so this is a linear program: minimise Σ share · width under
 * |Σ share · ratio − gain| ≤ correction · gain. Its solutions are open or closed nearly everywhere, that is, rings.
 *
 * @param largestPhase phase of the outer radius
 */
export function leastRadialMask(
  judge: Judge,
  distanceM: number,
  correction: number,
  gain: number,
  largestPhase: number,
): RadialMask {
  const ends = Float64Array.from({ length: CELLS + 1 }, (_, i) => (largestPhase * i) / CELLS);
  const width = largestPhase / CELLS;
  const discs = discRatios(judge, distanceM, ends);
  const readings = discs[0].length;
  // Unknowns: the shares, and one elastic excess that shows whether the correction can be kept at all.
  const n = CELLS + 1;
  const rows = 2 * readings + 2 * CELLS + 1;
  const a = new Float64Array(rows * n);
  const b = new Float64Array(rows);
  for (let i = 0; i < readings; i++) {
    for (let j = 0; j < CELLS; j++) {
      const ratio = (discs[j + 1][i] - discs[j][i]) / (gain * correction);
      a[2 * i * n + j] = ratio;
      a[(2 * i + 1) * n + j] = -ratio;
    }
    a[2 * i * n + CELLS] = a[(2 * i + 1) * n + CELLS] = -1;
    b[2 * i] = 1 + 1 / correction;
    b[2 * i + 1] = 1 - 1 / correction;
  }
  for (let j = 0; j < CELLS; j++) {
    const row = 2 * readings + 2 * j;
    a[row * n + j] = 1;
    b[row] = 1;
    a[(row + 1) * n + j] = -1;
  }
  a[rows * n - 1] = -1;
  const c = new Float64Array(n).fill(width);
  c[CELLS] = EXCESS_COST;
  const start = new Float64Array(n).fill(0.5);
  start[CELLS] = 1 / correction;
  const { x } = linearProgram(c, a, b, start);
  const shares = x.slice(0, CELLS).map((share) => Math.min(1, Math.max(0, share)));
  const openPhase = shares.reduce((sum, share) => sum + share * width, 0);
  return { ends, shares, openPhase, feasible: x[CELLS] < 0.02 };
}

/** Price of missing the correction by its own size, in units of λz: more than any mask on the way to it. */
const EXCESS_COST = 20;

/** Ratios of the discs within each end: the ring between two ends reads their difference. */
function discRatios(judge: Judge, distanceM: number, ends: Float64Array): Float64Array[] {
  const unitM = 1 / Math.sqrt(judge.kappa(distanceM));
  const radiusM = Math.sqrt(ends[ends.length - 1]) * unitM;
  const ratios = Array.from(ends.subarray(1), (end) => {
    const loops = [ringLoop(Math.sqrt(end) * unitM, 1)];
    const shape = { elements: [{ weight: 1, loops }], folds: Number.POSITIVE_INFINITY, mirror: true };
    return judge.shapeRatios(shape, distanceM, radiusM);
  });
  return [new Float64Array(ratios[0].length), ...ratios];
}

/**
 * The rings that a mask stands for, as rims in phase, ascending: opening, closing, opening …
 *
 * A cell that is open in part at the end of a run moves that rim; one alone becomes a thin ring in its middle. Of more
 * rings than `most` the widest are kept.
 */
export function maskRims({ ends, shares }: RadialMask, most: number): number[] {
  const rings: [number, number][] = [];
  for (let j = 0; j < shares.length; j++) {
    if (shares[j] < LEAST_SHARE) continue;
    let last = j;
    while (last + 1 < shares.length && shares[last + 1] >= LEAST_SHARE) last++;
    const width = ends[1] - ends[0];
    if (last === j) {
      const middle = (ends[j] + ends[j + 1]) / 2;
      rings.push([middle - (shares[j] * width) / 2, middle + (shares[j] * width) / 2]);
    } else {
      rings.push([ends[j + 1] - shares[j] * width, ends[last] + shares[last] * width]);
    }
    j = last;
  }
  return rings
    .sort((p, q) => q[1] - q[0] - (p[1] - p[0]))
    .slice(0, most)
    .sort((p, q) => p[0] - q[0])
    .flat();
}

const LEAST_SHARE = 0.02;
