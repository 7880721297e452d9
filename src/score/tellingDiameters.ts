import type { IndexModel } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
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
 */
export function tellingDiameters(
  { particle, leastM, largestM }: Kind,
  medium: IndexModel,
  { wavelengthM, linewidthM }: Pick<Light, 'wavelengthM' | 'linewidthM'>,
): TellingDiameter[] {
  if (isTabled(particle) || leastM === largestM) return [];
  const count = Math.min(
    MOST_SOLVED,
    Math.ceil((Math.PI * (largestM - leastM)) / (SIZE_STEP * wavelengthM)) + 1,
  );
  const stepM = (largestM - leastM) / (count - 1);
  const sums = [[0, 0]];
  for (let i = 0; i < count; i++) {
    const sphere = { ...particle, diameterM: leastM + stepM * i };
    const [re, im] = forwardAmplitude(sphereCoefficients(sphere, medium, wavelengthM));
    sums.push([sums[i][0] + re, sums[i][1] + im]);
  }
  const solved = Array.from({ length: count }, (_, i) => {
    const diameterM = leastM + stepM * i;
    // Over a line S is averaged: about as over diameters that differ by as much as its wavelengths do.
    const half = Math.floor((linewidthM * diameterM) / (2 * wavelengthM * stepM));
    const [from, to] = [sums[Math.max(0, i - half)], sums[Math.min(count, i + half + 1)]];
    return { diameterM, turn: (to[1] - from[1]) / (to[0] - from[0]) };
  });
  return solved.filter(({ turn }, i) => {
    if (i === 0 || i === count - 1) return false;
    const [before, after] = [turn - solved[i - 1].turn, turn - solved[i + 1].turn];
    return before * after > 0;
  });
}
