import { inputError } from '../base/errors.ts';
import { randomStream } from '../base/random.ts';
import { findRingsCrossing } from '../outline/selfCrossing.ts';
import type { OutlineElement } from '../outline/shape.ts';
import { samplePositions } from '../reading/positions.ts';
import { roughEdgeEstimate, roughen } from '../reading/roughEdge.ts';
import type { OutlineJudge } from './judgeOutline.ts';
import type { ReadParticle } from './readings.ts';
import { nameParticle } from './readings.ts';

/** How rough the edges are, and how many such outlines are tried. */
export interface Roughness {
  /** Rms height, metres. */
  rmsM: number;
  /** Length over which heights forget each other, metres (see `roughen`). */
  correlationM: number;
  outlines: number;
  seed: number;
}

/** Corrections of one particle at one place, over the outlines. */
export interface RoughPlace {
  position_m: [x: number, y: number];
  /** reading/extinction − 1 of the smooth outline. */
  smooth: number;
  mean: number;
  /** Standard deviation from one outline to the next. */
  spread: number;
  /** The closed estimate of the same for small roughness (see `roughEdgeEstimate`). */
  estimate: { mean: number; spread: number };
}

/** One particle in one light: at the first place, and where mean and two spreads lead farthest from the extinction. */
export interface RoughReading {
  particle: ReadParticle;
  wavelength_m: number;
  first: RoughPlace;
  worst: RoughPlace;
}

export interface RoughResult {
  rms_m: number;
  correlation_m: number;
  outlines: number;
  seed: number;
  /** Drawings thrown away because an edge met itself or another one. */
  redrawn: number;
  places: number;
  readings: RoughReading[];
  /** Worst |reading/(gain · extinction) − 1| over particles and places, with the smooth outline's gain: over the outlines. */
  worst: { gain: number; smooth: number; mean: number; spread: number; largest: number };
}

/** Phase between neighbouring places, radians: as in a search, for many outlines are read. */
const SPACING = 0.5;
/** Drawings of one outline before it is given up. */
const MOST_DRAWINGS = 20;
/** Places times edge points times outlines: some minutes. */
const MOST_STEPS = 2e10;

/**
 * What rough edges do to the readings of an outline: an ensemble of rough outlines, each read at the places of the brief's
 * offset (nominal depth), and the closed estimate beside it. The same seed gives the same outlines.
 *
 * @param gain that the worst correction is counted with
 * @param place the one place to read at, metres; null for the brief's
 * @throws RimwrightError `input` where edges are so rough that they keep crossing, or the work would take too long
 */
