import type { IndexModel } from '../optics/indexModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { FurtherLine, LineShape } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import { isTabled } from '../optics/particle.ts';
import { particleAmplitudes } from '../optics/particleAmplitudes.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import {
  coefficientAmplitudes,
  incoherentAmplitudes,
  sphereCoefficients,
} from '../optics/sphereAmplitudes.ts';
import type { LineColours } from './lineColours.ts';
import { lineColours } from './lineColours.ts';
import { resonantColours } from './resonantColours.ts';

/** Where the crossed flux of a line has faded, as its colours fall out of step. */
export interface Fading {
  /** Path r − z beyond which nothing is left of it, metres. */
  pathM: number;
  /** The line's mean wavenumber, 1/m. */
  wavenumber: number;
}

/** One of the colours that stand for the light. */
export interface Colour {
  /** Its part of the power. */
  weight: number;
  sphere: SphereAmplitudes;
  /** Of its line as a whole: all colours of a line must be left out from the same place on, or what is left would not cancel. */
  fading?: Fading;
}

/** One particle in one line of the light. */
export interface SolvedLine {
  colours: Required<Colour>[];
  /** What the particle's narrow resonances scatter beside the colours: no extinction, and no crossed flux. */
  incoherent: Pick<Colour, 'weight' | 'sphere'>[];
}

/**
 * Solves one particle in the light of one line.
 *
 * @param halfAngle half-angle of the cone in which the light may fall on a detector, radians, below π/2
 * @param largestPhase largest η = κρ² at which readings are wanted, at the line's centre
 */
export function solveLine(
  { wavelengthM, linewidthM, share }: FurtherLine,
  shape: LineShape = 'gaussian',
  particle: Particle,
  medium: IndexModel,
  halfAngle: number,
  largestPhase: number,
): SolvedLine {
  const index = refractiveIndex(medium, wavelengthM)[0];
  // A table has no resonances: it serves every colour alike.
  const sizeParameter = isTabled(particle) ? 0 : (Math.PI * index * particle.diameterM) / wavelengthM;
  const sampled = lineColours(shape, wavelengthM, linewidthM, largestPhase, sizeParameter);
  const { spheres, incoherent } = solveColours(sampled, particle, medium, halfAngle);
  const colours = spheres.map(({ weight, sphere }) => ({ weight: weight * share, sphere }));
  const wavenumber = colours.reduce((sum, one) => sum + one.weight * one.sphere.wavenumber, 0) / share;
  const fading = { pathM: sampled.fadedPhase / wavenumber, wavenumber };
  return {
    colours: colours.map((colour) => ({ ...colour, fading })),
    incoherent: incoherent.map((sphere) => ({ weight: share, sphere })),
  };
}

function solveColours(
  { colours, profile }: LineColours,
  particle: Particle,
  medium: IndexModel,
  halfAngle: number,
): { spheres: { weight: number; sphere: SphereAmplitudes }[]; incoherent: SphereAmplitudes[] } {
  if (profile === null || isTabled(particle)) {
    const spheres = colours.map(({ weight, colourM }) => ({
      weight,
      sphere: particleAmplitudes(particle, medium, colourM, halfAngle),
    }));
    return { spheres, incoherent: [] };
  }
  const nodes = Float64Array.from(colours, ({ colourM }) => colourM);
  const solve = (colourM: number) => sphereCoefficients(particle, medium, colourM);
  const line = resonantColours({ profile, nodes }, solve);
  const spheres = line.colours.map(({ u, weight, coefficients }) => ({
    weight,
    sphere: coefficientAmplitudes(coefficients, particle, medium, u, halfAngle),
  }));
  const { sphere: middle } = spheres[spheres.length >> 1];
  return { spheres, incoherent: [incoherentAmplitudes(line.variance, middle)] };
}
