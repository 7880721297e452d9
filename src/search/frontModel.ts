import type { RandomSource } from '../base/random.ts';
import { CORNER, type GapPlace } from './frontGaps.ts';
import { alongFront, type Member } from './frontMember.ts';
import type { FrontPopulation } from './frontPopulation.ts';
import { hypervolume } from './hypervolume.ts';
import { localFit } from './localFit.ts';

/** Least and largest number of neighbours of a model, by their logarithm alike. */
const NEIGHBOURS = [12, 60] as const;

/** Places that are looked at for one point, and neighbours that decide what a place would be worth. */
const PLACES = 6;
const NEAREST = 20;

/** Chance and size of a random part, in units of differences between neighbours. */
const NOISE_CHANCE = 0.1;
const NOISE = 0.5;

/** How far below its neighbours a new point may aim, in units of the best of them. */
const AMBITION = 3;

/** Weight of the penalty on the slope along the height: few neighbours know little of it. */
const SLOPE_PENALTY = 0.1;

/**
 * A point for a gap of the front, from a linear model of the coordinates as functions of the place on the front.
 *
 * The best points of a smooth problem form a smooth sheet of one dimension less than there are objectives (the regularity
 * used by Zhang, Zhou & Jin (2008), IEEE Trans. Evol. Comput. 12, 41); the model from objectives to coordinates is that of
 * Cheng, Jin, Narukawa & Sendhoff (2015), IEEE Trans. Evol. Comput. 19, 838, with least squares in place of their
 * Gaussian processes. A fit over many neighbours evens out what is accidental in each; its slope along the height,
 * across the front, leads downhill. Of several places near a worthy point the one with most hypervolume to gain is taken.
 *
 * @returns undefined where there are too few points for a model
 */
export function modelled(population: FrontPopulation, random: RandomSource): Float64Array | undefined {
  const centre = population.worthy(random);
  if (centre.violation > 0) return undefined;
  const neighbours = nearest(population, centre.along, NEAREST + 1);
  const { length } = centre.along;
  if (neighbours.length < 2 * length + 4) return undefined;
  const offsets = neighbours.map(({ along }) => along.map((v, j) => v - centre.along[j]));
  const coefficients = localFit(offsets.map((v) => [1, ...v])).coefficients(
    neighbours.map(({ place }) => height(place)),
  );
  if (!coefficients) return undefined;
  const draw = () => someOffset(offsets, random);
  const target = bestOffset(draw, neighbours, centre.along, coefficients);
  return aimed(population, centre.along.map((v, j) => v + target[j]), random);
}

export function filled(population: FrontPopulation, random: RandomSource): Float64Array | undefined {
  const gap = population.gaps.take();
  return gap && aimed(population, inGap(gap, random), random);
}

function inGap({ middle, open }: GapPlace, random: RandomSource): number[] {
  return alongFront(middle.map((x, j) => (open[j] ? x + 0.003 * 1000 ** random.uniform() : x)));
}

function aimed(population: FrontPopulation, middle: readonly number[], random: RandomSource): Float64Array | undefined {
  const dimension = middle.length;
  const [few, many] = NEIGHBOURS;
  const count = Math.round(few * (many / few) ** random.uniform());
  const near = nearest(population, middle, count);
  if (near.length < 2 * dimension + 4) return undefined;
  const rows = near.map(({ along }) => along.map((v, j) => v - middle[j])).map((v) => [1, ...v]);
  const curved = (row: number[]) => near.length < 30 ? row : [...row, ...row.slice(1).flatMap((v, j, all) => all.slice(j).map((w) => v * w))];
  const heights = near.map(({ place }) => height(place));
  const flat = localFit(rows.map(curved));
  const coefficients = flat.coefficients(heights);
  if (!coefficients) return undefined;
  const excess = heights.map((h, k) => h - predicted(coefficients, curved(rows[k]).slice(1)));
  const order = [...near.keys()].sort((a, b) => excess[a] - excess[b]).slice(0, Math.max(2 * dimension + 4, near.length / 2));
  const aim = random.uniform() < 0.5 ? order.reduce((sum, k) => sum + excess[k], 0) / order.length : AMBITION * random.uniform() * excess[order[0]];
  const full = localFit(
    order.map((k) => [...rows[k], excess[k]]),
    [0, ...middle.map(() => 0), SLOPE_PENALTY],
  );
  const weights = full.weights([1, ...middle.map(() => 0), aim]);
  if (!weights) return undefined;

  const isNoisy = random.uniform() < NOISE_CHANCE;
  const any = () => near[Math.floor(near.length * random.uniform())].unit;
  return near[0].unit.map((_, i) => {
    let x = 0;
    for (const [i2, k] of order.entries()) x += weights[i2] * near[k].unit[i];
    if (isNoisy) x += NOISE * random.normal() * (any()[i] - any()[i]);
    return Math.min(1, Math.max(0, x));
  });
}

const CURVED = (row: readonly number[]) => [...row, ...row.slice(1).flatMap((v, j, all) => all.slice(j).map((w) => v * w))];

