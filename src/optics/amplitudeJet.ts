import { chebyshevSlope } from '../numeric/chebyshevSlope.ts';
import type { Complex } from '../numeric/complex.ts';
import type { SphereAmplitudes } from './sphereAmplitudes.ts';
import { amplitudesAt, amplitudesBeside } from './sphereAmplitudes.ts';

/** The amplitudes of a sphere, and their first and second derivatives by cosθ in the same form. */
export type AmplitudeJet = readonly [SphereAmplitudes, SphereAmplitudes, SphereAmplitudes];

/** Numbers that `jetAt` writes. */
export const JET_NUMBERS = 12;

export function amplitudeJet(sphere: SphereAmplitudes): AmplitudeJet {
  const slope = slopeOf(sphere);
  return [sphere, slope, slopeOf(slope)];
}

function slopeOf(sphere: SphereAmplitudes): SphereAmplitudes {
  const { series, terms, cosLimit } = sphere;
  return { ...sphere, series: chebyshevSlope(series, 4, terms, (1 - cosLimit) / 2) };
}

/** S1re, S1im, S2re, S2im at a real or complex cosθ, then their first and their second derivatives. */
export function jetAt(jet: AmplitudeJet, [re, im]: Complex, out: Float64Array): void {
  for (let i = 0; i < 3; i++) {
    const four = out.subarray(4 * i, 4 * i + 4);
    if (im === 0) amplitudesAt(jet[i], re, four);
    else amplitudesBeside(jet[i], re, im, four);
  }
}
