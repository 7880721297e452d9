import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { crowdingDistances, dominates, nonDominatedRanks } from '../../src/search/pareto.ts';

/** Points on a coarse grid, so that ties and repeats abound. */
function gridPoints(count: number, objectives: number, seed: number): number[][] {
  const random = randomStream(seed);
  return Array.from({ length: count }, () =>
    Array.from({ length: objectives }, () => Math.floor(6 * random.uniform())),
  );
}

/** By definition: peel off what nothing left dominates, again and again. */
function peeledRanks(points: number[][]): number[] {
  const ranks = points.map(() => 0);
  for (let rank = 1; ranks.includes(0); rank++) {
    const left = [...points.keys()].filter((k) => ranks[k] === 0);
    const front = left.filter((k) => !left.some((other) => dominates(points[other], points[k])));
    for (const k of front) ranks[k] = rank;
  }
  return ranks;
}

describe('nonDominatedRanks', () => {
  it('ranks a small set as by hand', () => {
    const points = [
      [1, 4],
      [2, 2],
      [4, 1],
      [3, 3],
      [2, 2],
      [4, 4],
      [Number.POSITIVE_INFINITY, 0],
      [Number.POSITIVE_INFINITY, 5],
    ];
    expect(nonDominatedRanks(points)).toEqual([1, 1, 1, 2, 1, 3, 1, 4]);
    expect(nonDominatedRanks([])).toEqual([]);
  });

  it.each([1, 2, 3, 4])('agrees with the definition for %i objectives', (objectives) => {
    for (let seed = 0; seed < 20; seed++) {
      const points = gridPoints(60, objectives, seed);
      expect(nonDominatedRanks(points)).toEqual(peeledRanks(points));
    }
  });

  it('moves with the points when they are shuffled, and keeps ranks under growing maps', () => {
    const points = gridPoints(80, 3, 5);
    const ranks = nonDominatedRanks(points);
    expect(nonDominatedRanks(points.toReversed())).toEqual(ranks.toReversed());
    expect(nonDominatedRanks(points.map(([a, b, c]) => [Math.exp(a), b ** 3, c - 9]))).toEqual(ranks);
  });

  it('takes ten thousand points, all of them one front or none', () => {
    const random = randomStream(1);
    const cloud = Array.from({ length: 10_000 }, () => [random.normal(), random.normal(), random.normal()]);
    const sphere = cloud.map((v) => v.map((x) => Math.abs(x) / Math.hypot(...v)));
    expect(nonDominatedRanks(sphere).every((rank) => rank === 1)).toBe(true);
    const chain = cloud.map((_, k) => [k, k, k]);
    expect(nonDominatedRanks(chain)).toEqual(chain.map((_, k) => k + 1));
    expect(Math.max(...nonDominatedRanks(cloud))).toBeGreaterThan(10);
  });

  it('refuses NaN and rows of other lengths', () => {
    expect(() =>
      nonDominatedRanks([
        [1, 2],
        [Number.NaN, 1],
      ]),
    ).toThrow('objectives[1]: found [NaN, 1]');
    expect(() => nonDominatedRanks([[1, 2], [1]])).toThrow('expected 2 numbers');
  });
});

describe('crowdingDistances', () => {
  const infinite = Number.POSITIVE_INFINITY;

  it('adds up the sides of the gap around each point', () => {
    // Deb et al. (2002), section III.B, by hand: spans 10 and 8.
    const points = [
      [0, 8],
      [9, 9],
      [10, 0],
      [4, 4],
      [5, 2],
    ];
    const found = crowdingDistances(points, [0, 3, 4, 2]);
    expect(found).toEqual([infinite, 5 / 10 + 6 / 8, 6 / 10 + 4 / 8, infinite]);
  });

  it('does not depend on the order of members', () => {
    const points = gridPoints(40, 3, 2);
    // Equal rows cannot be told apart: leave one of each.
    const members = [...points.keys()].filter(
      (k) => points.findIndex((p) => `${p}` === `${points[k]}`) === k,
    );
    const forward = crowdingDistances(points, members);
    expect(crowdingDistances(points, members.toReversed())).toEqual(forward.toReversed());
  });

  it('passes over an objective that is the same for all, or infinite for some', () => {
    const points = [
      [1, 0, infinite],
      [1, 1, 0],
      [1, 4, 1],
    ];
    expect(crowdingDistances(points, [0, 1, 2])).toEqual([infinite, 1, infinite]);
    expect(crowdingDistances(points, [1])).toEqual([infinite]);
  });
});
