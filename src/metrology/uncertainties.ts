/** What is known of an instrument beside its design: standard uncertainties and limits, relative where no unit is named. */
export interface Uncertainties {
  /** How long each of the two readings, without and with the particle, is averaged, seconds. */
  averagingS: number;
  /** Standard uncertainties of the irradiance at the particle, the detector's responsivity, and the gain. */
  irradiance: number;
  responsivity: number;
  gain: number;
  /** Limits, either way: how far the light's power may be off between the two readings, and the detector from a straight line. */
  lightDrift: number;
  nonlinearity: number;
  /** Standard uncertainties of the distance from particle to detector and of the wavelength in vacuum, metres. */
  distanceM: number;
  wavelengthM: number;
}
