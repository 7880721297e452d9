import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { constantIndex } from '../../src/optics/indexModel.ts';
import type { GivenDesign } from '../../src/run/givenDesign.ts';
import { judgeOutline } from '../../src/run/judgeOutline.ts';
import { listReadings, summariseReadings } from '../../src/run/readings.ts';
import { rankGiven, scoreGiven } from '../../src/run/scoreGiven.ts';
import { distanceWarning, farZoneWarning, present } from '../../src/run/warnings.ts';
import { REPORT_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import type { Task } from '../../src/score/task.ts';

const TASK: Task = {
  light: {
    wavelengthM: 635e-9,
    linewidthM: 0,
    driftM: 0,
    polarizationRad: null,
    irradianceWm2: 5e4,
    intensityNoisePerHz: 0,
  },
  medium: constantIndex(1),
  particles: [{ diameterM: 2e-6, index: constantIndex(1.59), material: '1.59' }],
  placement: { offsetM: 10e-6, depthM: 0, spreadM: 0, crossing: null },
  detector: { distanceM: [0.01, 0.06], radiusM: [2e-5, 4e-4], responsivityAW: 0.42, noiseCurrentA: 2e-12 },
  target: { correction: 0.01, gain: 'one', lobe: null, timeS: null },
  shop: null,
};

const square = (half: number): GivenDesign => ({
  id: 'square',
  family: 'given',
  distanceM: null,
  elements: [{ weight: 1, rings: [Float64Array.from([-1, -1, 1, -1, 1, 1, -1, 1], (x) => half * x)] }],
  file: 'square.csv',
});

describe('judgeOutline', () => {
  it('judges within the brief as a judge of the brief itself does', () => {
    const given = square(2e-4);
    const judged = judgeOutline(TASK, given, 0.02);
    const own = new Judge(TASK, REPORT_FINENESS).scoreOutline(given.elements, 0.02).scores;
    const scores = scoreGiven(TASK, given, judged).scores;
    expect(scores.correction.worst).toBeCloseTo(own.correction.worst, 7);
    expect({ ...scores, correction: 0 }).toEqual({ ...own, correction: 0 });
  });

  it('takes the distance asked for, then the design’s own, then the brief’s', () => {
    expect(judgeOutline(TASK, { ...square(1e-4), distanceM: 0.03 }, 0.02).distanceM).toBe(0.02);
    expect(judgeOutline(TASK, { ...square(1e-4), distanceM: 0.03 }, null).distanceM).toBe(0.03);
    const fixed = { ...TASK, detector: { ...TASK.detector, distanceM: [0.04, 0.04] as [number, number] } };
    expect(judgeOutline(fixed, square(1e-4), null).distanceM).toBe(0.04);
    expect(() => judgeOutline(TASK, square(1e-4), null)).toThrow('found no distance');
  });

  it('refuses geometry that cannot be computed', () => {
    const deep = { ...TASK, placement: { ...TASK.placement, depthM: 2e-3 } };
    expect(() => judgeOutline(deep, square(1e-4), 3e-3)).toThrow("at least twice the brief's depth, 4 mm");
    const large = { ...TASK, particles: [{ ...TASK.particles[0], diameterM: 5e-3 }] };
    expect(() => judgeOutline(large, square(1e-4), 4e-3)).toThrow("the largest particle's diameter, 5 mm");
    expect(() => judgeOutline(TASK, square(0.9), 0.2)).toThrow('a half-angle of 80 deg');
    expect(() => judgeOutline(TASK, square(0.5), 1)).toThrow(RimwrightError);
  });
});

describe('readings', () => {
  it('are summed up as they are listed', () => {
    const given = square(2e-4);
    const { judge, distanceM } = judgeOutline(TASK, given, 0.02);
    const listed = listReadings(judge, given.elements, distanceM);
    const [summary] = summariseReadings(judge, given.elements, distanceM);
    expect(listed.length).toBeGreaterThan(20);
    expect(summary.first).toEqual(listed[0]);
    expect(summary.places).toBe(listed.length);
    const corrections = listed.map(({ correction }) => correction);
    expect(summary.mostRatio - 1).toBe(Math.max(...corrections));
    expect(summary.leastRatio - 1).toBe(Math.min(...corrections));
    const farthest = Math.max(...listed.map(({ position_m: [x, y] }) => Math.hypot(x, y)));
    expect(farthest).toBeCloseTo(10e-6, 15);
  });
});

describe('rankGiven', () => {
  it('puts designs that meet the target first, then the fastest', () => {
    const given = square(2e-4);
    const design = scoreGiven(TASK, given, judgeOutline(TASK, given, 0.02));
    const as = (id: string, meetsTarget: boolean, time_s: number) => ({
      ...design,
      id,
      meetsTarget,
      scores: { ...design.scores, snr: { required: 1, time_s } },
    });
    const ranked = rankGiven([as('a', false, 1), as('b', true, 3), as('c', true, 2)]);
    expect(ranked.map(({ id, rank }) => [id, rank])).toEqual([
      ['c', 1],
      ['b', 2],
      ['a', 3],
    ]);
  });
});

describe('farZoneWarning', () => {
  it('speaks where half of k(d/2)²/(2z) exceeds a tenth of the target', () => {
    // k(d/2)²/(2z) = 2π/635 nm · (1 µm)² / (2 · 20 mm) = 2.474e-4 for a sphere of 2 µm.
    const target = (correction: number) => ({ ...TASK, target: { ...TASK.target, correction } });
    expect(farZoneWarning(target(1.238e-3), 0.02)).toBeNull();
    expect(farZoneWarning(target(1.236e-3), 0.02)).toContain('by about 0.012 % of the extinction');
    expect(farZoneWarning(target(1.238e-3), 0.019)).toContain('particles of 2 µm at 19 mm');
    const water = { ...target(1.238e-3), medium: constantIndex(1.33) };
    expect(farZoneWarning(water, 0.02)).not.toBeNull();
    const mixed = {
      ...target(0.01),
      particles: [...TASK.particles, { ...TASK.particles[0], diameterM: 13e-6 }],
    };
    expect(farZoneWarning(mixed, 0.02)).toContain('particles of 13 µm');
  });

  it('stands beside a warning for a distance that the brief does not allow', () => {
    expect(distanceWarning(TASK, 0.01)).toBeNull();
    expect(distanceWarning(TASK, 0.0601)).toBe("The distance 60.1 mm is not the brief's 10 mm to 60 mm");
    expect(present([null, 'a', 'b', 'a'])).toEqual(['a', 'b']);
  });
});
