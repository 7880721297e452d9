import type { IndexModel } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import { linesOf } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import type { Colour, Fading, SolvedLine } from './solveLine.ts';
import { solveLine } from './solveLine.ts';

export type { Fading } from './solveLine.ts';

/** One particle in one light: what a detector is judged on at every position. */
export interface Scenario {
  particle: Particle;
  /** Centre of the main line, vacuum, metres. */
  wavelengthM: number;
  /** The light as a weighted sum of colours, those of the main line first; the weights add up to 1. */
  colours: readonly Colour[];
  /** What a sphere's narrow resonances scatter beside its colours, with their parts of the power. In a focused beam it is left out. */
  incoherent?: SolvedLine['incoherent'];
  /** Extinction cross-section in this light: the mean over all lines, m². */
  extinctionM2: number;
  /** Angle of the field from x, radians; null for unpolarised light. */
  polarizationRad: number | null;
  /** Half-angle of the source, radians; 0 if left out. */
  sourceAngleRad?: number;
  /** Whether the source's directions may be taken for places of the particle (see `discMeans`): 1e-4 worse, and many times quicker. */
  tiltsAsPlaces?: boolean;
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
      const solved = linesOf(light).map((line) => {
        // The drift shifts all lines alike.
        const centreM = line.wavelengthM + wavelengthM - light.wavelengthM;
        const phase = (largestPhase * wavelengthM) / centreM;
        return solveLine({ ...line, wavelengthM: centreM }, light.shape, particle, medium, halfAngle, phase);
      });
      const colours = solved.flatMap((line) => line.colours);
      return {
        particle,
        wavelengthM,
        colours,
        incoherent: solved.flatMap((line) => line.incoherent),
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
