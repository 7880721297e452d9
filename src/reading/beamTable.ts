import { RimwrightError } from '../base/errors.ts';
import type { Complex } from '../numeric/complex.ts';
import { add, divide, subtract } from '../numeric/complex.ts';
import { countWhile } from '../numeric/countWhile.ts';
import { sparseSamples } from '../numeric/sparseSamples.ts';
import type { AmplitudeJet } from '../optics/amplitudeJet.ts';
import { amplitudeJet } from '../optics/amplitudeJet.ts';
import type { GaussianBeam } from '../optics/gaussianBeam.ts';
import { slantDistance } from '../optics/gaussianBeam.ts';
import type { SphereAmplitudes } from '../optics/sphereAmplitudes.ts';
import { beamAmplitudes, beamBlur, movingBlur } from './beamAmplitudes.ts';
import type { BeamCrossed, SeriesForm } from './beamCrossed.ts';
import { beamCrossed } from './beamCrossed.ts';
import type { BeamPath } from './beamPath.ts';
import { beamPath, farthestPlace, shadowScale, tiltNumber } from './beamPath.ts';
import { beamScattered, SCATTERED_NUMBERS } from './beamScattered.ts';
import type { SeriesBound } from './beamSeries.ts';
import { seriesBound, seriesTerms } from './beamSeries.ts';
import type { RayColumn } from './rayIntegrals.ts';
import { rayIntegrals } from './rayIntegrals.ts';
import type { Scenario } from './scenario.ts';
import { coherence } from './scenario.ts';
import type { Fields } from './tableShelf.ts';

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
  /** The far zone's if left out. */
  fields?: Fields;
}

/**
 * The flux of one scenario in a focused beam, integrated along rays from the particle's shadow: what `RadialTable` is to a flat wave.
 */
