/** Limits low ≤ a·x ≤ high, a row each. */
export interface RowLimits {
  /** rows × n, row by row. */
  a: Float64Array;
  /** −Infinity where there is no limit. */
  low: Float64Array;
  /** Infinity where there is no limit. */
  high: Float64Array;
}

/** The point nearest to the origin, and the limits that hold it off. */
export interface LeastDistance {
  x: Float64Array;
  /** x = Σ price · a of these rows: above 0 where a row's low limit holds, below 0 where its high one does. */
  prices: { row: number; price: number }[];
}

/** Limits missed by less than this, over 1 + |limit|, count as met. */
const TOLERANCE = 1e-10;

/** Limits contradict each other where no more than this is left of the right-hand side. */
const NOTHING_LEFT = 1e-11;

/** A column that lies in the span of the others but for this part of itself says nothing new. */
const DEPENDENT = 1e-10;

/** One side of a row as a·x ≥ h, and its share u in the combination. */
interface Column {
  row: number;
  sign: 1 | -1;
  /** (a, h): n + 1 numbers. */
  entries: Float64Array;
  share: number;
}

/**
 * The x of least |x| with low ≤ A x ≤ high, for a few unknowns and any number of dense rows.
 *
 * Of all combinations Σ u (a, h), u ≥ 0, the one nearest to (0, …, 0, 1) leaves a remainder whose direction is the solution; it is
 * found by adding the most violated limit, solving least squares, and dropping what would turn negative: Lawson & Hanson (1974),
 * Solving Least Squares Problems, chapter 23. Without a remainder the limits contradict each other. Scale x so that the
 * solution is not far from 1: a size s costs s² of the digits.
 *
 * @param n unknowns, 1 or more
 * @returns null where no x meets all limits
 */
export function leastDistance(n: number, limits: RowLimits): LeastDistance | null {
  let columns: Column[] = [];
  let x = new Float64Array(n);
  for (let step = 0; step < 50 + 20 * n; step++) {
    const entering = mostViolated(n, limits, x);
    if (entering === null) break;
    const isHeld = (one: Column) => one.row === entering.row && one.sign === entering.sign;
    // What holds already, or drops out at once, is violated by rounding alone.
    if (columns.some(isHeld)) break;
    const next = settled([...columns, entering], n);
    if (!next.some(isHeld)) break;
    columns = next;
    const left = remainder(columns, n);
    if (left[n] < NOTHING_LEFT) return null;
    x = Float64Array.from({ length: n }, (_, j) => -left[j] / left[n]);
  }
  return sharpened(columns, n, x);
}

function mostViolated(n: number, { a, low, high }: RowLimits, x: Float64Array): Column | null {
  let worst = TOLERANCE;
  let found: Pick<Column, 'row' | 'sign'> | null = null;
  for (let row = 0, at = 0; row < low.length; row++) {
    let value = 0;
    for (let j = 0; j < n; j++) value += a[at++] * x[j];
    // Without a limit these are −Infinity/Infinity: no number, and above nothing.
    const below = (low[row] - value) / (1 + Math.abs(low[row]));
    const above = (value - high[row]) / (1 + Math.abs(high[row]));
    if (below > worst) {
      worst = below;
      found = { row, sign: 1 };
    }
    if (above > worst) {
      worst = above;
      found = { row, sign: -1 };
    }
  }
  if (found === null) return null;
  const { row, sign } = found;
  const entries = new Float64Array(n + 1);
  for (let j = 0; j < n; j++) entries[j] = sign * a[row * n + j];
  entries[n] = sign * (sign === 1 ? low[row] : high[row]);
  return { row, sign, entries, share: 0 };
}

