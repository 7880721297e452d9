import type { Distribution } from './distribution.ts';
import type { Uncertainties } from './uncertainties.ts';
import type { BudgetInput, Model } from './uncertaintyBudget.ts';

/** How a reading changes with one of the instrument's settings, to second order and relative to the reading. */
export interface Response {
  /** The setting's value, metres. */
  atM: number;
  /** Per metre. */
  slope: number;
  /** Per square metre. */
  curvature: number;
}

/** A gain with what is known of it. */
export interface Gain {
  value: number;
  standardUncertainty: number;
  /** Of that; infinite where it is not from readings. */
  degreesOfFreedom: number;
  /**
   * Whether it was found with this very instrument: then the scale of powers, the irradiance, the distance and the wavelength
   * are part of it, and are not counted again.
   */
  isFitted: boolean;
}

/** An instrument that turns two powers into an extinction. */
export interface Instrument {
  irradianceWm2: number;
  responsivityAW: number;
  /** Power noise of one reading, W²/Hz (one-sided): its bandwidth is half of one over the averaging time. */
  noiseW2Hz: number;
  gain: Gain;
  /** The design's correction over the brief: what it reads of a particle it does not know, about gain · extinction. */
  correction: Distribution;
  distance: Response;
  wavelength: Response;
  uncertainties: Uncertainties;
}

/** Two powers, W, each averaged over the same time. */
export interface PowerPair {
  withoutW: number;
  withW: number;
  averagingS: number;
}

/** The inputs of the model, by their places in its list of values. */
const PLACE = {
  without: 0,
  with: 1,
  lightDrift: 2,
  linearity: 3,
  responsivity: 4,
  irradiance: 5,
  gain: 6,
  distance: 7,
  wavelength: 8,
  correction: 9,
} as const;

/** Unit of each input, for tables. */
export const INPUT_UNITS: readonly string[] = ['W', 'W', '', '', 'A/W', 'W/m²', '', 'm', 'm', ''];

/** Standard deviation of one averaged power, W. */
export function powerNoise({ noiseW2Hz }: Pick<Instrument, 'noiseW2Hz'>, averagingS: number): number {
  return Math.sqrt(noiseW2Hz / (2 * averagingS));
}

/**
 * The measured extinction cross-section, m²:
 *
 *   C = (P₀ − P₁ + P₀ d)(1 + l)(ℛ₀/ℛ) / (E g (1 + c) m_z m_λ),
 *
 * P₀ and P₁ without and with the particle, d the light's drift from one to the other, l what the detector is off a straight line,
 * ℛ its responsivity (ℛ₀ as the powers were computed with), E the irradiance, g the gain, c the correction of this particle at
 * this place, m_z and m_λ what distance and wavelength do to the reading.
 */
export function extinctionModel({ responsivityAW, distance, wavelength }: Instrument): Model {
  const change = ({ atM, slope, curvature }: Response, valueM: number) =>
    1 + (valueM - atM) * (slope + (curvature * (valueM - atM)) / 2);
  return (v) => {
    const power = v[PLACE.without] - v[PLACE.with] + v[PLACE.without] * v[PLACE.lightDrift];
    const scale = ((1 + v[PLACE.linearity]) * responsivityAW) / v[PLACE.responsivity];
    const settings = change(distance, v[PLACE.distance]) * change(wavelength, v[PLACE.wavelength]);
    const gain = v[PLACE.gain] * (1 + v[PLACE.correction]) * settings;
    return (power * scale) / (v[PLACE.irradiance] * gain);
  };
}

/** The inputs of `extinctionModel` for one pair of powers. Those that a fitted gain has taken in are exact. */
export function extinctionInputs(
  instrument: Instrument,
  { withoutW, withW, averagingS }: PowerPair,
): BudgetInput[] {
  const { irradianceWm2, responsivityAW, gain, correction, distance, wavelength, uncertainties } = instrument;
  const noise = powerNoise(instrument, averagingS);
  const apart = gain.isFitted ? 0 : 1;
  const normal = (mean: number, deviation: number): Distribution => ({ kind: 'normal', mean, deviation });
  const within = (half: number): Distribution => ({ kind: 'rectangular', mean: 0, half });
  return [
    { name: 'power without', distribution: normal(withoutW, noise) },
    { name: 'power with', distribution: normal(withW, noise) },
    { name: 'light drift', distribution: within(uncertainties.lightDrift) },
    { name: 'nonlinearity', distribution: within(apart * uncertainties.nonlinearity) },
    {
      name: 'responsivity',
      distribution: normal(responsivityAW, apart * uncertainties.responsivity * responsivityAW),
    },
    {
      name: 'irradiance',
      distribution: normal(irradianceWm2, apart * uncertainties.irradiance * irradianceWm2),
    },
    {
      name: 'gain',
      distribution: normal(gain.value, gain.standardUncertainty),
      degreesOfFreedom: gain.degreesOfFreedom,
    },
    { name: 'distance', distribution: normal(distance.atM, apart * uncertainties.distanceM) },
    { name: 'wavelength', distribution: normal(wavelength.atM, apart * uncertainties.wavelengthM) },
    { name: 'correction', distribution: correction },
  ];
}
