import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { correctionOf, LEAST_GAIN } from '../../src/score/correction.ts';

const worstAt = (ratios: readonly number[], gain: number) =>
  Math.max(...ratios.map((ratio) => Math.abs(ratio / gain - 1)));

describe('correctionOf', () => {
  it('takes a gain of one as it is', () => {
    const { gain, worst, rms } = correctionOf([0.97, 1, 1.02], 'one');
    expect(gain).toBe(1);
    expect(worst).toBeCloseTo(0.03, 12);
    // √((9 + 0 + 4)/3) %
    expect(rms).toBeCloseTo(Math.sqrt(13 / 3) / 100, 12);
  });

  it('takes out one factor where the gain is free', () => {
    const { gain, worst, rms } = correctionOf([1.9, 2.1, 2], 'free');
    expect(gain).toBeCloseTo(2, 12);
    expect(worst).toBeCloseTo(0.05, 12);
    expect(rms).toBeCloseTo(Math.sqrt(0.005 / 3), 12);
  });

  it('finds the gain that no other one beats, by trying them', () => {
    const random = randomStream(51);
    for (let turn = 0; turn < 200; turn++) {
      const centre = 4 * random.uniform();
      const ratios = Array.from(
        { length: 1 + Math.floor(6 * random.uniform()) },
        () => centre * (0.5 + random.uniform()),
      );
      const { gain, worst } = correctionOf(ratios, 'free');
      expect(gain).toBeGreaterThanOrEqual(LEAST_GAIN);
      expect(worst).toBeCloseTo(worstAt(ratios, gain), 12);
      const others = Array.from({ length: 401 }, (_, k) => worstAt(ratios, LEAST_GAIN + (6 * k) / 400));
      expect(Math.min(...others)).toBeGreaterThanOrEqual(worst - 1e-12);
    }
  });

  it('calibrates no more than a factor of a half away', () => {
    expect(LEAST_GAIN).toBe(0.5);
    expect(correctionOf([0.2, 0.21], 'free').gain).toBe(0.5);
    expect(correctionOf([0.2, 0.21], 'free').worst).toBeCloseTo(0.6, 12);
  });

  it('says that a reading below nothing is off by more than the whole, whatever the gain', () => {
    for (const ratios of [
      [-0.1, 2],
      [-3, -1],
      [-1, 0.5, 1],
    ]) {
      expect(correctionOf(ratios, 'free').worst).toBeGreaterThan(1);
      expect(correctionOf(ratios, 'one').worst).toBeGreaterThan(1);
    }
  });

  it('has no spread for one reading alone', () => {
    expect(correctionOf([1.7], 'free')).toEqual({ gain: 1.7, worst: 0, rms: 0 });
  });
});
