/** An index given at some wavelengths, and linear in the wavelength between them. */
export interface TabulatedIndex {
  formula: 'tabulated';
  /** Vacuum wavelengths, metres: the table's ends. */
  rangeM: [min: number, max: number];
  /** Vacuum wavelengths, metres, ascending, two or more. */
  wavelengthM: number[];
  /** Index relative to vacuum, at each wavelength. */
  n: number[];
  /** Absorption index (0 or more), at each wavelength. */
  k: number[];
}

/** Refractive index relative to vacuum as [n, k]; beyond the table's ends it keeps the end's value. */
export function tabulatedIndex(
  { wavelengthM, n, k }: TabulatedIndex,
  vacuumWavelengthM: number,
): [n: number, k: number] {
  const above = wavelengthM.findIndex((w) => w > vacuumWavelengthM);
  const j = above === -1 ? wavelengthM.length - 1 : Math.max(1, above);
  const width = wavelengthM[j] - wavelengthM[j - 1];
  const t = Math.min(1, Math.max(0, (vacuumWavelengthM - wavelengthM[j - 1]) / width));
  return [n[j - 1] + t * (n[j] - n[j - 1]), k[j - 1] + t * (k[j] - k[j - 1])];
}
