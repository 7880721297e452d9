import { saturationVapourPressure } from './saturationVapourPressure.ts';

/** Moist air of a given state, by Ciddor's equations. */
export interface CiddorAir {
  formula: 'ciddor';
  /** Vacuum wavelengths, metres: within 300 nm to 1700 nm. */
  rangeM: [min: number, max: number];
  /** Kelvin, 233.15 to 373.15. */
  temperatureK: number;
  /** Total pressure, pascals, 10 kPa to 140 kPa. */
  pressurePa: number;
  /** Over water (over ice below 0 °C), 0 to 1. */
  relativeHumidity: number;
  /** Mole fraction of carbon dioxide, parts per million, 0 to 2000. */
  co2Ppm: number;
}

/** Air as Ciddor's equations take it: the vapour as a mole fraction. */
export interface AirState {
  temperatureK: number;
  pressurePa: number;
  /** Moles of water vapour in a mole of moist air, 0 to 1. */
  vapourFraction: number;
  co2Ppm: number;
}

const GAS_CONSTANT = 8.31451; // J/(mol K); cancels between a density and its standard, so that its last digits do not matter
const VAPOUR_MOLAR_MASS = 0.018015; // kg/mol, Ciddor (1996), appendix B
const ZERO_CELSIUS_K = 273.15;

/** Refractive index of moist air, relative to vacuum. Source: see `airRefractivity` and `vapourFraction`. */
export function ciddorAir(air: CiddorAir, vacuumWavelengthM: number): number {
  return 1 + airRefractivity({ ...air, vapourFraction: vapourFraction(air) }, vacuumWavelengthM);
}

/**
 * n − 1 of moist air: P. E. Ciddor, "Refractive index of air: new equations for the visible and near infrared",
 * Applied Optics 35, 1566 (1996), eqs. (1) to (5) and appendices A and B.
 *
 * @param vacuumWavelengthM metres, 300 nm to 1700 nm
 */
export function airRefractivity(state: AirState, vacuumWavelengthM: number): number {
  const { temperatureK, pressurePa, vapourFraction: xv, co2Ppm } = state;
  const s = (1e-6 / vacuumWavelengthM) ** 2; // squared wave number, 1/µm²

  // Eqs. (1) and (2): dry air at 15 °C and 101 325 Pa, for 450 ppm and then for its own carbon dioxide.
  const standardAir = 1e-8 * (5792105 / (238.0185 - s) + 167917 / (57.362 - s));
  const dryAir = standardAir * (1 + 0.534e-6 * (co2Ppm - 450));
  // Eq. (3): water vapour at 20 °C and 1333 Pa.
  const vapour = 1.022e-8 * (295.235 + s * (2.6422 + s * (-0.03238 + s * 0.004028)));

  // Appendix B: molar mass of dry air, kg/mol.
  const airMolarMass = 1e-3 * (28.9635 + 12.011e-6 * (co2Ppm - 400));
  const moles = molarDensity(temperatureK, pressurePa, xv);
  const airDensity = (1 - xv) * moles * airMolarMass;
  const vapourDensity = xv * moles * VAPOUR_MOLAR_MASS;
  const standardAirDensity = molarDensity(288.15, 101325, 0) * airMolarMass;
  const standardVapourDensity = molarDensity(293.15, 1333, 1) * VAPOUR_MOLAR_MASS;

  // Eq. (5).
  return (airDensity / standardAirDensity) * dryAir + (vapourDensity / standardVapourDensity) * vapour;
}

/** Mole fraction of vapour from relative humidity: Ciddor (1996), appendix A, step 2 (enhancement factor f). */
function vapourFraction({ temperatureK, pressurePa, relativeHumidity }: CiddorAir): number {
  const f = vapourEnhancement(temperatureK, pressurePa);
  return (relativeHumidity * f * saturationVapourPressure(temperatureK)) / pressurePa;
}

/** How much more vapour air holds than a vacuum does: Giacomo (1982), Metrologia 18, 33, as in Ciddor (1996), appendix A. */
export function vapourEnhancement(temperatureK: number, pressurePa: number): number {
  return 1.00062 + 3.14e-8 * pressurePa + 5.6e-7 * (temperatureK - ZERO_CELSIUS_K) ** 2;
}

/** mol/m³ of moist air, with the compressibility of Ciddor (1996), eq. (12), after Davis (1992), Metrologia 29, 67. */
function molarDensity(temperatureK: number, pressurePa: number, xv: number): number {
  const t = temperatureK - ZERO_CELSIUS_K;
  const ratio = pressurePa / temperatureK;
  const second =
    1.58123e-6 +
    t * (-2.9331e-8 + t * 1.1043e-10) +
    xv * (5.707e-6 - 2.051e-8 * t) +
    xv * xv * (1.9898e-4 - 2.376e-6 * t);
  const compressibility = 1 - ratio * second + ratio * ratio * (1.83e-11 - 0.765e-8 * xv * xv);
  return ratio / (compressibility * GAS_CONSTANT);
}
