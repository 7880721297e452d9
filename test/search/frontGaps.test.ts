import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { FrontGaps } from '../../src/search/frontGaps.ts';
import { alongFront } from '../../src/search/frontMember.ts';
import { hypervolume } from '../../src/search/hypervolume.ts';

/** Gaps measured in the objectives themselves. */
function plainGaps(objectives: number): FrontGaps {
  const gaps = new FrontGaps(objectives);
  gaps.measure(new Array<number>(objectives).fill(0), new Array<number>(objectives).fill(1));
  return gaps;
}

describe('FrontGaps', () => {
  it.each([
    ['two', 2, 0],
    ['three', 3, 0],
    ['two, many of them equal', 2, 8],
    ['three, many of them equal', 3, 8],
  ])('brings what hypervolume says, for any points of %s objectives', (_, objectives, steps) => {
    const random = randomStream(1);
    for (let round = 0; round < 20; round++) {
      const gaps = plainGaps(objectives);
      const reference = new Array<number>(objectives).fill(1.1);
      const points: number[][] = [];
      for (let k = 0; k < 30; k++) {
        const point = reference.map(() =>
          steps > 0 ? Math.floor(steps * random.uniform()) / steps : random.uniform(),
        );
        const before = hypervolume(points, reference);
        points.push(point);
        const filled = gaps.add(point);
        expect(gaps.brought(point, filled)).toBeCloseTo(hypervolume(points, reference) - before, 12);
        const isMatched = points.slice(0, -1).some((other) => other.every((x, j) => x <= point[j]));
        expect(filled.length === 0).toBe(isMatched);
      }
    }
  });

  it('gives the largest gap first, each once a round, and a missed one later', () => {
    const gaps = plainGaps(2);
    for (const point of [
      [0, 1],
      [0.55, 0.45],
      [1, 0],
    ]) {
      gaps.add(point);
    }
    const random = randomStream(1);
    const wide = alongFront([0.275, 0.725]);
    const narrow = alongFront([0.775, 0.225]);
    expect(gaps.take(random)?.[0]).toBeCloseTo(wide[0], 12);
    expect(gaps.take(random)?.[0]).toBeCloseTo(narrow[0], 12);
    gaps.endRound();
    // 0.275² halved twice by misses is less than 0.225² halved once.
    expect(gaps.take(random)?.[0]).toBeCloseTo(wide[0], 12);
    gaps.endRound();
    expect(gaps.take(random)?.[0]).toBeCloseTo(narrow[0], 12);
  });

  it('looks beyond an end that nothing bounds, and has nowhere to look before the first point', () => {
    const gaps = plainGaps(2);
    expect(gaps.take(randomStream(1))).toBeUndefined();
    gaps.add([0, 1]);
    const [first, second] = [gaps.take(randomStream(1)), gaps.take(randomStream(2))];
    const end = alongFront([0, 1])[0];
    const sides = [first, second].map((along) => Math.sign((along?.[0] ?? Number.NaN) - end));
    expect(sides.sort()).toEqual([-1, 1]);
  });
});
