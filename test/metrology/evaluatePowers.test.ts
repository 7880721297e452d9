import { describe, expect, it } from 'vitest';
import { randomStream } from '../../src/base/random.ts';
import { draw } from '../../src/metrology/distribution.ts';
import { diametersWithin, equivalentDiameters, shownRange } from '../../src/metrology/equivalentDiameter.ts';
import type { Expectations } from '../../src/metrology/evaluatePowers.ts';
import { evaluatePowers } from '../../src/metrology/evaluatePowers.ts';
import type { Instrument } from '../../src/metrology/extinctionModel.ts';
import { extinctionInputs, extinctionModel } from '../../src/metrology/extinctionModel.ts';
import type { PowerReading } from '../../src/metrology/powerReading.ts';
import { uncertaintyBudget } from '../../src/metrology/uncertaintyBudget.ts';

const POWER_W = 2e-3;
const INSTRUMENT: Instrument = {
  irradianceWm2: 5e4,
  responsivityAW: 0.42,
  // 1 nW for each reading of 1 ms.
  noiseW2Hz: 2e-21,
  gain: { value: 2, standardUncertainty: 0.02, degreesOfFreedom: Number.POSITIVE_INFINITY, isFitted: false },
  correction: { kind: 'rectangular', mean: 0, half: 0.02 },
  distance: { atM: 0.02, slope: 10, curvature: 0 },
  wavelength: { atM: 6.35e-7, slope: 1e7, curvature: 0 },
  uncertainties: {
    averagingS: 1e-3,
    irradiance: 0.01,
    responsivity: 0.01,
    gain: 0.01,
    lightDrift: 1e-6,
    nonlinearity: 0.01,
    distanceM: 2e-5,
    wavelengthM: 1e-10,
  },
};
/** Square law with a dent: between 2.0 and 2.2 µm the curve falls. */
const DIAMETERS_UM = Array.from({ length: 81 }, (_, i) => 0.8 + 0.05 * i);
const SHOWN = DIAMETERS_UM.map(
  (d) => (d <= 2 ? d * d : d <= 2.2 ? 4 - 2 * (d - 2) : 3.6 + 3 * (d - 2.2)) * 1e-12,
);
const CURVE = {
  material: 'test',
  diametersM: Float64Array.from(DIAMETERS_UM, (d) => d * 1e-6),
  shownM2: Float64Array.from(SHOWN),
  rangeM: [1e-6, 4e-6] as [number, number],
};
const EXPECTED: Expectations = {
  coverage: 0.95,
  averagingS: 1e-3,
  powerW: POWER_W,
  lightOf: "the brief's",
  saturationW: 4e-3,
  curve: CURVE,
};

const reading = (
  line: number,
  withoutW: number,
  withW: number,
  more: Partial<PowerReading> = {},
): PowerReading => ({
  ...{ line, label: '', withoutW, withW, averagingS: null, reference: null, mistakes: [] },
  ...more,
});
/** A row of a particle that the instrument shows as `areaUm2`. */
const ofArea = (line: number, areaUm2: number, more: Partial<PowerReading> = {}) =>
  reading(line, POWER_W, POWER_W - areaUm2 * 1e-12 * 2 * 5e4, more);

