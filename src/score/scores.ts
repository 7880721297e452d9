/** What a design costs and how true it reads: the `scores` of a design in every result. */
export interface Scores {
  gain: number;
  /**
   * Relative to gain · extinction, over every particle, wavelength and position of the brief. `population`, of a brief with
   * distributions of sizes alone: the mean over a whole distribution, at the worst wavelength and position.
   */
  correction: { worst: number; rms: number; population?: number };
  lobe: { ratio: number };
  snr: { required: number; time_s: number };
  area_m2: number;
  radius_m: number;
  areaOverFloor: number;
}
