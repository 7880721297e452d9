import { airRefractivity } from './ciddorAir.ts';

/** Glass and crystals are measured in air, and most catalogues leave both their numbers as they were measured. */
export interface CatalogueConvention {
  /** Where the formula's wavelength is measured. */
  wavelengthIn: 'vacuum' | 'air';
  /** What the formula's index is relative to. */
  relativeTo: 'vacuum' | 'air';
}

// Catalogues say "air at 20 °C" or "at 22 °C"; humidity and such differences change an index by less than 3e-6.
const STATE = { temperatureK: 293.15, pressurePa: 101325, vapourFraction: 0, co2Ppm: 450 };

/** Index of the air in which catalogues measure: dry, 20 °C, 101 325 Pa (Ciddor 1996; beyond 1.7 µm it hardly changes). */
export function catalogueAir(vacuumWavelengthM: number): number {
  return 1 + airRefractivity(STATE, vacuumWavelengthM);
}

/**
 * Evaluates a catalogue's formula at a vacuum wavelength and gives its index relative to vacuum.
 *
 * @param formula the index as the catalogue means it, from the wavelength (metres) as the catalogue means it
 */
export function fromCatalogue(
  { wavelengthIn, relativeTo }: CatalogueConvention,
  vacuumWavelengthM: number,
  formula: (wavelengthM: number) => number,
): number {
  const air = catalogueAir(vacuumWavelengthM);
  const index = formula(wavelengthIn === 'air' ? vacuumWavelengthM / air : vacuumWavelengthM);
  return relativeTo === 'air' ? index * air : index;
}
