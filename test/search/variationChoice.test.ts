import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { VariationChoice } from '../../src/search/variationChoice.ts';

describe('VariationChoice', () => {
  it('starts without preference, and never gives one up', () => {
    const choice = new VariationChoice(4);
    expect([...choice.chances()]).toEqual([0.25, 0.25, 0.25, 0.25]);
    for (let round = 0; round < 50; round++) choice.record([{ way: 2, gain: 1 }]);
    const chances = choice.chances();
    expect(chances[2]).toBeCloseTo(0.94, 12);
    expect(Math.min(...chances)).toBeCloseTo(0.02, 12);
  });

  it('prefers by gain a point, not by number of points', () => {
    const choice = new VariationChoice(2);
    for (let round = 0; round < 50; round++) {
      choice.record([{ way: 0, gain: 2 }, ...Array.from({ length: 9 }, () => ({ way: 1, gain: 1 }))]);
    }
    expect(choice.chances()[0]).toBeGreaterThan(choice.chances()[1]);
  });

  it('forgets what paid once when nothing pays any more', () => {
    const choice = new VariationChoice(3);
    choice.record([{ way: 1, gain: 5 }]);
    for (let round = 0; round < 4; round++) choice.record([{ way: 1, gain: 0 }]);
    expect(choice.chances()[1]).toBeGreaterThan(0.9);
    choice.record([{ way: 0, gain: 0 }]);
    expect([...choice.chances()]).toEqual([1 / 3, 1 / 3, 1 / 3]);
  });

  it('draws as often as the chances say', () => {
    const choice = new VariationChoice(3);
    choice.record([
      { way: 0, gain: 1 },
      { way: 1, gain: 1 },
    ]);
    const random = randomStream(4);
    const counts = [0, 0, 0];
    for (let k = 0; k < 10_000; k++) counts[choice.draw(random)]++;
    for (const [k, chance] of choice.chances().entries()) {
      // Four standard deviations.
      const spread = 4 * Math.sqrt(10_000 * chance * (1 - chance));
      expect(Math.abs(counts[k] - 10_000 * chance)).toBeLessThan(spread);
    }
  });
});
