import { RimwrightError } from '../base/errors.ts';
import { countWhile } from '../numeric/countWhile.ts';
import { cellIntegrals, hermitePieces, slopeAtStart } from '../numeric/uniformTable.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { stillPoint } from './crossedAverage.ts';
import type { CumulativeFlux } from './cumulativeFlux.ts';
import type { FluxSamples } from './fluxDensity.ts';
import type { WeighedSphere } from './lineFlux.ts';
import { addLineFlux } from './lineFlux.ts';
import { addSpreadFlux, FARTHEST_SPREAD } from './randomSpread.ts';
import type { Fading, Scenario } from './scenario.ts';
import { discMeans, tiltedMeans, tiltedPlace } from './sourceDisc.ts';

/** The cumulative flux of one scenario at one distance, ready for boundary integrals. */
export interface RadialTable extends CumulativeFlux {
  /** The field's angle, as cos 2φ and sin 2φ. */
  axis: readonly [cos2: number, sin2: number];
}

/** Phase advance per cell that keeps a table's error below 1e-6 of the extinction for ordinary particles. */
const PHASE_STEP = 1 / 8;

/** Swing of the phase over the disc of places below which it is a point: the flux changes by a square of it over 8. */
const POINT_SWING = 1e-4;

/** κD² of a disc of places up to which the usual cells serve, and how much finer they become beyond. */
const STEADY_DISC = 10;
const MOST_FINER = 16;

/**
 * Builds the table of one scenario. A source with an angular size is a mean over tilted waves (see `tiltedMeans`).
 *
 * @param distanceM from particle to detector plane, metres
 * @param radiusM largest distance from the particle's axis that will be asked for, metres
 * @param spreadM rms random motion per axis, metres
 * @throws RimwrightError `input` where that radius, with 7 times the spread and the source's disc, lies outside the cone that the spheres are solved for,
 *   or a sphere is far too near for its far-zone fields
 */
export function buildRadialTable(
  scenario: Scenario,
  distanceM: number,
  radiusM: number,
  spreadM: number,
): RadialTable {
  const spheres = scenario.colours.map(({ sphere }) => sphere);
  const kappa = Math.max(...spheres.map(({ wavenumber }) => wavenumber)) / (2 * distanceM);
  const discM = sourceDisc(scenario, distanceM, radiusM, kappa);
  checkCone(spheres, distanceM, radiusM + FARTHEST_SPREAD * spreadM + discM);
  const stepM2 = Math.min(...spheres.map(({ forward }) => phaseStep(forward))) / kappa;
  const cellsTo = (reachM: number) => Math.floor((reachM * reachM) / stepM2) + 2;
  const still = (reachM: number) => {
    const cells = cellsTo(reachM);
    const samples = sampleFlux(scenario, distanceM, stepM2, cells + MARGIN, spreadM);
    return tableOf(samples, stepM2, cells, scenario.polarizationRad);
  };
  if (discM === 0) return still(radiusM);
  // Near the axis the mean turns as J₀(2κρD), faster over ρ² than η does where κD² is large.
  const fineM2 = stepM2 / Math.min(MOST_FINER, Math.max(1, (kappa * discM * discM) / STEADY_DISC));
  const cells = Math.floor((radiusM * radiusM) / fineM2) + 2;
  const count = cells + MARGIN;
  const { sourceAngleRad = 0, polarizationRad } = scenario;
  const [rho, sin, cos] = [Math.sqrt(count * fineM2), Math.sin(sourceAngleRad), Math.cos(sourceAngleRad)];
  const farthest = Math.sqrt(tiltedPlace(rho, distanceM, sin, cos, -1).s);
  const point = still(Math.max(rho + discM, farthest));
  const means = scenario.tiltsAsPlaces
    ? discMeans(point, discM, kappa, fineM2, count)
    : tiltedMeans(point, sourceAngleRad, distanceM, kappa, fineM2, count);
  return tableOf(means, fineM2, cells, polarizationRad);
}

/** Samples beyond the cells, for the six-point rules. */
const MARGIN = 4;

function tableOf(
  { mean, twofold }: Pick<FluxSamples, 'mean' | 'twofold'>,
  stepM2: number,
  cells: number,
  angle: number | null,
): RadialTable {
  return {
    cellsPerM2: 1 / stepM2,
    cells,
    mean: cumulativePieces(mean, stepM2, cells, 1),
    twofold: angle === null ? null : cumulativePieces(twofold, stepM2, cells, 2),
    axis: angle === null ? [0, 0] : [Math.cos(2 * angle), Math.sin(2 * angle)],
  };
}

