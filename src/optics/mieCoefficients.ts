import type { Problem } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import type { MieCoefficients } from './mieModes.ts';
import { emptyCoefficients, setCoefficient, sizeProblems, withoutTail } from './mieModes.ts';
import { indexContrast, indexSquare } from './relativeIndex.ts';
import { riccatiBessel } from './riccatiBessel.ts';
import { seriesOrder } from './seriesOrder.ts';
import { sphereInterior } from './sphereInterior.ts';

export type { MieCoefficients } from './mieModes.ts';

const LEAST_INDEX = 0.01;
const LARGEST_INDEX = 100;
/** Of |m − 1|; a little below 1e-6, for what 1 + 1e-6 loses as a double. */
const LEAST_CONTRAST = 0.999_999e-6;

/**
 * Mie's coefficients of a homogeneous sphere, time factor exp(−iωt) (Bohren & Huffman 1983, eq. 4.56 and 4.57).
 *
 * With ' for d/dx, D_n = ψ_n'/ψ_n at mx, U = m D_n and V = U/m²:
 *
 *     b_n = N/(N − iC),   N = U ψ_n − ψ_n',   C = U χ_n − χ_n'          (a_n: V in place of U)
 *
 * Small, faint and weakly absorbing spheres would lose digits in N and in Re b_n. So N comes from `sphereInterior`,
 * as (m² − 1) f_n for b_n and (m² − 1)(f_n − ψ_n')/m² for a_n, and the Wronskian ψ'χ − ψχ' = 1 makes Re b_n a
 * ratio of sums of positive terms: see `setCoefficient`.
 *
 * The result is as exact as its arguments: near the medium, an index of 16 digits has fewer in m − 1.
 *
 * @param x size parameter, 0.001 to 20 000
 * @param relativeIndex m = n + ik relative to the medium, n ≥ 0, k ≥ 0, |m| 0.01 to 100, |m − 1| at least 1e-6
 * @throws RimwrightError `input` outside these ranges
 */
export function mieCoefficients(x: number, relativeIndex: readonly [n: number, k: number]): MieCoefficients {
  const problems = [...sizeProblems(x), ...indexProblems(relativeIndex)];
  if (problems.length > 0) throw inputError(problems);
  const order = seriesOrder(x);
  const outside = riccatiBessel(x, order);
  const { slopeRe, slopeIm, differenceRe, differenceIm } = sphereInterior(x, relativeIndex, outside);
  const { psi, chi } = outside;
  const [squareRe, squareIm] = indexSquare(relativeIndex);
  const squareNorm = squareRe * squareRe + squareIm * squareIm;
  const [contrastRe, contrastIm] = indexContrast(relativeIndex);
  const result = emptyCoefficients(x, order);
  for (let n = 1; n <= order; n++) {
    const psiSlope = psi[n - 1] - (n / x) * psi[n];
    const chiSlope = chi[n - 1] - (n / x) * chi[n];

    const uRe = slopeRe[n];
    const uIm = slopeIm[n];
    const fRe = differenceRe[n];
    const fIm = differenceIm[n];
    const bRe = contrastRe * fRe - contrastIm * fIm;
    const bIm = contrastRe * fIm + contrastIm * fRe;
    setCoefficient(result.bRe, result.bIm, n, bRe, bIm, uRe * chi[n] - chiSlope, uIm * chi[n], -uIm);

    const vRe = (uRe * squareRe + uIm * squareIm) / squareNorm;
    const vIm = (uIm * squareRe - uRe * squareIm) / squareNorm;
    const gRe = bRe - contrastRe * psiSlope;
    const gIm = bIm - contrastIm * psiSlope;
    const aRe = (gRe * squareRe + gIm * squareIm) / squareNorm;
    const aIm = (gIm * squareRe - gRe * squareIm) / squareNorm;
    setCoefficient(result.aRe, result.aIm, n, aRe, aIm, vRe * chi[n] - chiSlope, vIm * chi[n], -vIm);
  }
  return withoutTail(result);
}

/**
 * Coefficients of a perfectly conducting sphere, the limit of a large |m|: a_n = ψ_n'/ξ_n', b_n = ψ_n/ξ_n
 * (van de Hulst 1957, section 10.6).
 *
 * @param x size parameter, 0.001 to 20 000
 * @throws RimwrightError `input` outside this range
 */
export function mieCoefficientsConductor(x: number): MieCoefficients {
  const problems = sizeProblems(x);
  if (problems.length > 0) throw inputError(problems);
  const order = seriesOrder(x);
  const { psi, chi } = riccatiBessel(x, order);
  const result = emptyCoefficients(x, order);
  for (let n = 1; n <= order; n++) {
    const psiSlope = psi[n - 1] - (n / x) * psi[n];
    const chiSlope = chi[n - 1] - (n / x) * chi[n];
    setCoefficient(result.aRe, result.aIm, n, psiSlope, 0, chiSlope, 0, 0);
    setCoefficient(result.bRe, result.bIm, n, psi[n], 0, chi[n], 0, 0);
  }
  return withoutTail(result);
}

function indexProblems([n, k]: readonly [n: number, k: number]): Problem[] {
  const modulus = Math.hypot(n, k);
  const inRange = n >= 0 && k >= 0 && modulus >= LEAST_INDEX && modulus <= LARGEST_INDEX;
  if (inRange && Math.hypot(n - 1, k) >= LEAST_CONTRAST) return [];
  const expected =
    `an index n + ik relative to the medium with n ≥ 0, k ≥ 0, ` +
    `modulus ${LEAST_INDEX} to ${LARGEST_INDEX}, at least 1e-6 away from 1`;
  return [{ key: 'relativeIndex', found: `${n} + ${k}i`, expected }];
}
