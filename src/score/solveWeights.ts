import type { RowLimits } from '../numeric/leastDistance.ts';
import { leastDistance } from '../numeric/leastDistance.ts';
import { leastWorst } from './leastWorst.ts';
import type { NoisePower } from './noisePower.ts';
import { noisePower, noiseQuadratic } from './noisePower.ts';

/** What weights are solved for. All weights here are for a gain of one. */
export interface WeightQuestion {
  /** reading/extinction of each element, a row of `noise.currents.length` numbers for each sample. */
  ratios: Float64Array;
  noise: NoisePower;
  /** Largest allowed |Σ w ratio − 1|. */
  correction: number;
  /** Largest allowed |w|. */
  largest: number;
  /** Whether Σ w i must be 0, so that the light's intensity noise cancels. */
  balanced: boolean;
}

export interface SolvedWeights {
  weights: Float64Array;
  /** Largest |Σ w ratio − 1|. */
  worst: number;
}

/** Where the allowed correction cannot be held, the least noise is sought within this many times the least possible one. */
const BEYOND_LEAST = 1.02;

/** Rounds in which the signs of weights may change, which the noise of limited rejection hangs on. */
const SIGN_ROUNDS = 4;

/** Weights below this part of the largest allowed are none: nothing was found that reads anything. */
const NOTHING = 1e-9;

/**
 * The weights that make the time of one measurement least while every sample reads within the allowed correction: a quadratic
 * program, solved in the coordinates in which the noise is a length (`leastDistance`). Where no weights hold that correction, the
 * least worst one for bounded weights, hence for bounded noise, is found first, by a linear program (Chebyshev's problem; samples
 * come in one after the other, as in the exchange of Remez); then the least noise within a fiftieth beyond it.
 *
 * @returns null where a balance leaves no choice: fewer than two elements
 */
export function solveWeights(question: WeightQuestion): SolvedWeights | null {
  const { ratios, noise, correction, balanced } = question;
  const n = noise.currents.length;
  const basis = balanced ? complement(noise.currents) : identity(n);
  const m = basis.length / n;
  if (m === 0) return null;
  let signs: readonly number[] = new Array<number>(n).fill(1);
  let best: SolvedWeights | null = null;
  let allowed = correction;
  for (let round = 0; round < SIGN_ROUNDS; round++) {
    const scaled = inNoiseLength(noiseQuadratic(noise, signs), basis, n);
    let found = leastNoise(question, scaled, m, allowed);
    if (found === null) {
      allowed = Math.max(correction, BEYOND_LEAST * leastWorst(question, basis, n));
      found = leastNoise(question, scaled, m, allowed);
    }
    const readsNothing =
      found === null || found.every((weight) => Math.abs(weight) < NOTHING * question.largest);
    const weights = found === null || readsNothing ? plainWeights(question, scaled, m) : found;
    const solved = { weights, worst: worstOf(ratios, weights) };
    if (best === null || noisePower(noise, weights) < noisePower(noise, best.weights)) best = solved;
    const next = Array.from(weights, (weight) => (weight < 0 ? -1 : 1));
    // With the same signs the quadratic form is the noise itself, and nowhere else is it above it: nothing can be better.
    if (noise.leak === 0 || next.every((sign, j) => sign === signs[j])) return solved;
    signs = next;
  }
  return best;
}

/** Largest |Σ w ratio − 1| over all samples. */
function worstOf(ratios: Float64Array, weights: Float64Array): number {
  const n = weights.length;
  let worst = 0;
  for (let at = 0; at < ratios.length; ) {
    let reading = -1;
    for (let j = 0; j < n; j++) reading += weights[j] * ratios[at++];
    worst = Math.max(worst, Math.abs(reading));
  }
  return worst;
}

/** Columns of w = T x, n × m row by row, in which the noise is |x|². */
type Scaled = Float64Array;