/** Radius of the disc of places, metres; 0 where it makes no difference. */
function sourceDisc(
  { sourceAngleRad = 0 }: Scenario,
  distanceM: number,
  radiusM: number,
  kappa: number,
): number {
  const discM = distanceM * Math.tan(sourceAngleRad);
  return 2 * kappa * (radiusM + discM) * discM < POINT_SWING ? 0 : discM;
}

/** Outside their cone the amplitudes' series mean nothing, and grow without bound. */
function checkCone(spheres: readonly SphereAmplitudes[], distanceM: number, reachM: number): void {
  const halfAngle = Math.atan(reachM / distanceM);
  const limit = Math.acos(Math.max(...spheres.map(({ cosLimit }) => cosLimit)));
  if (halfAngle <= limit * (1 + 1e-6)) return;
  const [found, most] = [halfAngle, limit].map((angle) => `${((angle * 180) / Math.PI).toPrecision(4)} deg`);
  throw new RimwrightError(
    'input',
    `light is asked for out to a half-angle of ${found} (radius, offset and random motion together), and known to ${most}`,
  );
}

/** The interpolation error h⁴/384 counts relative to |S|; where the extinction is a small part of |S| the step shrinks. */
function phaseStep(forward: readonly [number, number]): number {
  const ratio = Math.hypot(forward[0], forward[1]) / Math.abs(forward[0]);
  return Math.max(PHASE_STEP / 8, PHASE_STEP / ratio ** 0.25);
}

/** Samples of the flux density, summed over the colours of the light. */
function sampleFlux(
  { colours, incoherent = [] }: Scenario,
  distanceM: number,
  stepM2: number,
  count: number,
  spreadM: number,
): Pick<FluxSamples, 'mean' | 'twofold'> {
  const [mean, twofold] = [new Float64Array(count), new Float64Array(count)];
  const add = (line: readonly WeighedSphere[], crossedCount: number) => {
    const samples = { stepM2, mean, twofold, crossedCount };
    if (spreadM === 0) addLineFlux(line, distanceM, samples);
    else {
      for (const { weight, sphere } of line) addSpreadFlux(sphere, distanceM, spreadM, weight, samples);
    }
  };
  for (const fading of new Set(colours.map((colour) => colour.fading))) {
    const line = colours.filter((colour) => colour.fading === fading);
    add(line, coherentCount(fading, distanceM, stepM2, count, spreadM));
  }
  if (incoherent.length > 0) add(incoherent, 0);
  return { mean, twofold };
}

/** Samples before a line's colours cancel: the same for every colour, or what is left of them would not. */
function coherentCount(
  fading: Fading | undefined,
  distanceM: number,
  stepM2: number,
  count: number,
  spreadM: number,
): number {
  if (fading === undefined || fading.pathM === Number.POSITIVE_INFINITY) return count;
  return countWhile(count, (i) => {
    const { path } = stillPoint(fading.wavenumber, distanceM, spreadM, Math.sqrt(i * stepM2));
    return Math.hypot(...path) < fading.pathM;
  });
}

/** Cubic pieces of G/s^power, where dG/ds = w/2. */
function cumulativePieces(density: Float64Array, stepM2: number, cells: number, power: 1 | 2): Float64Array {
  const pieces = cellIntegrals(density, cells + 1);
  const values = new Float64Array(cells + 1);
  const slopes = new Float64Array(cells + 1);
  // At the axis w = w(0) + w'(0) s + …, and the twofold part starts with w'(0) s.
  const slope = slopeAtStart(density) / stepM2;
  values[0] = power === 1 ? density[0] / 2 : slope / 4;
  slopes[0] = (slope * stepM2) / 4;
  let cumulative = 0;
  for (let i = 1; i <= cells; i++) {
    cumulative += (pieces[i - 1] * stepM2) / 2;
    const s = i * stepM2;
    const divisor = power === 1 ? s : s * s;
    values[i] = cumulative / divisor;
    slopes[i] = (density[i] / (2 * divisor) - (power * values[i]) / s) * stepM2;
  }
  if (power === 2) slopes[0] = values[1] - values[0];
  return hermitePieces(values, slopes, cells);
}