export function roughReadings(
  { judge, distanceM, radiusM }: OutlineJudge,
  elements: readonly OutlineElement[],
  { rmsM, correlationM, outlines, seed }: Roughness,
  gain: number,
  place: readonly [x: number, y: number] | null,
): RoughResult {
  const phasePerMetre = judge.phasePerMetre(radiusM, distanceM);
  const { offsetM } = judge.task.placement;
  const places =
    place === null
      ? samplePositions(offsetM, phasePerMetre, SPACING, { folds: 1, mirror: false })
      : Float64Array.from(place);
  const read = (outline: readonly OutlineElement[]) => judge.outlineRatios(outline, distanceM, places).ratios;
  const smooth = read(elements);
  const sums = smooth.map(({ length }) => ({
    of: new Float64Array(length),
    ofSquares: new Float64Array(length),
  }));
  const worsts: number[] = [];
  let redrawn = 0;
  for (let n = 0; n < outlines; n++) {
    const drawn = drawRough(elements, rmsM, correlationM, seed, n);
    redrawn += drawn.redrawn;
    if (n === 0) checkEffort(drawn.elements, places.length / 2, smooth.length, outlines);
    const rough = read(drawn.elements);
    worsts.push(worstOf(rough, gain));
    rough.forEach((row, s) => {
      for (let p = 0; p < row.length; p++) {
        const change = row[p] - smooth[s][p];
        sums[s].of[p] += change;
        sums[s].ofSquares[p] += change * change;
      }
    });
  }
  // Steps far below the length over which the flux turns.
  const stepM = 0.2 / phasePerMetre;
  const placeAt = (s: number, p: number): RoughPlace => {
    const position: [number, number] = [places[2 * p], places[2 * p + 1]];
    const estimates = elements.map(({ weight, share = 1, distanceM: own = distanceM, rings }) => {
      const density = judge.edgeDensity(s, own, radiusM, position);
      const { mean, spread } = roughEdgeEstimate(rings, density, rmsM, correlationM, stepM);
      return { mean: weight * share * mean, spread: weight * share * spread };
    });
    const change = estimates.reduce((sum, { mean }) => sum + mean, 0);
    const correction = smooth[s][p] - 1;
    const { mean, spread } = momentsOf(sums[s].of[p], sums[s].ofSquares[p], outlines);
    return {
      position_m: position,
      smooth: correction,
      mean: correction + mean,
      spread,
      estimate: { mean: correction + change, spread: Math.hypot(...estimates.map((one) => one.spread)) },
    };
  };
  const readings = judge.scenarios.map(({ particle, wavelengthM }, s): RoughReading => {
    let [farthest, worst] = [-1, 0];
    for (let p = 0; p < smooth[s].length; p++) {
      const { mean, spread } = momentsOf(sums[s].of[p], sums[s].ofSquares[p], outlines);
      const reach = Math.abs(smooth[s][p] - 1 + mean) + 2 * spread;
      if (reach > farthest) [farthest, worst] = [reach, p];
    }
    const name = nameParticle(particle, wavelengthM);
    return { particle: name, wavelength_m: wavelengthM, first: placeAt(s, 0), worst: placeAt(s, worst) };
  });
  const total = worsts.reduce((sum, value) => sum + value, 0);
  const squares = worsts.reduce((sum, value) => sum + value * value, 0);
  const largest = Math.max(...worsts);
  return {
    ...{ rms_m: rmsM, correlation_m: correlationM, outlines, seed, redrawn, places: places.length / 2 },
    readings,
    worst: { gain, smooth: worstOf(smooth, gain), ...momentsOf(total, squares, outlines), largest },
  };
}

/** One rough outline that does not cross itself. */
function drawRough(
  elements: readonly OutlineElement[],
  rmsM: number,
  correlationM: number,
  seed: number,
  stream: number,
): { elements: OutlineElement[]; redrawn: number } {
  const random = randomStream(seed, stream);
  for (let redrawn = 0; redrawn < MOST_DRAWINGS; redrawn++) {
    const rough = elements.map(({ curves: _, rings, ...element }) => ({
      ...element,
      rings: rings.map((ring) => roughen(ring, rmsM, correlationM, random)),
    }));
    if (rough.every(({ rings }) => findRingsCrossing(rings) === null)) return { elements: rough, redrawn };
  }
  const found = `edges that meet in each of ${MOST_DRAWINGS} drawings`;
  throw inputError([{ key: '--rough', found, expected: 'a smaller height, or a longer correlation length' }]);
}

function checkEffort(
  elements: readonly OutlineElement[],
  places: number,
  scenarios: number,
  outlines: number,
): void {
  const points = elements.flatMap(({ rings }) => rings).reduce((sum, ring) => sum + ring.length / 2, 0);
  const steps = points * places * scenarios * outlines;
  if (steps <= MOST_STEPS) return;
  const found = `${(steps / MOST_STEPS).toPrecision(2)} times the work that is allowed`;
  const expected = 'one place with --position, or a longer correlation length';
  throw inputError([{ key: '--rough', found, expected }]);
}

function worstOf(ratios: readonly Float64Array[], gain: number): number {
  let worst = 0;
  for (const row of ratios) for (const ratio of row) worst = Math.max(worst, Math.abs(ratio / gain - 1));
  return worst;
}

function momentsOf(sum: number, squares: number, count: number): { mean: number; spread: number } {
  const mean = sum / count;
  const variance = count < 2 ? 0 : (squares - count * mean * mean) / (count - 1);
  return { mean, spread: Math.sqrt(Math.max(0, variance)) };
}
