import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import type { GainReading } from '../../src/metrology/gainFit.ts';
import { fitGain } from '../../src/metrology/gainFit.ts';

const NONE: ReadonlySet<number> = new Set();
const reading = (line: number, gain: number, independent: number, batch = 1, common = 0): GainReading => ({
  ...{ line, gain, independent, batch, common },
});

/** Readings that scatter as they say, in batches of 20 that share an error each. */
function drawn(seed: number, batches: number, common: number, truth = 2): GainReading[] {
  const random = randomStream(seed);
  return Array.from({ length: batches }, (_, b) => {
    const shift = common * random.normal();
    return Array.from({ length: 20 }, (_, i) =>
      reading(20 * b + i + 2, truth + shift + 0.05 * random.normal(), 0.05, b, common),
    );
  }).flat();
}

describe('fitGain', () => {
  it('is the weighted mean of independent readings', () => {
    const fit = fitGain([reading(2, 1.9, 0.1), reading(3, 2.2, 0.2)], 3, NONE);
    expect(fit.gain).toBeCloseTo((1.9 * 100 + 2.2 * 25) / 125, 12);
    expect(fit.chiSquared).toBeCloseTo(0.3 ** 2 / (0.1 ** 2 + 0.2 ** 2), 12);
    const birge = Math.sqrt(1.8);
    expect(fit.birge).toBeCloseTo(birge, 12);
    expect(fit.standardUncertainty).toBeCloseTo(birge / Math.sqrt(125), 12);
    expect(fit.degreesOfFreedom).toBe(1);
    // Two readings are equally far from their mean, once it is counted what each is of it.
    expect(fit.readings[0].residual).toBeCloseTo(-fit.readings[1].residual, 12);
    expect(fit.readings[0].residual ** 2).toBeCloseTo(fit.chiSquared, 12);
  });

  it('equals generalised least squares with the covariance of batches', () => {
    const readings = [
      reading(2, 1.9, 0.1, 1, 0.08),
      reading(3, 2.1, 0.2, 1, 0.08),
      reading(4, 2.05, 0.1, 2, 0.03),
    ];
    // By hand: V of the first batch, its inverse, and the sums over it.
    const [a, b, c] = [0.1 ** 2 + 0.08 ** 2, 0.2 ** 2 + 0.08 ** 2, 0.08 ** 2];
    const det = a * b - c * c;
    const rows = [(b - c) / det, (a - c) / det, 1 / (0.1 ** 2 + 0.03 ** 2)];
    const weight = rows[0] + rows[1] + rows[2];
    const gain = (rows[0] * 1.9 + rows[1] * 2.1 + rows[2] * 2.05) / weight;
    const [d1, d2, d3] = [1.9 - gain, 2.1 - gain, 2.05 - gain];
    const chiSquared = (b * d1 * d1 - 2 * c * d1 * d2 + a * d2 * d2) / det + d3 * d3 * rows[2];
    const fit = fitGain(readings, 3, NONE);
    expect(fit.gain).toBeCloseTo(gain, 12);
    expect(fit.chiSquared).toBeCloseTo(chiSquared, 10);
    expect(fit.standardUncertainty).toBeCloseTo(
      Math.max(1, Math.sqrt(chiSquared / 2)) / Math.sqrt(weight),
      12,
    );
  });

  it('does not average away what a batch shares', () => {
    const alone = fitGain(drawn(1, 1, 0.04), 4, NONE);
    expect(alone.standardUncertainty).toBeGreaterThan(0.04);
    const many = fitGain(drawn(1, 16, 0.04), 4, NONE);
    expect(many.standardUncertainty).toBeLessThan(0.015);
  });

  it('holds the truth as often as it says', () => {
    let within = 0;
    for (let seed = 1; seed <= 300; seed++) {
      const { gain, standardUncertainty } = fitGain(drawn(seed, 6, 0.03), 5, NONE);
      if (Math.abs(gain - 2) <= standardUncertainty) within++;
    }
    // 68 % and a little more, for the Birge ratio only widens; three standard deviations of a count of 300.
    expect(within / 300).toBeGreaterThan(0.68 - 0.081);
    expect(within / 300).toBeLessThan(0.75 + 0.081);
  });

  it('finds outliers, shows them, and leaves them out on purpose alone', () => {
    const good = drawn(3, 3, 0.01);
    const wild = good.map((one) =>
      one.line === 7 || one.line === 45 ? { ...one, gain: one.gain + 0.6 } : one,
    );
    const fit = fitGain(wild, 4, NONE);
    const outliers = fit.readings.filter(({ isOutlier }) => isOutlier);
    expect(outliers.map(({ line }) => line)).toEqual([7, 45]);
    expect(outliers.every(({ isUsed }) => isUsed)).toBe(true);
    expect([fit.used, fit.readings.length]).toEqual([60, 60]);
    expect(fit.birge).toBeGreaterThan(1.5);
    const omitted = fitGain(wild, 4, 'outliers');
    expect([omitted.used, omitted.withoutOutliers]).toEqual([58, null]);
    expect(fit.withoutOutliers?.gain).toBeCloseTo(omitted.gain, 12);
    expect(Math.abs(omitted.gain - 2)).toBeLessThan(3 * omitted.standardUncertainty);
    expect(fit.gain - omitted.gain).toBeGreaterThan(0.01);
    const named = fitGain(wild, 4, new Set([7]));
    expect(named.used).toBe(59);
    expect(named.readings.find(({ line }) => line === 7)).toMatchObject({ isUsed: false, isOutlier: false });
  });

  it('finds one that hides behind what its batch shares', () => {
    const batch = Array.from({ length: 9 }, (_, i) => reading(i + 2, 2 + 0.001 * (i % 3), 0.002, 1, 0.5));
    const fit = fitGain([...batch, reading(11, 2.1, 0.002, 1, 0.5)], 3, NONE);
    expect(fit.readings.filter(({ isOutlier }) => isOutlier).map(({ line }) => line)).toEqual([11]);
  });

  it('takes a single reading as it is', () => {
    const fit = fitGain([reading(2, 1.9, 0.1, 1, 0.05)], 3, NONE);
    expect(fit).toMatchObject({
      gain: 1.9,
      birge: null,
      degreesOfFreedom: Number.POSITIVE_INFINITY,
      used: 1,
    });
    expect(fit.standardUncertainty).toBeCloseTo(Math.hypot(0.1, 0.05), 12);
    expect(fit.readings[0].residual).toBe(0);
  });
});
