import type { MieCoefficients } from './mieCoefficients.ts';

/** S(0) = S1(0) = S2(0) as [re, im] (Bohren & Huffman 1983, section 4.4). Extinction is 4π Re S(0)/k². */
export function forwardAmplitude({ order, aRe, aIm, bRe, bIm }: MieCoefficients): [number, number] {
  let re = 0;
  let im = 0;
  for (let i = order - 1; i >= 0; i--) {
    re += (2 * i + 3) * (aRe[i] + bRe[i]);
    im += (2 * i + 3) * (aIm[i] + bIm[i]);
  }
  return [re / 2, im / 2];
}

/**
 * Amplitudes S1 (field across the plane of scattering) and S2 (in it), Bohren & Huffman (1983), eq. 4.74, with
 * c_n = (2n+1)/(n(n+1)):
 *
 *     S1 = Σ c_n (a_n π_n + b_n τ_n),   S2 = Σ c_n (a_n τ_n + b_n π_n)
 *
 * The angular functions are run from their differences d_n = (π_n − π_{n−1})/n and v = 1 − |cosθ| (Reinsch's remedy, as told by Oliver 1977),
 *
 *     d_{n+1} = d_n − v c_n π_n,   π_{n+1} = π_n + (n+1) d_{n+1},   τ_n = n(n+1) d_n − (1 + nv) π_n
 *
 * because their recurrence in cosθ (eq. 4.47) loses digits like n² near 0° and 180°. Behind 90° serves
 * π_n(−μ) = (−1)^{n+1} π_n(μ), τ_n(−μ) = (−1)^n τ_n(μ). What is left near 0° is the rounding of cosTheta itself,
 * which moves S by up to 3e-17 x² of itself.
 *
 * @param cosTheta cosine of the scattering angle, −1 to 1
 * @param out gets S1re, S1im, S2re, S2im from `offset` on
 */
export function scatteringAmplitudes(
  { order, aRe, aIm, bRe, bIm }: MieCoefficients,
  cosTheta: number,
  out: Float64Array,
  offset = 0,
): void {
  const v = 1 - Math.abs(cosTheta);
  const flip = cosTheta < 0 ? -1 : 1;
  let difference = 1;
  let pi = 1;
  let sign = 1;
  let s1Re = 0;
  let s1Im = 0;
  let s2Re = 0;
  let s2Im = 0;
  for (let n = 1; n <= order; n++) {
    const i = n - 1;
    const square = n * (n + 1);
    const c = (2 * n + 1) / square;
    const p = c * pi;
    const signedP = sign * p;
    sign *= flip;
    const signedT = sign * c * (square * difference - (1 + n * v) * pi);
    s1Re += aRe[i] * signedP + bRe[i] * signedT;
    s1Im += aIm[i] * signedP + bIm[i] * signedT;
    s2Re += aRe[i] * signedT + bRe[i] * signedP;
    s2Im += aIm[i] * signedT + bIm[i] * signedP;
    difference -= v * p;
    pi += (n + 1) * difference;
  }
  out[offset] = s1Re;
  out[offset + 1] = s1Im;
  out[offset + 2] = s2Re;
  out[offset + 3] = s2Im;
}
