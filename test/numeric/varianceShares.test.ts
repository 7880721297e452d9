import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { varianceShares } from '../../src/numeric/varianceShares.ts';

const { ishigami } = JSON.parse(readFileSync(new URL('../reference/shares.json', import.meta.url), 'utf8'));

/** Uniform points on [−π, π]. */
function angles(seed: number) {
  const streams = [randomStream(seed, 0), randomStream(seed, 1)];
  return (sample: 0 | 1, point: Float64Array) => {
    for (let i = 0; i < point.length; i++) point[i] = Math.PI * (2 * streams[sample].uniform() - 1);
  };
}

const function3 = ([x1, x2, x3]: Float64Array) =>
  Math.sin(x1) + ishigami.a * Math.sin(x2) ** 2 + ishigami.b * x3 ** 4 * Math.sin(x1);

describe('varianceShares', () => {
  it('finds the shares of the Ishigami function', () => {
    const [shares] = varianceShares(angles(1), 3, [[0], [1], [2]], (p) => [function3(p)], 1, 40_000);
    for (const [i, { alone, total }] of shares.entries()) {
      expect(Math.abs(alone - ishigami.alone[i])).toBeLessThan(0.02);
      expect(Math.abs(total - ishigami.total[i])).toBeLessThan(0.02);
    }
  });

  it('counts a group of inputs as one', () => {
    // What x1 and x3 make together is all that x2 does not.
    const [shares] = varianceShares(angles(2), 3, [[0, 2], [1]], (p) => [function3(p)], 1, 40_000);
    expect(Math.abs(shares[0].alone - (1 - ishigami.total[1]))).toBeLessThan(0.02);
    expect(Math.abs(shares[0].total - (1 - ishigami.alone[1]))).toBeLessThan(0.02);
  });

  it('gives each output its own shares, and none to one that does not vary', () => {
    const outputs = ([x1, x2]: Float64Array) => [x1, 3, 5e6 + x1 + 2 * x2];
    const [first, second, third] = varianceShares(angles(3), 2, [[0], [1]], outputs, 3, 20_000);
    expect(first[0].alone).toBeCloseTo(1, 1);
    expect(first[1].total).toBe(0);
    expect(second).toEqual([
      { alone: 0, total: 0 },
      { alone: 0, total: 0 },
    ]);
    // A sum: shares as 1 to 4, alone and in all alike, whatever its mean.
    expect(third[0].alone).toBeCloseTo(0.2, 1);
    expect(third[1].total).toBeCloseTo(0.8, 1);
  });
});
