import { FIELD_NUMBERS } from '../optics/scatteredField.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { fitAmplitudes } from '../optics/sphereAmplitudes.ts';
import { checkDistance, PLANE_NUMBERS, planeFields } from './exactFluxDensity.ts';

/**
 * Amplitudes that, put into the far-zone form, give the crossed flux of the exact fields on a plane at this distance.
 *
 * On the plane 1/(kr) = cosθ/(kz), so what the incident wave interferes with, Ex + Hy, is a function of cosθ alone, as it
 * is in the far zone: S2 = (Ex + Hy)/(1 + cosθ) at azimuth 0° and S1 the same at 90° (see `exactFluxDensity`). The
 * scattered flux |S|² cosθ/(kr)² is then off by about 1/(kr) of itself, which is nothing beside the extinction.
 *
 * @param sphere solved by its coefficients
 * @param distanceM from the sphere's centre to the detector plane, metres
 * @throws RimwrightError `input` for a plane that cuts the sphere
 */
export function nearAmplitudes(sphere: SphereAmplitudes, distanceM: number): SphereAmplitudes {
  const { coefficients, wavenumber, cosLimit } = sphere;
  // Amplitudes from elsewhere are known in the far zone alone.
  if (coefficients === undefined) return sphere;
  checkDistance(coefficients, wavenumber, distanceM);
  const field = new Float64Array(FIELD_NUMBERS);
  const plane = new Float64Array(PLANE_NUMBERS);
  const sample = (cosTheta: number, out: Float64Array) => {
    planeFields(coefficients, wavenumber * distanceM, 1 - cosTheta, field, plane);
    for (let j = 0; j < 2; j++) {
      out[j] = (plane[4 + j] + plane[6 + j]) / (1 + cosTheta);
      out[2 + j] = (plane[j] + plane[2 + j]) / (1 + cosTheta);
    }
  };
  return { ...sphere, ...fitAmplitudes(sample, cosLimit, coefficients) };
}
