/** Water or steam of a given temperature and density, by the IAPWS release R9-97. */
export interface IapwsWater {
  formula: 'iapws-r9-97';
  /** Vacuum wavelengths, metres: within 200 nm to 1100 nm. */
  rangeM: [min: number, max: number];
  /** Kelvin, 261.15 to 773.15. */
  temperatureK: number;
  /** kg/m³, above 0 to 1060. */
  densityKgM3: number;
}

const ULTRAVIOLET_RESONANCE = 0.229202; // over 589 nm
const INFRARED_RESONANCE = 5.432937;

/**
 * Refractive index of water substance, relative to vacuum.
 *
 * Source: IAPWS R9-97 (1997), eq. (1) and table 1, after Harvey, Gallagher & Levelt Sengers (1998),
 * J. Phys. Chem. Ref. Data 27, 761.
 *
 * @param vacuumWavelengthM metres, 200 nm to 1100 nm
 */
export function iapwsWater({ temperatureK, densityKgM3 }: IapwsWater, vacuumWavelengthM: number): number {
  const rho = densityKgM3 / 1000;
  const t = temperatureK / 273.15;
  const l2 = (vacuumWavelengthM / 0.589e-6) ** 2;
  const specific =
    0.244257733 +
    9.74634476e-3 * rho -
    3.73234996e-3 * t +
    2.68678472e-4 * l2 * t +
    1.5892057e-3 / l2 +
    2.45934259e-3 / (l2 - ULTRAVIOLET_RESONANCE ** 2) +
    0.90070492 / (l2 - INFRARED_RESONANCE ** 2) -
    1.66626219e-2 * rho * rho;
  const refraction = rho * specific; // (n² − 1)/(n² + 2)
  return Math.sqrt((1 + 2 * refraction) / (1 - refraction));
}
