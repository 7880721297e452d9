import type { RandomSource } from '../base/random.ts';
import { descended } from './frontDescent.ts';
import { beats, type Member } from './frontMember.ts';
import { modelled } from './frontModel.ts';
import type { FrontPopulation } from './frontPopulation.ts';

/** Makes a point of the unit cube out of a population. */
export type Variation = (population: FrontPopulation, random: RandomSource) => Float64Array;

/** The ways to make a new point; which pays depends on the problem and changes on the way, see `VariationChoice`. */
export const VARIATIONS: readonly Variation[] = [
  crossed,
  differential,
  downhill,
  (population, random) => modelled(population, random) ?? differential(population, random),
  (population, random) => descended(population, random) ?? differential(population, random),
];

/** Spread of crossed and of mutated coordinates: larger keeps them nearer to the parents. */
const CROSS_INDEX = 15;
const MUTATION_INDEX = 20;

/** Chance that a mutated coordinate is drawn anew: pieces of a front that were lost can be found again. */
const ANEW_CHANCE = 0.1;

/**
 * Simulated binary crossover of each coordinate with probability ½, then polynomial mutation of one coordinate or so.
 * Sources: Deb & Agrawal (1995), Complex Systems 9, 115; Deb & Goyal (1996), Comput. Sci. Informatics 26, 30.
 */
function crossed(population: FrontPopulation, random: RandomSource): Float64Array {
  const [a, b] = [population.worthy(random).unit, population.worthy(random).unit];
  return a.map((x, i) => {
    let child = x;
    if (random.uniform() < 0.5) {
      const u = random.uniform();
      const spread = (u < 0.5 ? 2 * u : 1 / (2 - 2 * u)) ** (1 / (CROSS_INDEX + 1));
      const side = random.uniform() < 0.5 ? 1 : -1;
      child = clamped((x + b[i] + side * spread * (x - b[i])) / 2);
    }
    if (random.uniform() * a.length >= 1) return child;
    return random.uniform() < ANEW_CHANCE ? random.uniform() : mutated(child, random.uniform());
  });
}

/** Polynomial mutation that never leaves [0, 1]. */
function mutated(x: number, u: number): number {
  const power = MUTATION_INDEX + 1;
  const below = 2 * u + (1 - 2 * u) * (1 - x) ** power;
  const above = 2 * (1 - u) + (2 * u - 1) * x ** power;
  return clamped(u < 0.5 ? x + below ** (1 / power) - 1 : x + 1 - above ** (1 / power));
}

/** Towards another good point, and along a difference of any two. (Storn & Price (1997), J. Global Optim. 11, 341.) */
function differential(population: FrontPopulation, random: RandomSource): Float64Array {
  const [a, b] = [population.worthy(random).unit, population.worthy(random).unit];
  const [c, d] = [population.any(random).unit, population.any(random).unit];
  const factor = 0.3 + 0.6 * random.uniform();
  return stepped(a, (i) => factor * (b[i] - a[i] + c[i] - d[i]), random);
}

/**
 * From a beaten point through the nearest that beats it, and beyond: differences between such pairs point downhill more
 * often than not. Coordinates that run into a bound stay there, so that optima on bounds are reached exactly.
 */
function downhill(population: FrontPopulation, random: RandomSource): Float64Array {
  const { beaten, front, members } = population;
  const loser = beaten[Math.floor(beaten.length * random.uniform())];
  const winner = loser && nearestThatBeats(loser, front.length > 0 ? front : members);
  if (!winner) return differential(population, random);
  const from = random.uniform() < 0.5 ? winner.unit : population.worthy(random).unit;
  const factor = 2 * random.uniform();
  return stepped(from, (i) => factor * (winner.unit[i] - loser.unit[i]), random);
}

function nearestThatBeats(loser: Member, members: readonly Member[]): Member | undefined {
  let nearest: Member | undefined;
  let least = Number.POSITIVE_INFINITY;
  for (const member of members) {
    if (!beats(member, loser)) continue;
    const squared = member.place.reduce((sum, x, j) => sum + (x - loser.place[j]) ** 2, 0);
    // What cannot be used has no place: then any will do.
    if (nearest !== undefined && !(squared < least)) continue;
    nearest = member;
    least = squared;
  }
  return nearest;
}

/** A step along all coordinates, or along some. */
function stepped(from: Float64Array, step: (i: number) => number, random: RandomSource): Float64Array {
  const share = random.uniform() < 0.5 ? 1 : random.uniform();
  const always = Math.floor(from.length * random.uniform());
  return from.map((x, i) => (i === always || random.uniform() < share ? clamped(x + step(i)) : x));
}

/** The nearest number from 0 to 1. */
function clamped(x: number): number {
  return Math.min(1, Math.max(0, x));
}
