import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { hypervolume } from '../../src/search/hypervolume.ts';
import { hypervolumeContributions } from '../../src/search/hypervolumeContributions.ts';
import { nonDominatedRanks } from '../../src/search/pareto.ts';

/** By definition: the hypervolume without each point. */
function byLeavingOut(front: number[][], reference: number[]): number[] {
  const whole = hypervolume(front, reference);
  return front.map((_, k) => whole - hypervolume(front.toSpliced(k, 1), reference));
}

describe('hypervolumeContributions', () => {
  it.each([
    [2, 6, 5],
    [2, 30, 1000],
    [3, 12, 4],
    [3, 12, 8],
    [3, 40, 12],
    [3, 60, 1e6],
  ])(
    'is what is lost without each point: %i objectives, %i points on a grid of %i',
    (objectives, count, grid) => {
      const random = randomStream(11);
      for (let trial = 0; trial < 25; trial++) {
        const points = Array.from({ length: 6 * count }, () =>
          Array.from({ length: objectives }, () => Math.floor(grid * random.uniform()) / grid),
        );
        const ranks = nonDominatedRanks(points);
        // Repeats among them, and points beyond the reference.
        const front = points.filter((_, k) => ranks[k] === 1).slice(0, count);
        const reference = new Array<number>(objectives).fill(0.9);
        const found = hypervolumeContributions(front, reference);
        for (const [k, lost] of byLeavingOut(front, reference).entries())
          expect(found[k]).toBeCloseTo(lost, 13);
      }
    },
  );

  it('adds up to the whole where no two points share anything', () => {
    expect([...hypervolumeContributions([[0.25, 0.5, 0.75]], [1, 1, 1])]).toEqual([0.75 * 0.5 * 0.25]);
    expect([...hypervolumeContributions([], [1, 1])]).toEqual([]);
  });

  it('refuses what has no hypervolume', () => {
    expect(() => hypervolumeContributions([[1, 2, 3]], [1, 1])).toThrow('points[0]: found [1, 2, 3]');
  });
});
