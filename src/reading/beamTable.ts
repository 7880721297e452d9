import { RimwrightError } from '../base/errors.ts';
import { add, divide, subtract } from '../numeric/complex.ts';
import { countWhile } from '../numeric/countWhile.ts';
import { sparseSamples } from '../numeric/sparseSamples.ts';
import { amplitudeJet } from '../optics/amplitudeJet.ts';
import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { slantDistance } from '../optics/gaussianBeam.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import type { BeamCrossed, SeriesForm } from './beamCrossed.ts';
import { beamCrossed } from './beamCrossed.ts';
import type { BeamPath } from './beamPath.ts';
import { beamPath, farthestPlace, shadowScale } from './beamPath.ts';
import { beamScattered, SCATTERED_NUMBERS } from './beamScattered.ts';
import type { SeriesBound } from './beamSeries.ts';
import { seriesBound, seriesTerms } from './beamSeries.ts';
import type { RayColumn } from './rayIntegrals.ts';
import { rayIntegrals } from './rayIntegrals.ts';
import type { Scenario } from './scenario.ts';
import { coherence } from './scenario.ts';

/** Where particle and plane are, and how far a table must reach; metres. */
export interface BeamPlacement {
  /** z of the particle from its nominal place, to which the beam's focus refers. */
  placeM: number;
  /** From the particle to the detector plane. */
  distanceM: number;
  /** Rms random motion per transverse axis. */
  spreadM: number;
  /** Farthest that a particle will be from the axis. */
  offsetM: number;
  /** Largest distance of an outline's points from the axis. */
  radiusM: number;
}

/**
 * The flux of one scenario in a focused beam, integrated along rays from the particle's shadow: what `RadialTable` is to a flat wave.
 */
export interface BeamTable {
  cellsPerM2: number;
  cells: number;
  /**
   * Cubic pieces over s (see `rayIntegrals`), cell by cell: for each power of y = ν · perUnit 8 numbers (re, im) of the crossed
   * flux, 16 of the scattered; for polarised light as many of the twofold crossed flux and 4 of the scattered.
   */
  pieces: Float64Array;
  terms: number;
  perUnit: number;
  /** The field's angle, as cos 2φ and sin 2φ; null for unpolarised light. */
  axis: readonly [cos2: number, sin2: number] | null;
  /** The particle's shadow lies at this times its place. */
  shadow: number;
  /** A particle farther than this from the axis is out of the beam, metres. */
  farthestM: number;
  path: BeamPath;
  bound: SeriesBound;
  crossedFactor: BeamCrossed['factor'];
}

/** Phase advance per cell, as in `RadialTable`. */
const PHASE_STEP = 1 / 8;
/** Advance of the slow parts between places where they are computed: interpolation then errs by 1e-8. */
const SLOW_STEP = 0.6;
/** Crossed flux below this part of that on the axis is left out. */
const DARK = 1e-20;

/**
 * Builds the table of one scenario in a focused beam.
 *
 * @throws RimwrightError `input` where the outline, seen from the shadow, reaches out of the cone that the spheres are solved for
 */
export function buildBeamTable(scenario: Scenario, beam: GaussianBeam, place: BeamPlacement): BeamTable {
  const { placeM, distanceM, spreadM } = place;
  const { colours, polarizationRad } = scenario;
  const pathOf = (wavenumber: number) => beamPath(beam, wavenumber, placeM, distanceM, spreadM);
  const path = pathOf(coherence(scenario).wavenumber);
  const shadow = shadowScale(path);
  const farthestM = farthestPlace(path);
  const offsetM = Math.min(place.offsetM, farthestM);
  const reachM = place.radiusM + Math.abs(shadow) * offsetM;
  checkCone(scenario, distanceM, reachM);
  const bound = seriesBound(path, reachM);
  const terms = seriesTerms(bound, offsetM);
  const unitM2 = offsetM > 0 ? offsetM * reachM : 1;
  const stepM2 = PHASE_STEP / phaseRate(scenario, path, reachM);
  const cells = Math.floor((reachM * reachM) / stepM2) + 2;
  const columns = columnsOf(terms, polarizationRad !== null);
  const form = { terms, unitM2, polarised: polarizationRad !== null };
  const samples = sampleFlux(scenario, pathOf, shadow, form, {
    stepM2,
    rows: cells + 5,
    width: columns.length,
  });
  const middle = amplitudeJet(colours[colours.length >> 1].sphere);
  return {
    cellsPerM2: 1 / stepM2,
    cells,
    pieces: rayIntegrals(samples, columns, stepM2, cells),
    terms,
    perUnit: 1 / unitM2,
    axis: polarizationRad === null ? null : [Math.cos(2 * polarizationRad), Math.sin(2 * polarizationRad)],
    shadow,
    farthestM,
    path,
    bound,
    crossedFactor: beamCrossed(middle, path, shadow, form).factor,
  };
}