/** The columns whose least-squares shares are all above 0, with these shares; the last one comes in with a share of 0. */
function settled(columns: readonly Column[], n: number): Column[] {
  const target = new Float64Array(n + 1);
  target[n] = 1;
  let kept = columns;
  for (;;) {
    const shares = leastSquares(kept, target);
    if (shares === null) return kept.slice(0, -1);
    if (shares.every((share) => share > 0)) return kept.map((one, i) => ({ ...one, share: shares[i] }));
    // As far towards these shares as none turns negative; what comes to 0 first goes.
    let reach = 1;
    let first = 0;
    kept.forEach(({ share }, i) => {
      if (shares[i] > 0 || share / (share - shares[i]) >= reach) return;
      reach = share / (share - shares[i]);
      first = i;
    });
    kept = kept
      .map((one, i) => ({ ...one, share: Math.max(0, one.share + reach * (shares[i] - one.share)) }))
      .filter((_, i) => i !== first);
    if (kept.length === 0) return [];
  }
}

/** (0, …, 0, 1) − Σ share · column */
function remainder(columns: readonly Column[], n: number): Float64Array {
  const left = new Float64Array(n + 1);
  left[n] = 1;
  for (const { entries, share } of columns) for (let j = 0; j <= n; j++) left[j] -= share * entries[j];
  return left;
}

/** The shortest x with equality in the limits that hold: free of what the remainder's division costs. */
function sharpened(columns: readonly Column[], n: number, x: Float64Array): LeastDistance {
  const factors = orthogonal(
    columns.map(({ entries }) => entries.subarray(0, n)),
    n,
  );
  const total = remainder(columns, n)[n];
  const plain = columns.map(({ row, sign, share }) => ({ row, price: (sign * share) / total }));
  if (factors === null) return { x, prices: plain };
  const { q, r } = factors;
  // A = (QR)ᵀ: x = Q y with Rᵀ y = h, and prices R⁻¹ y.
  const y = columns.map(({ entries }) => entries[n]);
  for (let i = 0; i < y.length; i++) {
    for (let k = 0; k < i; k++) y[i] -= r[k][i] * y[k];
    y[i] /= r[i][i];
  }
  const sharp = new Float64Array(n);
  for (let i = 0; i < y.length; i++) for (let j = 0; j < n; j++) sharp[j] += q[i][j] * y[i];
  const prices = backSubstituted(r, y);
  if (!prices.every((price) => price >= 0)) return { x, prices: plain };
  return { x: sharp, prices: columns.map(({ row, sign }, i) => ({ row, price: sign * prices[i] })) };
}

/** Least-squares shares of the columns that make up `target`; null where the columns depend on each other. */
function leastSquares(columns: readonly Column[], target: Float64Array): number[] | null {
  const factors = orthogonal(
    columns.map(({ entries }) => entries),
    target.length,
  );
  if (factors === null) return null;
  const { q, r } = factors;
  const projected = q.map((one) => dot(one, target));
  return backSubstituted(r, projected);
}

/** Orthonormal q and upper triangular r with column i = Σ_k r[k][i] q[k], by Gram–Schmidt done twice; null for dependent columns. */
function orthogonal(
  columns: readonly Float64Array[],
  length: number,
): { q: Float64Array[]; r: number[][] } | null {
  const q: Float64Array[] = [];
  const r: number[][] = columns.map(() => columns.map(() => 0));
  for (const [i, column] of columns.entries()) {
    const rest = column.slice();
    for (let pass = 0; pass < 2; pass++) {
      for (let k = 0; k < i; k++) {
        const part = dot(q[k], rest);
        r[k][i] += part;
        for (let j = 0; j < length; j++) rest[j] -= part * q[k][j];
      }
    }
    const size = Math.sqrt(dot(rest, rest));
    if (!(size > DEPENDENT * Math.sqrt(dot(column, column)))) return null;
    r[i][i] = size;
    q.push(rest.map((value) => value / size));
  }
  return { q, r };
}

function backSubstituted(r: readonly number[][], right: readonly number[]): number[] {
  const out = [...right];
  for (let i = out.length - 1; i >= 0; i--) {
    for (let k = i + 1; k < out.length; k++) out[i] -= r[i][k] * out[k];
    out[i] /= r[i][i];
  }
  return out;
}

function dot(p: Float64Array, q: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < p.length; i++) sum += p[i] * q[i];
  return sum;
}