describe('evaluatePowers', () => {
  it('recovers 1000 extinctions with the coverage that it states', () => {
    const random = randomStream(20);
    const inputs = extinctionInputs(INSTRUMENT, { withoutW: POWER_W, withW: POWER_W, averagingS: 1e-3 });
    const rows: PowerReading[] = [];
    const truths: number[] = [];
    // Each row by an instrument of its own, off its nominal values as far as is known of them.
    for (let line = 2; line < 1002; line++) {
      const [, , drift, bend, responsivity, irradiance, gain, distance, wavelength, correction] = inputs.map(
        ({ distribution }) => draw(distribution, random),
      );
      const truth = (1 + 9 * random.uniform()) * 1e-12;
      const settings = (1 + 10 * (distance - 0.02)) * (1 + 1e7 * (wavelength - 6.35e-7));
      const signal = truth * irradiance * gain * (1 + correction) * settings;
      const scale = responsivity / 0.42 / (1 + bend);
      const noise = () => 1e-9 * random.normal();
      rows.push(reading(line, POWER_W + noise(), POWER_W * (1 + drift) - signal * scale + noise()));
      truths.push(truth);
    }
    for (const coverage of [0.6827, 0.95]) {
      const found = evaluatePowers(rows, INSTRUMENT, { ...EXPECTED, coverage });
      const held = found.filter(({ extinction }, i) => {
        const { valueM2 = 0, expandedUncertaintyM2 = 0 } = extinction ?? {};
        return Math.abs(valueM2 - truths[i]) <= expandedUncertaintyM2;
      }).length;
      // Three and a half standard deviations of a count of 1000.
      expect(Math.abs(held / 1000 - coverage)).toBeLessThan(
        3.5 * Math.sqrt((coverage * (1 - coverage)) / 1000),
      );
    }
  });

  it('is the budget of each row', () => {
    const row = ofArea(2, 5, { averagingS: 4e-3 });
    const [{ extinction }] = evaluatePowers([row], INSTRUMENT, EXPECTED);
    const { withoutW, withW } = row;
    const budget = uncertaintyBudget(
      extinctionModel(INSTRUMENT),
      extinctionInputs(INSTRUMENT, { withoutW, withW, averagingS: 4e-3 }),
      0.95,
    );
    expect(extinction?.valueM2).toBe(budget.value);
    expect(extinction?.standardUncertaintyM2).toBe(budget.standardUncertainty);
    expect(extinction?.expandedUncertaintyM2).toBe(budget.expandedUncertainty);
    expect(budget.lines[0].standardUncertainty).toBeCloseTo(0.5e-9, 20);
  });

  it('counts a fitted gain by itself, with its degrees of freedom', () => {
    const gain = { value: 2, standardUncertainty: 0.2, degreesOfFreedom: 4, isFitted: true };
    const [{ extinction }] = evaluatePowers([ofArea(2, 5)], { ...INSTRUMENT, gain }, EXPECTED);
    expect(extinction?.degreesOfFreedom).toBeGreaterThanOrEqual(4);
    expect(extinction?.degreesOfFreedom).toBeLessThan(4.5);
    // t for 95 % and 4 degrees is 2.776.
    const ratio = (extinction?.expandedUncertaintyM2 ?? 0) / (extinction?.standardUncertaintyM2 ?? 1);
    expect(ratio).toBeCloseTo(2.776, 3);
    // Gain (over one standard uncertainty to either side), correction, noise of two readings, drift: all else is in the gain.
    const parts = [
      0.1 / (1 - 0.1 ** 2),
      0.02 / Math.sqrt(3),
      (Math.SQRT2 * 1e-9) / 5e-7,
      2e-9 / Math.sqrt(3) / 5e-7,
    ];
    expect((extinction?.standardUncertaintyM2 ?? 0) / 5e-12).toBeCloseTo(Math.hypot(...parts), 5);
  });

  it.each<[PowerReading, string, string[]]>([
    [ofArea(2, 3), 'good', []],
    [reading(2, Number.NaN, 1e-3, { mistakes: ['a is empty'] }), 'unusable', ['a is empty']],
    [reading(2, -1e-3, 1e-3), 'unusable', ['negative power without the particle']],
    [reading(2, 1e-3, -1e-9), 'unusable', ['negative power with the particle']],
    [reading(2, 0, 0), 'unusable', ['no light without the particle']],
    [reading(2, 4e-3, 2e-3), 'unusable', ['saturated without the particle']],
    [reading(2, 2e-3, 5e-3), 'unusable', ['saturated with the particle']],
    [
      ofArea(2, -3),
      'doubtful',
      ['more light with the particle than without', "outside of the design's range: too small"],
    ],
    [ofArea(2, 0.01), 'doubtful', ['below the noise', "outside of the design's range: too small"]],
    [ofArea(2, 30), 'doubtful', ["outside of the design's range: too large"]],
    [reading(2, 1.5e-3, 1.5e-3 - 3e-7), 'doubtful', ["light 25 % below the brief's"]],
  ])('marks %j', (row, grade, reasons) => {
    const [found] = evaluatePowers([row], INSTRUMENT, EXPECTED);
    expect([found.grade, found.reasons]).toEqual([grade, reasons]);
    expect(found.extinction === null).toBe(grade === 'unusable');
    // What was read stays as it was.
    expect(found.reading).toBe(row);
  });

  it('marks a row that is there twice, keeps the order, and tells labels apart', () => {
    const rows = [ofArea(2, 3), ofArea(3, 5), ofArea(4, 3), ofArea(5, 3, { label: 'b' })];
    const found = evaluatePowers(rows, INSTRUMENT, EXPECTED);
    expect(found.map(({ reading: { line } }) => line)).toEqual([2, 3, 4, 5]);
    expect(found.map(({ reasons }) => reasons)).toEqual([[], [], ['the same as line 2'], []]);
  });

  it('lets elements of both weights read what they may', () => {
    const found = evaluatePowers([reading(2, -1e-9, -4e-7)], INSTRUMENT, { ...EXPECTED, powerW: null });
    expect(found[0].grade).toBe('good');
  });
});

describe('equivalent diameters', () => {
  it('are one where the curve rises, and all of them where it ripples', () => {
    expect(equivalentDiameters(CURVE, 2.25e-12)[0]).toBeCloseTo(1.5e-6, 12);
    const several = equivalentDiameters(CURVE, 3.8e-12);
    expect(several).toHaveLength(3);
    expect(several[1]).toBeCloseTo(2.1e-6, 12);
    expect(equivalentDiameters(CURVE, 1e-13)).toEqual([]);
    // At a node itself, once.
    expect(equivalentDiameters(CURVE, SHOWN[3])).toHaveLength(1);
    expect(equivalentDiameters(CURVE, SHOWN[0])).toHaveLength(1);
  });

  it('have an interval that holds every diameter within the uncertainty', () => {
    const [least, most] = diametersWithin(CURVE, [3.7e-12, 3.9e-12]) ?? [0, 0];
    expect(least).toBeCloseTo(equivalentDiameters(CURVE, 3.7e-12)[0], 12);
    expect(most).toBeCloseTo(equivalentDiameters(CURVE, 3.9e-12).at(-1) ?? 0, 12);
    expect(diametersWithin(CURVE, [1e-14, 2e-14])).toBeNull();
    const all = diametersWithin(CURVE, [0, 1]) ?? [0, 0];
    expect(all[0]).toBeCloseTo(0.8e-6, 12);
    expect(all[1]).toBeCloseTo(4.8e-6, 12);
    expect(shownRange(CURVE)[0]).toBeCloseTo(1e-12, 20);
  });
});
