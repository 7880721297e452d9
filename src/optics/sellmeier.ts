import type { CatalogueConvention } from './catalogueAir.ts';
import { fromCatalogue } from './catalogueAir.ts';

/** n² − 1 = Σ b L²/(L² − c), with L in µm; transparent (k = 0). A term with c = 0 is a constant. */
export interface Sellmeier extends CatalogueConvention {
  formula: 'sellmeier';
  /** Vacuum wavelengths, metres. */
  rangeM: [min: number, max: number];
  /** Strength of each resonance. */
  b: number[];
  /** Squared wavelength of each resonance, µm², as catalogues print it. */
  cUm2: number[];
}

/** Refractive index relative to vacuum, by the formula of Sellmeier (1871), Annalen der Physik 219, 272. */
export function sellmeier(glass: Sellmeier, vacuumWavelengthM: number): number {
  return fromCatalogue(glass, vacuumWavelengthM, (wavelengthM) => {
    const l2 = (wavelengthM * 1e6) ** 2;
    return Math.sqrt(glass.b.reduce((sum, b, i) => sum + (b * l2) / (l2 - glass.cUm2[i]), 1));
  });
}
