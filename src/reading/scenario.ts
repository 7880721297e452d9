import type { IndexModel } from '../optics/indexModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import { linesOf } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import { particleAmplitudes } from '../optics/particleAmplitudes.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { lineColours } from './lineColours.ts';

/** Where the crossed flux of a line has faded, as its colours fall out of step. */
export interface Fading {
  /** Path r − z beyond which nothing is left of it, metres. */
  pathM: number;
  /** The line's mean wavenumber, 1/m. */
  wavenumber: number;
}

/** One of the colours that stand for the light. */
interface Colour {
  /** Its part of the power. */
  weight: number;
  sphere: SphereAmplitudes;
  /** Of its line as a whole: all colours of a line must be left out from the same place on, or what is left would not cancel. */
  fading?: Fading;
}

/** One particle in one light: what a detector is judged on at every position. */
export interface Scenario {
  particle: Particle;
  /** Centre of the main line, vacuum, metres. */
  wavelengthM: number;
  /** The light as a weighted sum of colours, those of the main line first; the weights add up to 1. */
  colours: readonly Colour[];
  /** Extinction cross-section in this light: the mean over all lines, m². */
  extinctionM2: number;
  /** Angle of the field from x, radians; null for unpolarised light. */
  polarizationRad: number | null;
  /** Half-angle of the source, radians; 0 if left out. */
  sourceAngleRad?: number;
}

/** The vacuum wavelengths of the main line that the drift makes: the nominal one, and `count` − 1 more evenly between the extremes. */
export function driftedWavelengths(light: Light, count = 3): number[] {
  if (light.driftM === 0) return [light.wavelengthM];
  return Array.from(
    { length: count },
    (_, i) => light.wavelengthM + light.driftM * ((2 * i) / (count - 1) - 1),
  );
}

/**
 * Solves every particle at every wavelength.
 *
 * @param halfAngle half-angle of the cone in which the light may fall on a detector, radians, below π/2
 * @param largestPhase largest η = κρ² at which readings are wanted, in the main line; decides how finely lines are sampled
 */
export function buildScenarios(
  light: Light,
  medium: IndexModel,
  particles: readonly Particle[],
  wavelengths: readonly number[],
  halfAngle: number,
  largestPhase: number,
): Scenario[] {
  return particles.flatMap((particle) =>
    wavelengths.map((wavelengthM) => {
      const colours = linesOf(light).flatMap((line) => {
        // The drift shifts all lines alike.
        const centreM = line.wavelengthM + wavelengthM - light.wavelengthM;
        const index = refractiveIndex(medium, centreM)[0];
        const sizeParameter = (Math.PI * index * particle.diameterM) / centreM;
        const phase = (largestPhase * wavelengthM) / centreM;
        const sampled = lineColours(
          light.shape ?? 'gaussian',
          centreM,
          line.linewidthM,
          phase,
          sizeParameter,
        );
        const solved = sampled.colours.map(({ weight, colourM }) => ({
          weight: weight * line.share,
          sphere: particleAmplitudes(particle, medium, colourM, halfAngle),
        }));
        const wavenumber =
          solved.reduce((sum, one) => sum + one.weight * one.sphere.wavenumber, 0) / line.share;
        const fading = { pathM: sampled.fadedPhase / wavenumber, wavenumber };
        return solved.map((colour) => ({ ...colour, fading }));
      });
      return {
        particle,
        wavelengthM,
        colours,
        extinctionM2: colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.extinctionM2, 0),
        polarizationRad: light.polarizationRad,
        sourceAngleRad: light.sourceAngleRad ?? 0,
      };
    }),
  );
}

/** Of the main line. */
export function coherence({ colours: [{ fading, sphere }] }: Scenario): Fading {
  return fading ?? { pathM: Number.POSITIVE_INFINITY, wavenumber: sphere.wavenumber };
}
