import type { RandomSource } from '../base/random.ts';
import { bent, type FrontNeighbours, frontNeighbours } from './frontNeighbours.ts';
import type { FrontPopulation } from './frontPopulation.ts';
import { localFit } from './localFit.ts';

/** Least and largest number of neighbours of a model, by their logarithm alike. */
const NEIGHBOURS = [12, 60] as const;

/** From so many on their height is taken to bend along the front. */
const ENOUGH_TO_BEND = 30;

/** Chance and size of a random part, in units of differences between neighbours. */
const NOISE_CHANCE = 0.1;
const NOISE = 0.5;

/** How far below its neighbours a new point may aim, in units of the best of them. */
const AMBITION = 3;

/** Chance to aim no lower than the neighbours used: their mean is free of what is accidental in each. */
const MODEST_CHANCE = 0.5;

/** Weight of the penalty on the slope along the height: few neighbours know little of it. */
const SLOPE_PENALTY = 0.1;

/**
 * A point for the largest gap of the front, from a linear model of the coordinates as functions of the place on the front.
 *
 * The best points of a smooth problem form a smooth sheet of one dimension less than there are objectives (the regularity
 * used by Zhang, Zhou & Jin (2008), IEEE Trans. Evol. Comput. 12, 41); the model from objectives to coordinates is that of
 * Cheng, Jin, Narukawa & Sendhoff (2015), IEEE Trans. Evol. Comput. 19, 838, with least squares in place of their
 * Gaussian processes. The lower half of the neighbours is used: a fit over many evens out what is accidental in each, and
 * its slope along the height, across the front, leads downhill.
 *
 * @returns undefined where there are no gaps, or too few points for a model
 */
export function modelled(population: FrontPopulation, random: RandomSource): Float64Array | undefined {
  const along = population.gaps.take(random);
  if (!along) return undefined;
  const [few, many] = NEIGHBOURS;
  const count = Math.round(few * (many / few) ** random.uniform());
  const neighbours = frontNeighbours(population, along, count, false);
  const least = 2 * along.length + 4;
  if (neighbours.members.length < least) return undefined;
  const excess = excessHeights(neighbours);
  if (!excess) return undefined;

  const order = [...excess.keys()].sort((a, b) => excess[a] - excess[b]);
  const lower = order.slice(0, Math.max(least, order.length / 2));
  const mean = lower.reduce((sum, k) => sum + excess[k], 0) / lower.length;
  const aim = random.uniform() < MODEST_CHANCE ? mean : AMBITION * random.uniform() * excess[lower[0]];
  const zeros = along.map(() => 0);
  const weights = localFit(
    lower.map((k) => [...neighbours.rows[k], excess[k]]),
    [0, ...zeros, SLOPE_PENALTY],
  ).weights([1, ...zeros, aim]);
  if (!weights) return undefined;

  const units = neighbours.members.map(({ unit }) => unit);
  const any = () => units[Math.floor(units.length * random.uniform())];
  const isNoisy = random.uniform() < NOISE_CHANCE;
  return units[0].map((_, i) => {
    let x = isNoisy ? NOISE * random.normal() * (any()[i] - any()[i]) : 0;
    for (const [w, k] of lower.entries()) x += weights[w] * units[k][i];
    return Math.min(1, Math.max(0, x));
  });
}

/** How far each neighbour is above the front that runs through all of them. */
function excessHeights({ rows, heights }: FrontNeighbours): number[] | undefined {
  const terms = rows.length < ENOUGH_TO_BEND ? rows : rows.map(bent);
  const coefficients = localFit(terms).coefficients(heights);
  return (
    coefficients &&
    heights.map((height, k) => terms[k].reduce((sum, x, j) => sum - coefficients[j] * x, height))
  );
}
