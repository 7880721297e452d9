import type { RandomSource } from '../base/random.ts';

/**
 * How a build may differ from its drawing: `limits` are never passed, and any value within is as likely as any other; `rms` is
 * the standard deviation of a normal distribution. After JCGM 100:2008, 4.3.7 and 4.3.4: limits alone say no more than that.
 */
export interface Tolerance {
  law: 'limits' | 'rms';
  /** Either way, or one standard deviation; 0 for none. */
  size: number;
}

/**
 * What varies from one build to the next, and in which unit:
 * `edge`: all edges of the openings together, outwards, m; `kerf`: width of the cut, which moves every edge by half, m;
 * `place`: of the mask, along x and along y, m; `distance`: m; `tilt`: of the mask about x and about y, rad;
 * `wavelength`: of the light, vacuum, m; `index`: of all particles, real part; `size`: all diameters, as a ratio;
 * `noise`: what one measurement adds to every reading, over gain times the smallest extinction.
 */
export const TOLERANCE_NAMES = [
  'edge',
  'kerf',
  'place',
  'distance',
  'tilt',
  'wavelength',
  'index',
  'size',
  'noise',
] as const;
export type ToleranceName = (typeof TOLERANCE_NAMES)[number];

export type Tolerances = Readonly<Record<ToleranceName, Tolerance>>;

export const NO_TOLERANCE: Tolerance = { law: 'limits', size: 0 };

/** Random numbers of one build: the tolerance that each belongs to. */
export const VARIABLES: readonly ToleranceName[] = [
  ...(['edge', 'kerf', 'place', 'place', 'distance', 'tilt', 'tilt'] as const),
  ...(['wavelength', 'index', 'size', 'noise'] as const),
];

/** How a build differs from its drawing, in this order; edge and kerf both shift the edges. */
export const DEVIATIONS = [
  'shiftM',
  'xM',
  'yM',
  'distanceM',
  'tiltXRad',
  'tiltYRad',
  'wavelengthM',
  'index',
  'size',
] as const;

export type Deviations = Record<(typeof DEVIATIONS)[number], number>;

/** Normal numbers are drawn within this many standard deviations: one in 16 000 lies beyond. */
const FARTHEST_NORMAL = 4;

/** Draws one build: a standard number for each of `VARIABLES`, to be scaled by the size of its tolerance. */
export function drawStandard(tolerances: Tolerances, random: RandomSource, out: Float64Array): void {
  for (let v = 0; v < VARIABLES.length; v++) {
    out[v] = tolerances[VARIABLES[v]].law === 'limits' ? 2 * random.uniform() - 1 : cutNormal(random);
  }
}

function cutNormal(random: RandomSource): number {
  for (;;) {
    const value = random.normal();
    if (Math.abs(value) <= FARTHEST_NORMAL) return value;
  }
}

/** The nine deviations of a build from its standard numbers, in SI units. */
export function deviationsOf(standard: Float64Array, tolerances: Tolerances, out: Float64Array): void {
  const { edge, kerf, place, distance, tilt, wavelength, index, size } = tolerances;
  // Half of the kerf lies on either side of the cut's middle.
  out[0] = edge.size * standard[0] + (kerf.size * standard[1]) / 2;
  out[1] = place.size * standard[2];
  out[2] = place.size * standard[3];
  out[3] = distance.size * standard[4];
  out[4] = tilt.size * standard[5];
  out[5] = tilt.size * standard[6];
  out[6] = wavelength.size * standard[7];
  out[7] = index.size * standard[8];
  out[8] = size.size * standard[9];
}

/** What one measurement adds to every reading, over gain times the smallest extinction. */
export function noiseOf(standard: Float64Array, { noise }: Tolerances): number {
  return noise.size * standard[10];
}

/** The farthest that each deviation can be. */
export function farthestDeviations(tolerances: Tolerances): Deviations {
  const reach = (name: ToleranceName) => {
    const { law, size } = tolerances[name];
    return law === 'limits' ? size : FARTHEST_NORMAL * size;
  };
  return {
    shiftM: reach('edge') + reach('kerf') / 2,
    xM: reach('place'),
    yM: reach('place'),
    distanceM: reach('distance'),
    tiltXRad: reach('tilt'),
    tiltYRad: reach('tilt'),
    wavelengthM: reach('wavelength'),
    index: reach('index'),
    size: reach('size'),
  };
}
