/** The state to which both values belong: Kim et al. (2005), ISO 15900. */
const REFERENCE_K = 296.15;
const REFERENCE_PA = 101_325;
const REFERENCE_VISCOSITY_PAS = 1.832_45e-5;
const REFERENCE_FREE_PATH_M = 67.3e-9;
/** Sutherland's constant of air. */
const SUTHERLAND_K = 110.4;

/**
 * Viscosity of air, Pa s: Sutherland (1893), Philosophical Magazine 36, 507, from the value of Kim, Mulholland, Kukuck & Pui
 * (2005), J. Res. NIST 110, 31. It does not depend on the pressure.
 *
 * @param temperatureK kelvin, 200 to 600
 */
export function airViscosity(temperatureK: number): number {
  return REFERENCE_VISCOSITY_PAS * (temperatureK / REFERENCE_K) ** 1.5 * sutherlandRatio(temperatureK);
}

/**
 * Mean free path of air's molecules, metres: Willeke (1976), J. Aerosol Sci. 7, 381, eq. (4), from the value of Kim et al. (2005).
 *
 * @param temperatureK kelvin, 200 to 600
 * @param pressurePa pascals, above 0
 */
export function airMeanFreePath(temperatureK: number, pressurePa: number): number {
  const density = (temperatureK / REFERENCE_K) ** 2 * (REFERENCE_PA / pressurePa);
  return REFERENCE_FREE_PATH_M * density * sutherlandRatio(temperatureK);
}

function sutherlandRatio(temperatureK: number): number {
  return (REFERENCE_K + SUTHERLAND_K) / (temperatureK + SUTHERLAND_K);
}
