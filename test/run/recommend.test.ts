import { describe, expect, it } from 'vitest';
import type { Candidate } from '../../src/run/recommend.ts';
import { recommend } from '../../src/run/recommend.ts';
import { presetTask } from '../score/presetTasks.ts';

const task = await presetTask('size-range');

/** Made-up designs: scores as far as a recommendation asks for them. */
function design(id: string, timeS: number, worst: number, share?: number): Candidate {
  return {
    id,
    family: 'given',
    distanceM: 0.02,
    elements: [],
    fields: 'far',
    shop: { fits: true, notes: [], misfit: 0 },
    rank: 1,
    meetsTarget: worst <= task.target.correction,
    scores: {
      gain: 1,
      correction: { worst, rms: worst / 2 },
      lobe: { ratio: 0.05 },
      snr: { required: 1e6, time_s: timeS },
      area_m2: 1e-8,
      radius_m: 1e-4,
      areaOverFloor: 1,
    },
    ...(share !== undefined && { yield: share }),
  };
}

describe('recommend', () => {
  it('takes the fastest of those that most builds of keep the target', () => {
    const designs = [design('quick', 1e-3, 0.0099, 0.4), design('sure', 2e-3, 0.004, 0.99)];
    expect(recommend(designs, task)).toEqual({
      id: 'sure',
      reason: 'of the 2 that meet the target it alone does so in 99 % of its builds',
    });
    expect(recommend([...designs, design('slow', 3e-3, 0.003, 1)], task).id).toBe('sure');
  });

  it('takes the one with the most good builds where none has enough', () => {
    const designs = [design('a', 1e-3, 0.0099, 0.4), design('b', 2e-3, 0.009, 0.7)];
    expect(recommend(designs, task)).toEqual({
      id: 'b',
      reason: 'of the 2 that meet the target it keeps it in most builds, 70 %',
    });
  });

  it('goes by time alone where yields are alike or were not asked for', () => {
    const alike = [design('a', 1e-3, 0.009, 0.5), design('b', 2e-3, 0.009, 0.52)];
    expect(recommend(alike, task).id).toBe('a');
    const unasked = [design('a', 3e-3, 0.009), design('b', 2e-3, 0.009)];
    expect(recommend(unasked, task)).toEqual({
      id: 'b',
      reason: 'it is the fastest of the 2 that meet the target',
    });
  });

  it('says what stands alone, and recommends nothing that misses the target', () => {
    expect(recommend([design('a', 1e-3, 0.009, 0.8), design('b', 1e-4, 0.5)], task).reason).toBe(
      'it alone meets the target, and 80 % of its builds do',
    );
    expect(recommend([design('a', 1e-3, 0.05), design('b', 1e-4, 0.02)], task)).toEqual({
      id: null,
      reason:
        'none meets the target; b comes nearest, with a worst correction of 2 % and its limits missed by a factor of 2',
    });
  });
});
