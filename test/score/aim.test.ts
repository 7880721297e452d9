import { describe, expect, it } from 'vitest';
import type { Aim } from '../../src/score/aim.ts';
import {
  aimValue,
  limitFactors,
  limitsBeside,
  MEASURES,
  MISS_WEIGHT,
  measureOf,
  missedLimits,
} from '../../src/score/aim.ts';
import type { Scores } from '../../src/score/scores.ts';
import type { Task } from '../../src/score/task.ts';
import { presetTask } from './presetTasks.ts';

const SCORES: Scores = {
  gain: 2,
  correction: { worst: 0.008, rms: 0.004 },
  lobe: { ratio: 0.05 },
  snr: { required: 1e6, time_s: 4e-4 },
  area_m2: 4e-8,
  radius_m: 1e-4,
  areaOverFloor: 1.5,
};

/** Limits of the road-dust brief: radius 50 µm to 2 mm, lobe 10 %, time 1 ms, correction 1 %. */
const TASK: Task = await presetTask('road-dust');
const FREE: Task = { ...TASK, target: { ...TASK.target, lobe: null, timeS: null } };

const aim = (measure: Aim['measure'], correction = 0.01): Aim => ({ measure, correction });

describe('measureOf', () => {
  it('knows every measure in its SI unit', () => {
    expect(MEASURES.map((measure) => measureOf(SCORES, measure))).toEqual([1e-4, 4e-8, 2e-8, 4e-4]);
  });
});

describe('limits', () => {
  it('tell what share of each limit is used up', () => {
    expect(limitFactors(SCORES, 0.25, TASK)).toEqual([
      { limit: 'target.lobe', factor: 0.5 },
      { limit: 'target.time', factor: 0.4 },
      { limit: 'detector.radius', factor: 0.05 },
      { limit: 'detector.radius', factor: 0.5 },
      { limit: 'shop', factor: 1.25 },
    ]);
  });

  it('that the brief does not set are never missed', () => {
    const wild = { ...SCORES, lobe: { ratio: 50 }, snr: { required: 1, time_s: 1e9 } };
    expect(missedLimits(wild, 0, FREE)).toEqual([]);
    expect(missedLimits(wild, 0, TASK).map(({ limit }) => limit)).toEqual(['target.lobe', 'target.time']);
  });

  it('are missed from a hundred-thousandth beyond them: coordinates are written to a nanometre', () => {
    const at = (radius_m: number) => missedLimits({ ...SCORES, radius_m }, 0, TASK).map(({ limit }) => limit);
    expect(at(2e-3 * (1 + 0.9e-5))).toEqual([]);
    expect(at(2e-3 * (1 + 1.1e-5))).toEqual(['detector.radius']);
    expect(at(50e-6 * (1 - 0.9e-5))).toEqual([]);
    expect(at(50e-6 * (1 - 1.1e-5))).toEqual(['detector.radius']);
    expect(missedLimits(SCORES, 1e-3, TASK)).toEqual([{ limit: 'shop', factor: 1.001 }]);
  });

  it('on the measure itself is left out of an aim', () => {
    const names = (measure: Aim['measure']) =>
      limitsBeside(SCORES, 0, aim(measure), TASK).map(({ limit }) => limit);
    expect(names('time')).not.toContain('target.time');
    expect(names('area')).toContain('target.time');
  });
});

describe('aimValue', () => {
  it('is the logarithm of the measure where all limits hold', () => {
    for (const measure of MEASURES)
      expect(aimValue(SCORES, 0, aim(measure), TASK)).toBeCloseTo(Math.log(measureOf(SCORES, measure)), 12);
  });

  it('adds 2 L + 3 L² for the logarithm L of each factor by which a limit is missed', () => {
    const plain = aimValue(SCORES, 0, aim('area'), TASK);
    // Solved for L, where one limit is missed.
    const penalty = (scores: Partial<Scores>, misfit = 0, correction = 0.01) => {
      const added = aimValue({ ...SCORES, ...scores }, misfit, aim('area', correction), TASK) - plain;
      return (
        (Math.sqrt(MISS_WEIGHT.weight ** 2 + 4 * MISS_WEIGHT.bend * added) - MISS_WEIGHT.weight) /
        (2 * MISS_WEIGHT.bend)
      );
    };
    expect(penalty({}, 0, 0.002)).toBeCloseTo(Math.log(4), 12);
    expect(penalty({ lobe: { ratio: 0.3 } })).toBeCloseTo(Math.log(3), 12);
    expect(penalty({ snr: { required: 1, time_s: 2e-3 } })).toBeCloseTo(Math.log(2), 12);
    expect(penalty({ radius_m: 4e-3 })).toBeCloseTo(Math.log(2), 12);
    expect(penalty({ radius_m: 10e-6 })).toBeCloseTo(Math.log(5), 12);
    expect(penalty({}, 0.5)).toBeCloseTo(Math.log(1.5), 12);
  });

  it('has no gain in missing the correction: half the area for twice the correction is worse', () => {
    const smaller = { ...SCORES, area_m2: 2e-8, correction: { worst: 0.02, rms: 0.01 } };
    expect(aimValue(smaller, 0, aim('area'), TASK)).toBeGreaterThan(aimValue(SCORES, 0, aim('area'), TASK));
  });
});
