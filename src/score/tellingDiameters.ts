import type { IndexModel } from '../optics/indexModel.ts';
import { forwardAmplitude } from '../optics/mieAmplitudes.ts';
import { isTabled } from '../optics/particle.ts';
import { sphereCoefficients } from '../optics/sphereAmplitudes.ts';
import type { Kind } from './conditions.ts';

/** Step in size parameter: narrower resonances of clear spheres may be passed over. */
const SIZE_STEP = 0.01;
/** Most diameters that are solved; beyond, the steps grow. */
const MOST_SOLVED = 6000;

/** A diameter at which spheres of a range turn the phase of the light most or least. */
export interface TellingDiameter {
  diameterM: number;
  /** Im S(0)/Re S(0) */
  turn: number;
}

/**
 * The diameters of a range at which t = Im S(0)/Re S(0) has a local extreme, ascending, both ends left out.
 *
 * In paraxial form the correction is −Re[S(0) f]/Re S(0) = −Re f + t Im f, with an f that belongs to the outline and the
 * place alone (design, section 3). So whatever the outline, these diameters read most and least, but for what the
 * width of the scattered lobe adds, which changes slowly with the diameter.
 *
 * @param wavelengthM in vacuum
 */
export function tellingDiameters(
  { particle, leastM, largestM }: Kind,
  medium: IndexModel,
  wavelengthM: number,
): TellingDiameter[] {
  if (isTabled(particle) || leastM === largestM) return [];
  const count = Math.min(
    MOST_SOLVED,
    Math.ceil((Math.PI * (largestM - leastM)) / (SIZE_STEP * wavelengthM)) + 1,
  );
  const solved = Array.from({ length: count }, (_, i) => {
    const diameterM = leastM + ((largestM - leastM) * i) / (count - 1);
    const [re, im] = forwardAmplitude(sphereCoefficients({ ...particle, diameterM }, medium, wavelengthM));
    return { diameterM, turn: im / re };
  });
  return solved.filter(({ turn }, i) => {
    if (i === 0 || i === count - 1) return false;
    const [before, after] = [turn - solved[i - 1].turn, turn - solved[i + 1].turn];
    return before * after > 0;
  });
}
