import type { Problem } from '../base/errors.ts';

/** Scattering coefficients of a sphere: a_n and b_n for n = 1 … order stand at index n − 1. */
export interface MieCoefficients {
  order: number;
  aRe: Float64Array;
  aIm: Float64Array;
  bRe: Float64Array;
  bIm: Float64Array;
  /** Size parameter, 2π × radius × n_medium / vacuum wavelength. */
  x: number;
}

const LEAST_SIZE = 0.001;
const LARGEST_SIZE = 20_000;
/** A term this far below the largest is dropped with all that follow. */
const NEGLIGIBLE = 1e-18;

/**
 * Stores N/(N − iC), given Im(N C*) = −loss. Then |N − iC|² = |N|² + |C|² + 2 loss and the real part of
 * N (N − iC)* is |N|² + loss, without a difference when loss ≥ 0; loss is what the mode absorbs.
 */
export function setCoefficient(
  re: Float64Array,
  im: Float64Array,
  n: number,
  nRe: number,
  nIm: number,
  cRe: number,
  cIm: number,
  loss: number,
): void {
  const scattered = nRe * nRe + nIm * nIm;
  const norm = scattered + cRe * cRe + cIm * cIm + 2 * loss;
  re[n - 1] = (scattered + loss) / norm;
  im[n - 1] = (nRe * cRe + nIm * cIm) / norm;
}

/** Room for the coefficients of orders 1 … order, all 0. */
export function emptyCoefficients(x: number, order: number): MieCoefficients {
  const column = () => new Float64Array(order);
  return { order, aRe: column(), aIm: column(), bRe: column(), bIm: column(), x };
}

/** Keeps the orders up to the last one that counts. */
export function withoutTail({ order, aRe, aIm, bRe, bIm, x }: MieCoefficients): MieCoefficients {
  const size = (i: number) => (2 * i + 3) * Math.hypot(aRe[i], aIm[i], bRe[i], bIm[i]);
  let largest = 0;
  for (let i = 0; i < order; i++) largest = Math.max(largest, size(i));
  let kept = order;
  while (kept > 1 && size(kept - 1) < NEGLIGIBLE * largest) kept--;
  const head = (column: Float64Array) => column.slice(0, kept);
  return { order: kept, aRe: head(aRe), aIm: head(aIm), bRe: head(bRe), bIm: head(bIm), x };
}

/** None for a size parameter within 0.001 to 20 000. */
export function sizeProblems(x: number, key = 'x'): Problem[] {
  if (x >= LEAST_SIZE && x <= LARGEST_SIZE) return [];
  return [{ key, found: String(x), expected: `a size parameter from ${LEAST_SIZE} to ${LARGEST_SIZE}` }];
}