/** Outside their cone the amplitudes' series mean nothing, and grow without bound. */
function checkCone({ colours }: Scenario, distanceM: number, reachM: number): void {
  const halfAngle = Math.atan(reachM / distanceM);
  const limit = Math.min(...colours.map(({ sphere }) => Math.acos(sphere.cosLimit)));
  if (halfAngle <= limit * (1 + 1e-9)) return;
  const [found, most] = [halfAngle, limit].map((angle) => `${((angle * 180) / Math.PI).toPrecision(4)} deg`);
  throw new RimwrightError(
    'input',
    `light is asked for out to a half-angle of ${found} (radius and the shadow's offset together), and known to ${most}`,
  );
}

/** Bound on how fast the crossed flux and the amplitudes change with s, 1/m². */
function phaseRate({ colours }: Scenario, path: BeamPath, reachM: number): number {
  const { wavenumber, wave, atPlane } = path;
  const fringes = [0, reachM * reachM].map((s) => {
    const [re, im] = subtract(
      divide([1, 0], slantDistance(wave, s)),
      divide([1, 0], slantDistance(atPlane, s)),
    );
    return (wavenumber / 2) * Math.hypot(re, im);
  });
  const { sphere } = colours[0];
  // As in `RadialTable`: errors count against the extinction, which may be a small part of |S|.
  const ratio = Math.hypot(...sphere.forward) / Math.abs(sphere.forward[0]);
  return (Math.max(...fringes) + slowRate(sphere, path) / 4) * Math.min(8, ratio ** 0.25);
}

function columnsOf(terms: number, polarised: boolean): RayColumn[] {
  const crossed = Array.from({ length: 2 * terms }, (_, i) => i >> 1);
  const mean = [...crossed, 0, 1, 2, 0].map((order): RayColumn => ({ order, twofold: 0 }));
  const twofold = [...crossed, 0].map((order): RayColumn => ({ order, twofold: 1 }));
  return polarised ? [...mean, ...twofold] : mean;
}

/** Samples at 0, step, 2 · step … of all columns, summed over the colours of the line. */
function sampleFlux(
  scenario: Scenario,
  pathOf: (wavenumber: number) => BeamPath,
  shadow: number,
  form: SeriesForm,
  { stepM2, rows, width }: { stepM2: number; rows: number; width: number },
): Float64Array {
  const { pathM, wavenumber } = coherence(scenario);
  const samples = new Float64Array(width * rows);
  const central = pathOf(wavenumber);
  const inStep = countWhile(rows, (i) => crossedPath(central, i * stepM2) < pathM);
  const pairs = form.terms * (form.polarised ? 2 : 1);
  for (const { weight, sphere } of scenario.colours) {
    const jet = amplitudeJet(sphere);
    const path = pathOf(sphere.wavenumber);
    const stride = Math.max(1, SLOW_STEP / (slowRate(sphere, path) * stepM2));
    const crossed = beamCrossed(jet, path, shadow, form);
    const lit = countWhile(inStep, (i) => Math.hypot(...crossed.wave(i * stepM2)) > DARK);
    const slow = sparseSamples(lit, 2 * pairs, stride, (i, out) => crossed.slow(i * stepM2, out));
    for (let i = 0; i < lit; i++) {
      const [re, im] = crossed.wave(i * stepM2);
      for (let n = 0; n < pairs; n++) {
        const from = 2 * (i * pairs + n);
        const at = i * width + 2 * n + (n < form.terms ? 0 : 4);
        samples[at] += weight * (re * slow[from] - im * slow[from + 1]);
        samples[at + 1] += weight * (re * slow[from + 1] + im * slow[from]);
      }
    }
    const writeScattered = beamScattered(jet, path, shadow, form.unitM2);
    const scattered = sparseSamples(rows, SCATTERED_NUMBERS, stride, (i, out) =>
      writeScattered(i * stepM2, out),
    );
    for (let i = 0; i < rows; i++) {
      for (let c = 0; c < 4; c++) samples[i * width + 2 * form.terms + c] += weight * scattered[5 * i + c];
      if (form.polarised) samples[(i + 1) * width - 1] += weight * scattered[5 * i + 4];
    }
  }
  return samples;
}

/** How fast amplitudes and angles change with s, 1/m²: S goes as cos(xθ) at the most. */
function slowRate({ sizeParameter }: SphereAmplitudes, { distanceM }: BeamPath): number {
  return (4 + sizeParameter * sizeParameter) / (distanceM * distanceM);
}

/** |r − d − Re(R − Q)|, metres: the path over which the colours of a line fall out of step. */
function crossedPath({ wave, atPlane }: BeamPath, s: number): number {
  const [scattered] = divide([s, 0], add(slantDistance(wave, s), wave));
  const [incident] = divide([s, 0], add(slantDistance(atPlane, s), atPlane));
  return Math.abs(scattered - incident);
}
