import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { catalogueAir } from '../../src/optics/catalogueAir.ts';
import type { Sellmeier } from '../../src/optics/sellmeier.ts';
import { sellmeier } from '../../src/optics/sellmeier.ts';
import { loadIndexModel } from '../../src/optics/shelf.ts';
import reference from '../reference/refractive-index.json' with { type: 'json' };

function fromShelf(name: string): Sellmeier {
  const model = loadIndexModel('materials', name, presetsFolder());
  if (model.formula !== 'sellmeier') throw new Error(`${name} is no Sellmeier formula`);
  return model;
}

/** The index relative to air at a wavelength in air (µm): what catalogues print. */
function asInCatalogues(glass: Sellmeier, airWavelengthUm: number): number {
  let vacuumWavelengthM = airWavelengthUm * 1e-6;
  for (let k = 0; k < 4; k++) vacuumWavelengthM = airWavelengthUm * 1e-6 * catalogueAir(vacuumWavelengthM);
  return sellmeier(glass, vacuumWavelengthM) / catalogueAir(vacuumWavelengthM);
}

describe('sellmeier', () => {
  const silica = fromShelf('fused-silica');
  const crown = fromShelf('crown-glass-bk7');
  const polystyrene = fromShelf('polystyrene');

  it.each(reference.fusedSilica)('gives fused silica $n at $airWavelengthUm µm in air: $source', (row) => {
    const n = asInCatalogues(silica, row.airWavelengthUm);
    expect(Math.abs(n - row.n)).toBeLessThan(1e-11);
    if (row.published !== undefined) expect(Math.abs(n - row.published)).toBeLessThan(0.5e-5);
  });

  it.each(reference.crownGlass)('gives crown glass $n at the $line line: $source', (row) => {
    const n = asInCatalogues(crown, row.airWavelengthUm);
    expect(Math.abs(n - row.recomputed)).toBeLessThan(1e-11);
    expect(Math.abs(n - row.n)).toBeLessThan(0.5e-5);
  });

  it.each(reference.polystyrene)('gives polystyrene $n at $wavelengthNm nm: $source', (row) => {
    const n = sellmeier(polystyrene, row.wavelengthNm * 1e-9);
    expect(Math.abs(n - row.sellmeierFit)).toBeLessThan(1e-9);
    expect(Math.abs(n - row.n)).toBeLessThan(8e-4);
  });

  it('gives indices relative to vacuum, which exceed those relative to air by the air’s share', () => {
    const inAir = asInCatalogues(silica, 0.587561);
    const wavelengthM = 0.587561e-6 * catalogueAir(0.5877e-6);
    expect(sellmeier(silica, wavelengthM) - inAir).toBeCloseTo(inAir * 2.724e-4, 6);
    // Where the wavelength is measured matters less: 0.16 nm here.
    const asVacuum = sellmeier({ ...silica, wavelengthIn: 'vacuum' }, wavelengthM);
    expect(asVacuum - sellmeier(silica, wavelengthM)).toBeLessThan(-4e-6);
    expect(asVacuum - sellmeier(silica, wavelengthM)).toBeGreaterThan(-8e-6);
  });
});
