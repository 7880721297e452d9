import { linearProgram } from '../numeric/linearProgram.ts';

/** Most rounds, and what the last may still miss of the optimum. */
const ROUNDS = 40;
const MISSED = 1e-7;

/**
 * The least t with |Σ w ratio − 1| ≤ t over all samples, for bounded weights: Chebyshev's problem, by linear programs on a few samples to
 * which the worst of all the others are added until none is worse, as in the exchange of Remez.
 *
 * @param ratios a row of n numbers for each sample
 * @param largest allowed |w|
 * @param basis n × m row by row: the weights are its columns' combinations
 */
export function leastWorst(
  { ratios, largest }: { ratios: Float64Array; largest: number },
  basis: Float64Array,
  n: number,
): number {
  const m = basis.length / n;
  const samples = ratios.length / n;
  const rows = new Float64Array(samples * m);
  for (let s = 0; s < samples; s++) {
    for (let p = 0; p < m; p++) {
      for (let j = 0; j < n; j++) rows[s * m + p] += largest * ratios[s * n + j] * basis[j * m + p];
    }
  }
  const chosen = new Set<number>();
  let x: Float64Array = new Float64Array(m);
  let least = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const { above, below, worst } = extremes(rows, x);
    // Until a set of samples is there, the extremes of what no weights read.
    if (round > 0 && worst <= least + MISSED * (1 + least)) return worst;
    const before = chosen.size;
    chosen.add(above).add(below);
    if (chosen.size === before) return worst;
    const solved = chebyshev(rows, [...chosen], basis, m);
    x = solved.x;
    least = solved.t;
  }
  return extremes(rows, x).worst;
}

/** Samples with the largest and the least reading. */
function extremes(rows: Float64Array, x: Float64Array): { above: number; below: number; worst: number } {
  const m = x.length;
  let [above, below] = [0, 0];
  let [most, least] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  for (let s = 0; s < rows.length / m; s++) {
    let reading = 0;
    for (let p = 0; p < m; p++) reading += rows[s * m + p] * x[p];
    if (reading > most) {
      most = reading;
      above = s;
    }
    if (reading < least) {
      least = reading;
      below = s;
    }
  }
  return { above, below, worst: Math.max(most - 1, 1 - least) };
}

/** Chebyshev's problem on some samples: unknowns x and t, weights (over the largest allowed) Z x within −1 and 1. */
function chebyshev(
  rows: Float64Array,
  samples: readonly number[],
  basis: Float64Array,
  m: number,
): { x: Float64Array; t: number } {
  const n = basis.length / m;
  const unknowns = m + 1;
  const count = 2 * samples.length + 2 * n;
  const a = new Float64Array(count * unknowns);
  const b = new Float64Array(count);
  let row = 0;
  const put = (of: Float64Array, from: number, sign: 1 | -1, last: number, right: number) => {
    for (let p = 0; p < m; p++) a[row * unknowns + p] = sign * of[from * m + p];
    a[row * unknowns + m] = last;
    b[row++] = right;
  };
  for (const sign of [1, -1] as const) {
    for (const s of samples) put(rows, s, sign, -1, sign);
    for (let j = 0; j < n; j++) put(basis, j, sign, 0, 1);
  }
  const c = new Float64Array(unknowns);
  c[m] = 1;
  const start = new Float64Array(unknowns);
  start[m] = 1.1;
  const { x } = linearProgram(c, a, b, start);
  return { x: x.slice(0, m), t: x[m] };
}
