import type { BuildPlan } from './buildPlan.ts';

/** Whether every build is calibrated for itself, or keeps the gain that its drawing was given. */
export type BuildGain = 'nominal' | 'recalibrated';

/** Judges builds by their readings: how far the worst strays from gain · extinction. */
export class BuildJudge {
  /** Readings of each build: places of each depth of each light. */
  readonly #perLight: number;
  readonly #calibrating: number;
  readonly #gain: number;
  /** Mean reading/extinction of what the bench calibrates with, in the drawing; null for a gain that stays. */
  readonly #reference: number | null;
  /** Smallest extinction over each light's: noise of one size in area counts for less in a large particle. */
  readonly #shares: readonly number[];

  /**
   * @param gain of the drawing
   * @param drawing its readings, as those of a build
   * @param extinctionsM2 of each light's particle in the drawing
   */
  constructor(
    { depthsM, places, calibrating }: BuildPlan,
    gain: number,
    gainIs: BuildGain,
    drawing: Float64Array,
    extinctionsM2: readonly number[],
  ) {
    this.#perLight = (depthsM.length * places.length) / 2;
    this.#calibrating = calibrating;
    this.#gain = gain;
    this.#reference = gainIs === 'nominal' ? null : this.reference(drawing);
    const least = Math.min(...extinctionsM2);
    this.#shares = extinctionsM2.map((extinction) => least / extinction);
  }

  /** Mean reading/extinction of the brief's particles in its light, each on the axis at the nominal depth. */
  reference(ratios: Float64Array): number {
    let sum = 0;
    for (let light = 0; light < this.#calibrating; light++) sum += ratios[light * this.#perLight];
    return sum / this.#calibrating;
  }

  /** Gain of a build whose `reference` is that. */
  gainOf(reference: number): number {
    return this.#reference === null ? this.#gain : (this.#gain * reference) / this.#reference;
  }

  /** What a noise of 1 (see `noiseOf`) adds to the ratio of a reading. */
  noiseShare(reading: number): number {
    return this.#gain * this.#shares[Math.floor(reading / this.#perLight)];
  }

  /** Least and most ratio/gain − 1 of a build in full, and where. */
  extremes(ratios: Float64Array, noise: number): { least: number; most: number; at: [number, number] } {
    const gain = this.gainOf(this.reference(ratios));
    const at: [number, number] = [0, 0];
    let [least, most] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (let light = 0, i = 0; i < ratios.length; light++) {
      const added = noise * this.#gain * this.#shares[light];
      for (const end = i + this.#perLight; i < end; i++) {
        const correction = (ratios[i] + added) / gain - 1;
        if (correction < least) [least, at[0]] = [correction, i];
        if (correction > most) [most, at[1]] = [correction, i];
      }
    }
    return { least, most, at };
  }

  /** Worst |ratio/gain − 1| of a build in full. */
  worst(ratios: Float64Array, noise: number): number {
    const { least, most } = this.extremes(ratios, noise);
    return Math.max(-least, most);
  }
}
