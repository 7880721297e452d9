import type { MieCoefficients } from './mieCoefficients.ts';

/** Numbers that `scatteredField` writes. */
export const FIELD_NUMBERS = 12;

/**
 * The exact field that a sphere scatters from a plane wave E = x̂ e^{ikz}, H = ŷ e^{ikz} (H over the medium's admittance),
 * at any point outside it (Bohren & Huffman 1983, eq. 4.45 with 4.50). With P = e^{ikr}/(−ikr) taken out:
 *
 *     E_θ = P e_θ cosφ    E_φ = −P e_φ sinφ    E_r = P e_r cosφ
 *     H_θ = P h_θ sinφ    H_φ =  P h_φ cosφ    H_r = P h_r sinφ
 *
 *     e_θ = Σ c_n (a_n q_n τ_n + b_n p_n π_n)    e_φ = Σ c_n (a_n q_n π_n + b_n p_n τ_n)
 *     h_θ = Σ c_n (b_n q_n τ_n + a_n p_n π_n)    h_φ = Σ c_n (b_n q_n π_n + a_n p_n τ_n)
 *     e_r = −i sinθ/(kr) Σ (2n+1) a_n p_n π_n    h_r = −i sinθ/(kr) Σ (2n+1) b_n p_n π_n
 *
 * c_n = (2n+1)/(n(n+1)). p and q are the outgoing waves without their far phase, ξ_n = (−i)^{n+1} e^{ikr} p_n and
 * ξ_n' = (−i)^n e^{ikr} q_n, so that no digits go where kr is large. They follow from the recurrence of ξ_n, stable upwards,
 *
 *     p_{n+1} = p_{n−1} + i (2n+1)/(kr) p_n,   q_n = p_{n−1} + i n/(kr) p_n,   p_{−1} = p_0 = 1
 *
 * Far away p_n = q_n = 1: e_θ and h_φ become S2, e_φ and h_θ become S1, the radial parts vanish.
 * The angular functions are those of `scatteringAmplitudes`.
 *
 * @param kr wave number times the distance from the sphere's centre, x or more
 * @param versine 1 − cosθ, 0 to 2: near the axis it has the digits that cosθ lacks
 * @param out gets e_θ, e_φ, e_r, h_θ, h_φ, h_r, each as re, im
 */
export function scatteredField(
  { order, aRe, aIm, bRe, bIm }: MieCoefficients,
  kr: number,
  versine: number,
  out: Float64Array,
): void {
  const v = versine <= 1 ? versine : 2 - versine;
  const flip = versine <= 1 ? 1 : -1;
  let difference = 1;
  let pi = 1;
  let sign = 1;
  let beforeRe = 1;
  let beforeIm = 0;
  let pRe = 1;
  let pIm = 1 / kr;
  out.fill(0, 0, FIELD_NUMBERS);
  for (let n = 1; n <= order; n++) {
    const i = n - 1;
    const square = n * (n + 1);
    const c = (2 * n + 1) / square;
    const cPi = c * pi;
    const p = sign * cPi;
    sign *= flip;
    const t = sign * c * (square * difference - (1 + n * v) * pi);
    const qRe = beforeRe - (n / kr) * pIm;
    const qIm = beforeIm + (n / kr) * pRe;

    const apRe = aRe[i] * pRe - aIm[i] * pIm;
    const apIm = aRe[i] * pIm + aIm[i] * pRe;
    const aqRe = aRe[i] * qRe - aIm[i] * qIm;
    const aqIm = aRe[i] * qIm + aIm[i] * qRe;
    const bpRe = bRe[i] * pRe - bIm[i] * pIm;
    const bpIm = bRe[i] * pIm + bIm[i] * pRe;
    const bqRe = bRe[i] * qRe - bIm[i] * qIm;
    const bqIm = bRe[i] * qIm + bIm[i] * qRe;
    out[0] += aqRe * t + bpRe * p;
    out[1] += aqIm * t + bpIm * p;
    out[2] += aqRe * p + bpRe * t;
    out[3] += aqIm * p + bpIm * t;
    out[4] += square * p * apRe;
    out[5] += square * p * apIm;
    out[6] += bqRe * t + apRe * p;
    out[7] += bqIm * t + apIm * p;
    out[8] += bqRe * p + apRe * t;
    out[9] += bqIm * p + apIm * t;
    out[10] += square * p * bpRe;
    out[11] += square * p * bpIm;

    difference -= v * cPi;
    pi += (n + 1) * difference;
    const nextRe = beforeRe - ((2 * n + 1) / kr) * pIm;
    const nextIm = beforeIm + ((2 * n + 1) / kr) * pRe;
    beforeRe = pRe;
    beforeIm = pIm;
    pRe = nextRe;
    pIm = nextIm;
  }
  const radial = Math.sqrt(v * (2 - v)) / kr;
  timesMinusI(out, 4, radial);
  timesMinusI(out, 10, radial);
}

function timesMinusI(values: Float64Array, at: number, factor: number): void {
  const re = values[at];
  values[at] = factor * values[at + 1];
  values[at + 1] = -factor * re;
}
