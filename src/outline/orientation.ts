/**
 * On which side of the line from a to b the point c lies: 1 left, −1 right, 0 exactly on it.
 *
 * The sign is exact for any finite coordinates whose products neither overflow nor underflow (1e-140 to 1e140, and 0):
 * the plain determinant decides where its rounding error cannot change the sign, an exact sum elsewhere.
 * After J. R. Shewchuk, Discrete Comput. Geom. 18 (1997) 305, section 4.3 (the bound) and theorem 10 (the sum).
 */
export function orientation(ax: number, ay: number, bx: number, by: number, cx: number, cy: number): number {
  const left = (ax - cx) * (by - cy);
  const right = (ay - cy) * (bx - cx);
  const bound = ERROR_BOUND * (Math.abs(left) + Math.abs(right));
  if (Math.abs(left - right) > bound) return Math.sign(left - right);
  return exactSign([ax, by, -ax, cy, -cx, by, -ay, bx, ay, cx, cy, bx]);
}

const HALF_ULP = 2 ** -53;
const ERROR_BOUND = (3 + 16 * HALF_ULP) * HALF_ULP;

/** Exact sign of f0·f1 + f2·f3 + …: every product and every sum is kept together with its rounding error. */
function exactSign(factors: readonly number[]): number {
  let terms: number[] = [];
  for (let k = 0; k < factors.length; k += 2) {
    const product = factors[k] * factors[k + 1];
    terms = grow(terms, productError(factors[k], factors[k + 1], product));
    terms = grow(terms, product);
  }
  // The terms do not overlap and grow in size, so the last that is not zero has the sign of the sum.
  return Math.sign(terms.findLast((term) => term !== 0) ?? 0);
}

/** Adds one number to a sum kept as terms that do not overlap, smallest first (Shewchuk, figure 4). */
function grow(terms: readonly number[], added: number): number[] {
  const grown: number[] = [];
  let carried = added;
  for (const term of terms) {
    const sum = carried + term;
    const virtual = sum - carried;
    grown.push(carried - (sum - virtual) + (term - virtual));
    carried = sum;
  }
  grown.push(carried);
  return grown;
}

/** What rounding took from a·b (Dekker 1971): both factors are split into halves of 26 bits, whose products are exact. */
function productError(a: number, b: number, product: number): number {
  const aHigh = highHalf(a);
  const bHigh = highHalf(b);
  const aLow = a - aHigh;
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}

function highHalf(value: number): number {
  const scaled = (2 ** 27 + 1) * value;
  return scaled - (scaled - value);
}
