/** Elementary charge, C (SI 2019, exact). */
const ELEMENTARY_CHARGE = 1.602176634e-19;

/** Light and circuits, as far as noise hangs on them. */
export interface Electronics {
  responsivityAW: number;
  irradianceWm2: number;
  noiseCurrentA: number;
  intensityNoisePerHz: number;
  /** What a difference of two equal currents keeps of them, as a part of one: 10^(−dB/20) of the common-mode rejection; 0 if left out. */
  commonModeLeak?: number;
}

/** The noise of several elements whose currents are weighted and added. */
export interface NoisePower {
  /** 2ei + i_n² of each element, A²/Hz: what an element has for itself. */
  separate: Float64Array;
  /** i of each element, A. */
  currents: Float64Array;
  /** Relative intensity noise, 1/Hz: common to all elements. */
  commonPerHz: number;
  leak: number;
}

/** @param areasM2 of the elements, m²: of the flat wave that would bring each as much light */
export function noiseOf(areasM2: ArrayLike<number>, electronics: Electronics): NoisePower {
  const perArea = electronics.responsivityAW * electronics.irradianceWm2;
  const currents = Float64Array.from(areasM2, (areaM2) => perArea * areaM2);
  return {
    separate: currents.map((current) => 2 * ELEMENTARY_CHARGE * current + electronics.noiseCurrentA ** 2),
    currents,
    commonPerHz: electronics.intensityNoisePerHz,
    leak: electronics.commonModeLeak ?? 0,
  };
}

/**
 * Noise of the weighted sum, A²/Hz: Σ w² (2ei + i_n²) + RIN [(P − M)² + r² P M].
 *
 * P and M are the sums of |w| i over weights above and below 0. The light's intensity noise is common to all elements, so a
 * difference loses it where P = M; of two equal currents the circuit leaves the part r. Without a limit r is 0, and with weights of
 * one sign it does not count.
 */
export function noisePower(
  { separate, currents, commonPerHz, leak }: NoisePower,
  weights: ArrayLike<number>,
): number {
  let own = 0;
  let plus = 0;
  let minus = 0;
  for (let j = 0; j < currents.length; j++) {
    own += weights[j] * weights[j] * separate[j];
    if (weights[j] > 0) plus += weights[j] * currents[j];
    else minus -= weights[j] * currents[j];
  }
  const common = plus - minus;
  return own + commonPerHz * common * common + commonPerHz * leak * leak * plus * minus;
}

/**
 * The symmetric n × n matrix Q with wᵀQw = `noisePower` for weights of these signs; for others it is less. With
 * 4PM = (P + M)² − (P − M)² the common part is (1 − r²/4)(Σ w i)² + (r²/4)(Σ |w| i)², and |w| ≥ ±w.
 */
export function noiseQuadratic(noise: NoisePower, signs: readonly number[]): Float64Array {
  const { separate, currents, commonPerHz, leak } = noise;
  const n = currents.length;
  const part = (leak * leak) / 4;
  const matrix = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const share = 1 - part + part * signs[i] * signs[j];
      matrix[i * n + j] = commonPerHz * share * currents[i] * currents[j] + (i === j ? separate[i] : 0);
    }
  }
  return matrix;
}