/** T = Z L⁻ᵀ of the basis Z and the Cholesky factor L of ZᵀQZ. */
function inNoiseLength(quadratic: Float64Array, basis: Float64Array, n: number): Scaled {
  const m = basis.length / n;
  const product = new Float64Array(m * m);
  for (let p = 0; p < m; p++) {
    for (let q = 0; q < m; q++) {
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++)
          product[p * m + q] += basis[i * m + p] * quadratic[i * n + j] * basis[j * m + q];
      }
    }
  }
  const factor = new Float64Array(m * m);
  let largest = 0;
  for (let p = 0; p < m; p++) largest = Math.max(largest, product[p * m + p]);
  for (let p = 0; p < m; p++) {
    for (let q = 0; q <= p; q++) {
      let sum = product[p * m + q];
      for (let k = 0; k < q; k++) sum -= factor[p * m + k] * factor[q * m + k];
      // An element in the dark, without a circuit's noise, makes none: next to none will do.
      factor[p * m + q] = p === q ? Math.sqrt(Math.max(sum, 1e-14 * largest)) : sum / factor[q * m + q];
    }
  }
  // Row i of T solves L t = row i of Z.
  const scaled = new Float64Array(n * m);
  for (let i = 0; i < n; i++) {
    for (let p = 0; p < m; p++) {
      let sum = basis[i * m + p];
      for (let k = 0; k < p; k++) sum -= factor[p * m + k] * scaled[i * m + k];
      scaled[i * m + p] = sum / factor[p * m + p];
    }
  }
  return scaled;
}

/** Weights of least noise that hold the correction; null where none do. */
function leastNoise(
  { ratios, largest }: WeightQuestion,
  scaled: Scaled,
  m: number,
  allowed: number,
): Float64Array | null {
  const n = scaled.length / m;
  const samples = ratios.length / n;
  const a = new Float64Array((samples + n) * m);
  let squares = 0;
  for (let s = 0; s < samples; s++) {
    for (let p = 0; p < m; p++) {
      let sum = 0;
      for (let j = 0; j < n; j++) sum += ratios[s * n + j] * scaled[j * m + p];
      a[s * m + p] = sum;
      squares += (sum * sum) / samples;
    }
  }
  if (squares === 0) return null;
  a.set(scaled, samples * m);
  // Where all samples are alike, the shortest x that reads 1.
  const unit = 1 / Math.sqrt(squares);
  for (let i = 0; i < a.length; i++) a[i] *= unit;
  const low = new Float64Array(samples + n).fill(1 - allowed);
  const high = new Float64Array(samples + n).fill(1 + allowed);
  low.fill(-largest, samples);
  high.fill(largest, samples);
  const limits: RowLimits = { a, low, high };
  const found = leastDistance(m, limits);
  return found && times(scaled, found.x, unit);
}

/** w = T (unit · x) */
function times(scaled: Scaled, x: Float64Array, unit: number): Float64Array {
  const m = x.length;
  return Float64Array.from({ length: scaled.length / m }, (_, j) => {
    let sum = 0;
    for (let p = 0; p < m; p++) sum += scaled[j * m + p] * unit * x[p];
    return sum;
  });
}

/** Where weights read nothing at all at best: those of a mean reading of one, as far as they are allowed. */
function plainWeights({ ratios, largest }: WeightQuestion, scaled: Scaled, m: number): Float64Array {
  const n = scaled.length / m;
  const mean = new Float64Array(m);
  for (let at = 0; at < ratios.length; at++) {
    for (let p = 0; p < m; p++) mean[p] += ratios[at] * scaled[(at % n) * m + p];
  }
  if (mean.every((value) => value === 0)) mean[0] = 1;
  const squared = mean.reduce((sum, value) => sum + value * value, 0);
  const weights = times(scaled, mean, ratios.length / n / squared);
  const most = Math.max(...weights.map(Math.abs));
  return weights.map((weight) => weight * Math.min(1, largest / most));
}

/** Orthonormal columns that span all w with Σ w i = 0, n × (n − 1) row by row: those of Householder's reflection of i onto an axis. */
function complement(currents: Float64Array): Float64Array {
  const n = currents.length;
  const size = Math.hypot(...currents);
  const mirror = currents.map((current) => current / size);
  mirror[0] += Math.sign(mirror[0]) || 1;
  const squared = mirror.reduce((sum, value) => sum + value * value, 0);
  const columns = new Float64Array(n * (n - 1));
  for (let i = 0; i < n; i++) {
    for (let k = 1; k < n; k++)
      columns[i * (n - 1) + k - 1] = (i === k ? 1 : 0) - (2 * mirror[i] * mirror[k]) / squared;
  }
  return columns;
}

function identity(n: number): Float64Array {
  const columns = new Float64Array(n * n);
  for (let i = 0; i < n; i++) columns[i * n + i] = 1;
  return columns;
}
