import { indexContrast, indexSquare } from './relativeIndex.ts';
import type { RiccatiBessel } from './riccatiBessel.ts';
import { seriesOrder } from './seriesOrder.ts';

/** What the inside of a sphere says at its surface, at index n = 1 … order. */
export interface SphereInterior {
  /** U_n = m D_n(mx) = d ln ψ_n(mx)/dx. */
  slopeRe: Float64Array;
  slopeIm: Float64Array;
  /** f_n = (U_n ψ_n(x) − ψ_n'(x))/(m² − 1). */
  differenceRe: Float64Array;
  differenceIm: Float64Array;
}

/** An error of f may grow by this power of e before the plain difference is better. */
const LARGEST_GROWTH = 2;

/**
 * Runs U and f from high orders down to 1, U by Bohren & Huffman (1983), eq. 4.89:
 *
 *     w = U_n + n/x,   U_{n−1} = n/x − m²/w,   f_{n−1} = (f_n − ψ_{n−1}(x))/w
 *
 * The plain difference in f cancels where m is near 1, and where x is small. Its recurrence does not: it follows from
 * that of U and ψ_{n−1} = ψ_n' + nψ_n/x (derived for this project), and f is an integral over the sphere,
 * −∫₀ˣ ψ_n(mt) ψ_n(t) dt / ψ_n(mx), without m − 1.
 *
 * @param x size parameter, above 0
 * @param m n + ik relative to the medium, k ≥ 0, not 1
 * @param outside ψ_n(x) for n = 0 … order
 */
export function sphereInterior(
  x: number,
  m: readonly [n: number, k: number],
  { psi }: RiccatiBessel,
): SphereInterior {
  const order = psi.length - 1;
  const slopeRe = new Float64Array(order + 1);
  const slopeIm = new Float64Array(order + 1);
  const differenceRe = new Float64Array(order + 1);
  const differenceIm = new Float64Array(order + 1);
  const modulus = Math.hypot(m[0], m[1]);
  const [squareRe, squareIm] = indexSquare(m);
  const [contrastRe, contrastIm] = indexContrast(m);
  const contrastNorm = contrastRe * contrastRe + contrastIm * contrastIm;
  // Below |m| = 1 an error of f grows like |m|^−n; by then m − 1 is large enough for the plain difference.
  const plain = -x * Math.log(modulus) > LARGEST_GROWTH;

  // So far above |mx|, the error of starting with the small-argument form dies out.
  let n = Math.max(order, seriesOrder(modulus * x)) + 15;
  let uRe = (n + 1) / x;
  let uIm = 0;
  let fRe = 0;
  let fIm = 0;
  for (; n >= 1; n--) {
    if (n <= order) {
      if (plain || n === order) {
        const restRe = (uRe + n / x) * psi[n] - psi[n - 1];
        const restIm = uIm * psi[n];
        fRe = (restRe * contrastRe + restIm * contrastIm) / contrastNorm;
        fIm = (restIm * contrastRe - restRe * contrastIm) / contrastNorm;
      }
      slopeRe[n] = uRe;
      slopeIm[n] = uIm;
      differenceRe[n] = fRe;
      differenceIm[n] = fIm;
    }
    // A zero denominator may be any tiny number: the next step takes it back (Thompson & Barnett 1986).
    const wRe = uRe + n / x || 1e-30;
    const wNorm = wRe * wRe + uIm * uIm;
    if (n <= order) {
      const rest = fRe - psi[n - 1];
      fRe = (rest * wRe + fIm * uIm) / wNorm;
      fIm = (fIm * wRe - rest * uIm) / wNorm;
    }
    uRe = n / x - (squareRe * wRe + squareIm * uIm) / wNorm;
    uIm = (squareRe * uIm - squareIm * wRe) / wNorm;
  }
  return { slopeRe, slopeIm, differenceRe, differenceIm };
}
