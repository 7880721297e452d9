import type { CatalogueConvention } from './catalogueAir.ts';
import { fromCatalogue } from './catalogueAir.ts';

/** n = a₀ + a₁/L² + a₂/L⁴ + …, with L in µm; transparent (k = 0). */
export interface Cauchy extends CatalogueConvention {
  formula: 'cauchy';
  /** Vacuum wavelengths, metres. */
  rangeM: [min: number, max: number];
  /** a₀, a₁ (µm²), a₂ (µm⁴), … */
  a: number[];
}

/** Refractive index relative to vacuum, by the formula of Cauchy (1836), Mémoire sur la dispersion de la lumière. */
export function cauchy(liquid: Cauchy, vacuumWavelengthM: number): number {
  return fromCatalogue(liquid, vacuumWavelengthM, (wavelengthM) => {
    const s = (wavelengthM * 1e6) ** -2;
    return liquid.a.reduceRight((sum, a) => sum * s + a, 0);
  });
}
