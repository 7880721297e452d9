import type { RandomSource } from '../base/random.ts';
import { bent, frontNeighbours } from './frontNeighbours.ts';
import type { FrontPopulation } from './frontPopulation.ts';
import { localFit } from './localFit.ts';

/** Points used for each unknown of the coordinates, and at most in all. */
const POINTS_PER_UNKNOWN = 2;
const MOST_POINTS = 100;

/** Unknowns besides the slope along each coordinate. */
const OTHER_UNKNOWNS = 7;

/** Weight of the penalty on slopes along coordinates, which hold part of the place on the front too. */
const SLOPE_PENALTY = 1e-3;

/** Longest step, in units of how far the points used are from its start. */
const REACH = 2;

/**
 * A step down from the middle of the points around a place on the front, by a model of their height.
 *
 * The height is taken to bend along the front, and to have a slope along each coordinate and one curvature for all of them:
 * few unknowns, yet enough to tell how far down leads. Where all points around have strayed to the same side, no mean of
 * theirs can come back; the slope can. (A response surface with a reach, as in Conn, Scheinberg & Vicente (2009),
 * Introduction to Derivative-Free Optimization, chapters 4 and 10.)
 *
 * @returns undefined where there are too few points for the model
 */
export function descended(population: FrontPopulation, random: RandomSource): Float64Array | undefined {
  const gap = random.uniform() < 0.5 ? population.gaps.take(random) : undefined;
  const along = gap ?? population.worthy(random).along;
  const dimension = population.members[0].unit.length;
  const unknowns = dimension + OTHER_UNKNOWNS;
  const count = Math.min(MOST_POINTS, POINTS_PER_UNKNOWN * unknowns);
  const { members, rows, heights } = frontNeighbours(population, along, count, true);
  if (members.length < unknowns) return undefined;

  const weights = localFit(rows).weights([1, ...along.map(() => 0)]);
  if (!weights) return undefined;
  const start = members[0].unit.map((_, i) =>
    clamped(members.reduce((sum, { unit }, k) => sum + weights[k] * unit[i], 0)),
  );
  const steps = members.map(({ unit }) => Array.from(unit, (x, i) => x - start[i]));
  const squares = steps.map((step) => step.reduce((sum, x) => sum + x * x, 0));
  const terms = rows.map((row, k) => [...bent(row), ...steps[k], squares[k]]);
  const first = terms[0].length - dimension - 1;
  const penalties = terms[0].map((_, j) => (j < first ? 0 : SLOPE_PENALTY));
  const coefficients = localFit(terms, penalties).coefficients(heights);
  if (!coefficients) return undefined;

  const slope = coefficients.slice(first, first + dimension);
  const steepness = Math.hypot(...slope) || 1;
  const curvature = coefficients[first + dimension];
  const reach = REACH * Math.sqrt(squares.reduce((sum, x) => sum + x, 0) / squares.length);
  const bottom = curvature > 0 ? steepness / (2 * curvature) : reach;
  const length = Math.min(reach, bottom) * (0.5 + random.uniform());
  return start.map((x, i) => clamped(x - (length * slope[i]) / steepness));
}

/** The nearest number from 0 to 1. */
function clamped(x: number): number {
  return Math.min(1, Math.max(0, x));
}