export function descended(population: FrontPopulation, random: RandomSource): Float64Array | undefined {
  const gap = random.uniform() < 0.5 ? population.gaps.take() : undefined;
  const middle = gap ? inGap(gap, random) : population.worthy(random).along;
  const n = population.members[0].unit.length;
  const count = Math.min(100, 2 * (n + 7));
  const near = nearest(population, middle, count, population.known.length);
  if (near.length < n + 7) return undefined;
  const rows = near.map(({ along }) => [1, ...along.map((v, j) => v - middle[j])]);
  // Where the average lies.
  const flat = localFit(rows).weights([1, ...middle.map(() => 0)]);
  if (!flat) return undefined;
  const start = near[0].unit.map((_, i) => Math.min(1, Math.max(0, near.reduce((sum, { unit }, k) => sum + flat[k] * unit[i], 0))));
  const heights = near.map(({ place }) => height(place));
  const steps = near.map(({ unit }) => unit.map((x, i) => x - start[i]));
  const squares = steps.map((step) => step.reduce((sum, x) => sum + x * x, 0));
  const full = rows.map((row, k) => [...CURVED(row), ...steps[k], squares[k]]);
  const plain = CURVED(rows[0]).length;
  const fit = localFit(full, full[0].map((_, j) => (j < plain ? 0 : 1e-3))).coefficients(heights);
  if (!fit) return undefined;
  const gradient = fit.slice(plain, plain + n);
  const steep = Math.hypot(...gradient);
  const curvature = fit[plain + n];
  const radius = Math.sqrt(squares.reduce((sum, x) => sum + x, 0) / squares.length);
  let length = 2 * radius;
  if (curvature > 0) length = Math.min(length, steep / (2 * curvature));
  length *= 0.5 + random.uniform();
  return start.map((x, i) => Math.min(1, Math.max(0, x - (length * gradient[i]) / (steep || 1))));
}

/** Mean of the objectives: how far a place is from the best corner. */
function height(place: readonly number[]): number {
  return place.reduce((sum, x) => sum + x, 0) / place.length;
}

/** The place with these coordinates along the front and this height. */
function placeAt(along: readonly number[], high: number): number[] {
  const place = new Array<number>(along.length + 1).fill(high);
  for (const [j, v] of along.entries()) {
    const part = v / Math.sqrt((j + 1) * (j + 2));
    for (let i = 0; i <= j; i++) place[i] += part;
    place[j + 1] -= (j + 1) * part;
  }
  return place;
}

function predicted(coefficients: readonly number[], offset: readonly number[]): number {
  return offset.reduce((sum, v, j) => sum + coefficients[j + 1] * v, coefficients[0]);
}

/** Somewhere between the centre and its next neighbours, or a little beyond on the other side. */
function someOffset(offsets: readonly (readonly number[])[], random: RandomSource): number[] {
  const dimension = offsets[0].length;
  const sum = new Array<number>(dimension).fill(0);
  for (let part = 0; part < dimension; part++) {
    const neighbour = offsets[1 + Math.floor((2 * dimension + 2) * random.uniform())];
    const share = 1.3 * random.uniform() - 0.5;
    for (let j = 0; j < dimension; j++) sum[j] += share * neighbour[j];
  }
  return sum;
}

/** Of some offsets the one where a point at the height of the model would add most. */
function bestOffset(
  draw: () => number[],
  neighbours: readonly Member[],
  middle: readonly number[],
  coefficients: readonly number[],
): number[] {
  const corner = new Array<number>(middle.length + 1).fill(CORNER);
  let best = draw();
  let most = 0;
  for (let k = 0, offset = best; k < PLACES; k++, offset = draw()) {
    const along = middle.map((v, j) => v + offset[j]);
    const place = placeAt(along, predicted(coefficients, offset));
    if (place.some((x) => x >= CORNER)) continue;
    const whole = place.reduce((product, x) => product * (CORNER - x), 1);
    const taken = neighbours.map((member) => member.place.map((x, j) => Math.max(x, place[j])));
    const gain = whole - hypervolume(taken, corner);
    if (gain <= most) continue;
    most = gain;
    best = offset;
  }
  return best;
}

/** The points nearest to a place along the front, nearest first; at most `count` of the first `among`, only allowed ones. */
function nearest(
  { known, members, alongs }: FrontPopulation,
  middle: readonly number[],
  count: number,
  among = members.length,
): Member[] {
  const found: Member[] = [];
  const distances: number[] = [];
  const width = middle.length;
  for (let k = 0; k < among; k++) {
    let squared = 0;
    for (let j = 0; j < width; j++) squared += (alongs[width * k + j] - middle[j]) ** 2;
    if (found.length === count && squared >= distances[count - 1]) continue;
    if (known[k].violation > 0) continue;
    if (found.length === count) {
      found.pop();
      distances.pop();
    }
    let at = found.length;
    while (distances[at - 1] > squared) at--;
    found.splice(at, 0, known[k]);
    distances.splice(at, 0, squared);
  }
  return found;
}
