import type { MieCoefficients } from './mieCoefficients.ts';

/** Cross-sections over the sphere's own shadow π radius², and the mean cosine of what is scattered. */
export interface MieEfficiencies {
  extinction: number;
  scattering: number;
  /** Summed by itself; of a lossless sphere it is the rounding of the sum, of either sign. */
  absorption: number;
  /** 4|S(180°)|²/x², Bohren & Huffman (1983), eq. 4.82. */
  backscatter: number;
  /** Mean cosine of the scattering angle, −1 to 1. */
  asymmetry: number;
}

/** Sums of Bohren & Huffman (1983): eq. 4.61 and 4.62, p. 120 (asymmetry), eq. 4.82 (backscatter). */
export function mieEfficiencies({ order, aRe, aIm, bRe, bIm, x }: MieCoefficients): MieEfficiencies {
  let extinction = 0;
  let scattering = 0;
  let absorption = 0;
  let forwardness = 0;
  let backRe = 0;
  let backIm = 0;
  for (let i = order - 1; i >= 0; i--) {
    const n = i + 1;
    const removed = aRe[i] + bRe[i];
    const scattered = aRe[i] ** 2 + aIm[i] ** 2 + bRe[i] ** 2 + bIm[i] ** 2;
    extinction += (2 * n + 1) * removed;
    scattering += (2 * n + 1) * scattered;
    absorption += (2 * n + 1) * (removed - scattered);
    const sign = n % 2 === 0 ? 1 : -1;
    backRe += sign * (2 * n + 1) * (aRe[i] - bRe[i]);
    backIm += sign * (2 * n + 1) * (aIm[i] - bIm[i]);
    forwardness += ((2 * n + 1) / (n * (n + 1))) * (aRe[i] * bRe[i] + aIm[i] * bIm[i]);
    if (n < order) {
      const neighbours = aRe[i] * aRe[n] + aIm[i] * aIm[n] + bRe[i] * bRe[n] + bIm[i] * bIm[n];
      forwardness += ((n * (n + 2)) / (n + 1)) * neighbours;
    }
  }
  const scale = 2 / (x * x);
  return {
    extinction: scale * extinction,
    scattering: scale * scattering,
    absorption: scale * absorption,
    backscatter: (backRe * backRe + backIm * backIm) / (x * x),
    asymmetry: (2 * forwardness) / scattering,
  };
}
