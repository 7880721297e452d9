import { describe, expect, it } from 'vitest';
import { presetsFolder } from '../../src/base/presetsFolder.ts';
import { cauchy } from '../../src/optics/cauchy.ts';
import { loadIndexModel } from '../../src/optics/shelf.ts';
import reference from '../reference/refractive-index.json' with { type: 'json' };

describe('cauchy', () => {
  const spheres = loadIndexModel('materials', 'polystyrene-microspheres', presetsFolder());
  if (spheres.formula !== 'cauchy') throw new Error('polystyrene-microspheres is no Cauchy formula');

  it.each(reference.polystyrene)(
    'gives microspheres $microspheresMa2003 at $wavelengthNm nm (Ma 2003)',
    (row) => {
      expect(Math.abs(cauchy(spheres, row.wavelengthNm * 1e-9) - row.microspheresMa2003)).toBeLessThan(1e-9);
    },
  );

  it('gives 1.58243 at 632.8 nm: Ma (2003), Physics in Medicine and Biology 48, 4165', () => {
    expect(cauchy(spheres, 632.8e-9)).toBeCloseTo(1.58243, 5);
  });

  it('gives an index that was measured in air as relative to vacuum', () => {
    const measured = cauchy({ ...spheres, wavelengthIn: 'air', relativeTo: 'air' }, 632.8e-9);
    expect(measured - cauchy(spheres, 632.8e-9)).toBeCloseTo(1.58243 * 2.72e-4, 4);
  });
});
