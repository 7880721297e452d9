/** What a design costs and how true it reads: the `scores` of a design in every result. */
export interface Scores {
  gain: number;
  /**
   * Relative to gain · extinction, over every particle, wavelength and position of the brief. `population`, of a brief with
   * distributions of sizes alone: the mean over a whole distribution, at the worst wavelength and position. `certified`, of
   * finished designs: the worst that climbing finds anywhere between the samples, never below `worst`.
   */
  correction: { worst: number; rms: number; population?: number } & Partial<Certificate>;
  lobe: { ratio: number };
  snr: { required: number; time_s: number };
  area_m2: number;
  /** Σ |weight| · share · area of elements that do not simply count once: what `cost` counts. */
  weightedArea_m2?: number;
  radius_m: number;
  areaOverFloor: number;
  /**
   * Proven by linear programming, for designs of a search: no mask at that distance, of that gain and that worst correction, has less
   * `areaOverFloor`. Left out where it was not asked for, or a direction of the light or of flights asks for more than it can do.
   */
  leastAreaOverFloor?: number;
}

/** The worst correction of a design that a local maximisation finds (see `WorstCases`), and where. */
export interface Certificate {
  certified: number;
  certifiedAt: {
    diameter_m: number;
    material: string;
    wavelength_m: number;
    depth_m: number;
    position_m: readonly [x: number, y: number];
  };
}

/** The worst correction of a design as far as it is known: certified where it was, else over the samples. */
export function worstOf({ correction }: Pick<Scores, 'correction'>): number {
  return correction.certified ?? correction.worst;
}
