import { evenNormal } from '../numeric/evenNormal.ts';
import { gaussHermite } from '../numeric/gaussHermite.ts';
import type { IndexModel } from '../optics/indexModel.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Light } from '../optics/light.ts';
import type { Particle } from '../optics/particle.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { sphereAmplitudes } from '../optics/sphereAmplitudes.ts';

/** One particle in one light: what a detector is judged on at every position. */
export interface Scenario {
  particle: Particle;
  /** Centre of the line, vacuum, metres. */
  wavelengthM: number;
  /** The line as a weighted sum of colours; the weights add up to 1. */
  colours: readonly { weight: number; sphere: SphereAmplitudes }[];
  /** Extinction cross-section in this light: the mean over the line, m². */
  extinctionM2: number;
  /** Angle of the field from x, radians; null for unpolarised light. */
  polarizationRad: number | null;
}

/** Standard deviation over full width at half maximum of a Gaussian. */
const SIGMA_PER_FWHM = 1 / Math.sqrt(8 * Math.LN2);

/** The vacuum wavelengths that the drift makes: the nominal one, and `count` − 1 more evenly between the extremes. */
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
 * @param largestPhase largest η = κρ² at which readings are wanted; decides how finely the line is sampled
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
      const mediumIndex = refractiveIndex(medium, wavelengthM)[0];
      const sizeParameter = (Math.PI * mediumIndex * particle.diameterM) / wavelengthM;
      const colours = lineColours(light, wavelengthM, largestPhase, sizeParameter).map(
        ({ weight, colourM }) => ({
          weight,
          sphere: sphereAmplitudes(particle, medium, colourM, halfAngle),
        }),
      );
      return {
        particle,
        wavelengthM,
        colours,
        extinctionM2: colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.extinctionM2, 0),
        polarizationRad: light.polarizationRad,
      };
    }),
  );
}

/** Colours farther out than this many σ (two full widths) carry less than 3e-6 of the light. */
const LINE_REACH = 2 / SIGMA_PER_FWHM;

/** Rms phase over the line at which its colours have cancelled: e^−25. */
const CANCELLED = Math.sqrt(50);

/** Step in size parameter that the narrow resonances of a clear sphere take, and the most colours that are spent on them. */
const RESONANCE_STEP = 0.02;
const MOST_FOR_RESONANCES = 64;

/**
 * Colours of the line. A phase η spreads by η σ/λ over it: n Gauss–Hermite nodes follow cos up to about √n − 1, and
 * for wide spreads evenly spaced ones are fewer. Beyond CANCELLED no colours need to be told apart: see `coherence`.
 * Where the line is wide enough for a sphere's resonances, they decide.
 */
function lineColours(light: Light, wavelengthM: number, largestPhase: number, sizeParameter: number) {
  const sigmaM = light.linewidthM * SIGMA_PER_FWHM;
  if (sigmaM === 0) return [{ weight: 1, colourM: wavelengthM }];
  const relative = sigmaM / wavelengthM;
  const spread = Math.min(largestPhase * relative, CANCELLED);
  const hermite = Math.ceil(4 + 2 * spread + spread * spread);
  const even = Math.ceil((LINE_REACH * (spread + 6)) / Math.PI) + 1;
  const wanted = Math.ceil((2 * LINE_REACH * sizeParameter * relative) / RESONANCE_STEP);
  const resonant = Math.min(MOST_FOR_RESONANCES, wanted);
  const isNarrow = hermite < even && resonant <= hermite;
  const { nodes, weights } = isNarrow
    ? gaussHermite(hermite)
    : evenNormal(Math.max(even, resonant), LINE_REACH);
  const within = [...nodes.keys()].filter((i) => Math.abs(nodes[i]) <= LINE_REACH);
  const total = within.reduce((sum, i) => sum + weights[i], 0);
  return within.map((i) => ({ weight: weights[i] / total, colourM: wavelengthM + sigmaM * nodes[i] }));
}

/**
 * Path r − z beyond which the crossed flux of the line's colours cancels (Infinity for a single colour), and their mean
 * wavenumber, 1/m. A finite number of colours would come back into step farther out: a real line never does.
 * All of them must be left out from the same place on: what is left of some would not cancel.
 */
export function coherence({ colours }: Scenario): { pathM: number; wavenumber: number } {
  const wavenumber = colours.reduce((sum, { weight, sphere }) => sum + weight * sphere.wavenumber, 0);
  const variance = colours.reduce(
    (sum, { weight, sphere }) => sum + weight * (sphere.wavenumber - wavenumber) ** 2,
    0,
  );
  return { pathM: variance === 0 ? Number.POSITIVE_INFINITY : CANCELLED / Math.sqrt(variance), wavenumber };
}
