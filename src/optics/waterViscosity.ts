/** a_i (µPa s) and b_i. */
const TERMS = [
  [280.68, -1.9],
  [511.45, -7.7],
  [61.131, -19.6],
  [0.459_03, -40],
] as const;

/**
 * Viscosity of liquid water at 0.1 MPa, Pa s: Σ a_i (T/300 K)^b_i, IAPWS SR6-08 (2008), after Pátek, Hrubý, Klomfar,
 * Součková & Harvey (2009), J. Phys. Chem. Ref. Data 38, 21. At 20 and 25 °C within 4e-5 of IAPWS R12-08.
 *
 * @param temperatureK kelvin, 253.15 to 383.15 (supercooled and superheated at the ends)
 */
export function waterViscosity(temperatureK: number): number {
  const ratio = temperatureK / 300;
  return 1e-6 * TERMS.reduce((sum, [a, b]) => sum + a * ratio ** b, 0);
}
