/** The beam before the particle. */
export interface Light {
  /** Vacuum wavelength, metres. */
  wavelengthM: number;
  /** Full width at half maximum of the Gaussian line, metres of vacuum wavelength; 0 for a single colour. */
  linewidthM: number;
  /** The wavelength may be off by this much either way, metres. */
  driftM: number;
  /** Angle of the electric field from the x axis, radians; null for unpolarised light. */
  polarizationRad: number | null;
  /** Irradiance at the particle, W/m². */
  irradianceWm2: number;
  /** Relative intensity noise, 1/Hz (10^(dB/10)); 0 for none. */
  intensityNoisePerHz: number;
}
