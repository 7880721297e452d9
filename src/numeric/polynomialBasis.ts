/** Highest power of one variable in a basis. */
const MOST_POWER = 12;

/** A product of one or two Legendre polynomials: variable and degree of each; degree 0 for a factor of 1. */
export interface Term {
  first: number;
  firstDegree: number;
  second: number;
  secondDegree: number;
}

/** How a function is expected to depend on one variable. */
export interface VariableKind {
  variable: number;
  /** Highest power of it alone: 1 to 12. */
  power: number;
  /** Whether it makes ripples, on which what other variables do depends too. */
  ripples: boolean;
}

/**
 * The terms of a sparse polynomial: each variable alone, pairs up to the third power together, and every power of one that makes
 * ripples with the first two of any other. Products of three variables are left out, as truncations that favour low rank
 * do (Blatman & Sudret, 2011).
 */
export function sparseTerms(kinds: readonly VariableKind[]): Term[] {
  const terms: Term[] = [{ first: 0, firstDegree: 0, second: 0, secondDegree: 0 }];
  for (const [i, one] of kinds.entries()) {
    for (let power = 1; power <= one.power; power++) {
      terms.push({ first: one.variable, firstDegree: power, second: 0, secondDegree: 0 });
    }
    for (const other of kinds.slice(0, i)) {
      for (let p = 1; p <= one.power; p++) {
        for (let q = 1; q <= other.power; q++) {
          const isLow = p + q <= Math.min(3, Math.max(one.power, other.power));
          if (isLow || (one.ripples && q <= 2) || (other.ripples && p <= 2)) {
            terms.push({ first: one.variable, firstDegree: p, second: other.variable, secondDegree: q });
          }
        }
      }
    }
  }
  return terms;
}

/**
 * Writes every term at a point.
 *
 * @param point a number for each variable, about −1 to 1
 * @param out as long as `terms`
 * @param work 13 numbers a variable
 */
export function evaluateTerms(
  terms: readonly Term[],
  point: Float64Array,
  out: Float64Array,
  work: Float64Array,
): void {
  const row = MOST_POWER + 1;
  for (let v = 0; v < point.length; v++) {
    const u = point[v];
    work[v * row] = 1;
    work[v * row + 1] = u;
    // Bonnet's recursion.
    for (let n = 1; n < MOST_POWER; n++) {
      work[v * row + n + 1] = ((2 * n + 1) * u * work[v * row + n] - n * work[v * row + n - 1]) / (n + 1);
    }
  }
  for (let t = 0; t < terms.length; t++) {
    const { first, firstDegree, second, secondDegree } = terms[t];
    out[t] = work[first * row + firstDegree] * work[second * row + secondDegree];
  }
}

/** Numbers of work space that `evaluateTerms` needs for so many variables. */
export function termWork(variables: number): Float64Array {
  return new Float64Array(variables * (MOST_POWER + 1));
}
