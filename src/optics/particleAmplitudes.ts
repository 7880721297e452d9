import type { IndexModel } from './indexModel.ts';
import { refractiveIndex } from './indexModel.ts';
import type { Particle } from './particle.ts';
import { isTabled } from './particle.ts';
import type { SphereAmplitudes } from './sphereAmplitudes.ts';
import { sphereAmplitudes } from './sphereAmplitudes.ts';
import { tableAmplitudes } from './tableAmplitudes.ts';

/**
 * How a particle of any kind scatters light of one colour into a forward cone. A table serves every colour alike: it is meant
 * for light that strays little from the wavelength that it was computed for.
 *
 * @param vacuumWavelengthM metres
 * @param halfAngle of the cone, radians, above 0 and below π/2
 * @throws RimwrightError as `sphereAmplitudes` or `tableAmplitudes`
 */
export function particleAmplitudes(
  particle: Particle,
  medium: IndexModel,
  vacuumWavelengthM: number,
  halfAngle: number,
): SphereAmplitudes {
  if (!isTabled(particle)) return sphereAmplitudes(particle, medium, vacuumWavelengthM, halfAngle);
  const wavenumber = (2 * Math.PI * refractiveIndex(medium, vacuumWavelengthM)[0]) / vacuumWavelengthM;
  return tableAmplitudes(particle.amplitudes, wavenumber, halfAngle, particle.material);
}