export interface BeamTable {
  cellsPerM2: number;
  cells: number;
  /**
   * Cubic pieces over s (see `rayIntegrals`), cell by cell: for each power of y = ν · perUnit 8 numbers (re, im) of the crossed
   * flux; if `curved` as many of its part with p² · perUnit and, in polarised light, with the forms (ρ, p) and (p, p) of cos 2φ, times
   * perUnit; 16 of the scattered, and 12 with those forms; in polarised light as many as at first of the twofold crossed flux, and 4
   * of the scattered.
   */
  pieces: Float64Array;
  terms: number;
  curved: boolean;
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
/** Tilt number (see `tiltNumber`) from which the part with p² counts: without it readings err by a hundredth of that. */
const STEEP = 3e-4;

/**
 * Builds the table of one scenario in a focused beam.
 *
 * @throws RimwrightError `input` where the outline, seen from the shadow, reaches out of the cone that the spheres are solved for
 */
export function buildBeamTable(scenario: Scenario, beam: GaussianBeam, place: BeamPlacement): BeamTable {
  const { placeM, distanceM, spreadM, fields = 'far' } = place;
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
  const curved =
    Math.max(...colours.map(({ sphere }) => tiltNumber(path, sphere.sizeParameter, offsetM))) > STEEP;
  const form = { terms, unitM2, polarised: polarizationRad !== null, curved };
  const columns = columnsOf(form);
  const jets = colours.map(({ sphere }) => jetsOf(sphere, pathOf(sphere.wavenumber), fields));
  const samples = sampleFlux(scenario, jets, pathOf, shadow, form, {
    stepM2,
    rows: cells + 5,
    width: columns.length,
  });
  return {
    cellsPerM2: 1 / stepM2,
    cells,
    pieces: rayIntegrals(samples, columns, stepM2, cells),
    terms,
    curved,
    perUnit: 1 / unitM2,
    axis: polarizationRad === null ? null : [Math.cos(2 * polarizationRad), Math.sin(2 * polarizationRad)],
    shadow,
    farthestM,
    path,
    bound,
    crossedFactor: beamCrossed(jets[colours.length >> 1].crossed, path, shadow, form).factor,
  };
}

/** Amplitudes of a sphere in the beam. */
interface BeamJets {
  crossed: AmplitudeJet;
  scattered: AmplitudeJet;
}

function jetsOf(sphere: SphereAmplitudes, path: BeamPath, fields: Fields): BeamJets {
  const jet = (blur: Complex) => amplitudeJet(beamAmplitudes(sphere, blur, path.distanceM, fields));
  const scattered = jet(beamBlur(path));
  return { crossed: path.spreadM === 0 ? scattered : jet(movingBlur(path)), scattered };
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

/** Complex columns of crossed flux without cos 2φ. */
export function meanTerms({ terms, curved, polarised }: Omit<SeriesForm, 'unitM2'>): number {
  if (!curved) return terms;
  return polarised ? 4 * terms : 2 * terms;
}

function columnsOf({ terms, polarised, curved }: SeriesForm): RayColumn[] {
  const crossed = Array.from({ length: 2 * terms }, (_, i) => i >> 1);
  const mean = [...crossed, ...(curved ? crossed : [])];
  if (curved && polarised) mean.push(...crossed.map((order) => order + 1), ...crossed);
  mean.push(0, 1, 2, 0);
  if (curved && polarised) mean.push(1, 2, 0);
  const twofold = polarised ? [...crossed, 0] : [];
  return [
    ...mean.map((order): RayColumn => ({ order, twofold: 0 })),
    ...twofold.map((order): RayColumn => ({ order, twofold: 1 })),
  ];
}

/** Samples at 0, step, 2 · step … of all columns, summed over the colours of the line. */
function sampleFlux(
  scenario: Scenario,
  jets: readonly BeamJets[],
  pathOf: (wavenumber: number) => BeamPath,
  shadow: number,
  form: SeriesForm,
  { stepM2, rows, width }: { stepM2: number; rows: number; width: number },
): Float64Array {
  const { pathM, wavenumber } = coherence(scenario);
  const samples = new Float64Array(width * rows);
  const central = pathOf(wavenumber);
  const inStep = countWhile(rows, (i) => crossedPath(central, i * stepM2) < pathM);
  const isTurned = form.curved && form.polarised;
  const meanPairs = meanTerms(form);
  const pairs = meanPairs + (form.polarised ? form.terms : 0);
  for (const [c, { weight, sphere }] of scenario.colours.entries()) {
    const path = pathOf(sphere.wavenumber);
    const stride = Math.max(1, SLOW_STEP / (slowRate(sphere, path) * stepM2));
    const crossed = beamCrossed(jets[c].crossed, path, shadow, form);
    const lit = countWhile(inStep, (i) => Math.hypot(...crossed.wave(i * stepM2)) > DARK);
    const slow = sparseSamples(lit, 2 * pairs, stride, (i, out) => crossed.slow(i * stepM2, out));
    for (let i = 0; i < lit; i++) {
      const [re, im] = crossed.wave(i * stepM2);
      for (let n = 0; n < pairs; n++) {
        const from = 2 * (i * pairs + n);
        const at = i * width + 2 * n + (n < meanPairs ? 0 : isTurned ? 7 : 4);
        samples[at] += weight * (re * slow[from] - im * slow[from + 1]);
        samples[at + 1] += weight * (re * slow[from + 1] + im * slow[from]);
      }
    }
    const writeScattered = beamScattered(jets[c].scattered, path, shadow, form.unitM2);
    const scattered = sparseSamples(rows, SCATTERED_NUMBERS, stride, (i, out) =>
      writeScattered(i * stepM2, out),
    );
    for (let i = 0; i < rows; i++) {
      const from = SCATTERED_NUMBERS * i;
      const at = i * width + 2 * meanPairs;
      for (let n = 0; n < 4; n++) samples[at + n] += weight * scattered[from + n];
      if (isTurned) for (let n = 4; n < 7; n++) samples[at + n] += weight * scattered[from + n + 1];
      if (form.polarised) samples[(i + 1) * width - 1] += weight * scattered[from + 4];
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
