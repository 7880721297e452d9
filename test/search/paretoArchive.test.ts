import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { dominates, nonDominatedRanks } from '../../src/search/pareto.ts';
import { ParetoArchive } from '../../src/search/paretoArchive.ts';

/** Points above the sphere octant, most near it. */
function cloud(count: number, objectives: number, seed: number): number[][] {
  const random = randomStream(seed);
  return Array.from({ length: count }, () => {
    const v = Array.from({ length: objectives }, () => Math.abs(random.normal()));
    const length = Math.hypot(...v);
    return v.map((x) => (x / length) * (1 + 0.3 * random.uniform() ** 2) - 0.2);
  });
}

function shuffled<T>(items: T[], seed: number): T[] {
  const random = randomStream(seed);
  return items
    .map((item) => ({ item, key: random.uniform() }))
    .sort((a, b) => a.key - b.key)
    .map(({ item }) => item);
}

function filled(points: number[][], resolution: number, capacity = 300) {
  const archive = new ParetoArchive<string>(
    points[0].map(() => resolution),
    capacity,
  );
  for (const point of points) archive.add(point, `${point}`);
  return archive;
}

describe('ParetoArchive', () => {
  it('keeps exactly the front where boxes are fine and there is room', () => {
    const points = cloud(300, 3, 1);
    const ranks = nonDominatedRanks(points);
    const front = points.filter((_, k) => ranks[k] === 1);
    const members = filled(points, 1e-12).members();
    expect(new Set(members.map((m) => m.payload))).toEqual(new Set(front.map(String)));
    for (const member of members) expect(member.payload).toBe(`${member.objectives}`);
  });

  it.each([
    [2, 0.01, 300],
    [3, 0.02, 300],
    [3, 1e-4, 40],
    [3, 1e-9, 80],
  ])(
    'does not depend on the order: %i objectives, boxes of %f, room for %i',
    (objectives, side, capacity) => {
      const points = cloud(800, objectives, 2);
      const members = filled(points, side, capacity).members();
      expect(members.length).toBeGreaterThan(capacity / 8);
      expect(members.length).toBeLessThanOrEqual(capacity);
      for (const seed of [1, 2, 3]) {
        expect(filled(shuffled(points, seed), side, capacity).members()).toEqual(members);
      }
    },
  );

  it('keeps no dominated member, and turns away nothing that is better by a box', () => {
    const points = cloud(1500, 3, 3);
    const side = 0.05;
    const members = filled(points, side).members();
    for (const a of members) {
      expect(members.some((b) => dominates(b.objectives, a.objectives))).toBe(false);
    }
    for (const point of points) {
      const reached = members.some((m) => m.objectives.every((x, j) => x < point[j] + side));
      expect(reached).toBe(true);
    }
  });

  it('says whether a point was kept', () => {
    const archive = new ParetoArchive<string>([1, 1]);
    expect(archive.add([5.5, 5.5], 'first')).toBe(true);
    expect(archive.add([7, 7], 'worse')).toBe(false);
    expect(archive.add([5.5, 5.5], 'equal')).toBe(false);
    expect(archive.add([5.2, 5.4], 'nearer the corner of the box')).toBe(true);
    expect(archive.add([0, Number.POSITIVE_INFINITY], 'unusable')).toBe(false);
    expect(archive.add([9, 1], 'other end')).toBe(true);
    expect(archive.members().map((m) => m.payload)).toEqual(['nearer the corner of the box', 'other end']);
  });

  it('says what is wrong', () => {
    expect(() => new ParetoArchive([1, 0])).toThrow('resolution[1]: found 0');
    expect(() => new ParetoArchive([1, 1, 1], 7)).toThrow('capacity: found 7');
    const archive = new ParetoArchive([1e-300, 1]);
    expect(() => archive.add([1, 1], 0)).toThrow('too far out');
    expect(() => archive.add([1], 0)).toThrow('found 1 objectives, expected 2');
    expect(() => archive.add([Number.NaN, 1], 0)).toThrow('objectives [NaN, 1]');
  });
});
