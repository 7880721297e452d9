import { describe, expect, it } from 'vitest';
import type { ExploreJob } from '../../src/crew/explore.ts';
import { explore } from '../../src/crew/explore.ts';
import { FRONT_REACH, frontObjectives } from '../../src/crew/trials.ts';
import { missedLimits } from '../../src/score/aim.ts';
import { SEARCH_FINENESS } from '../../src/score/fineness.ts';
import { Judge } from '../../src/score/judge.ts';
import { searchSpace } from '../../src/score/searchSpace.ts';
import { hypervolume } from '../../src/search/hypervolume.ts';
import { nonDominatedRanks } from '../../src/search/pareto.ts';
import { presetTask } from '../score/presetTasks.ts';

const preset = await presetTask('size-range');
const task = {
  ...preset,
  detector: { ...preset.detector, distanceM: [0.02, 0.021] as [number, number] },
};
const judge = new Judge(task, SEARCH_FINENESS);
const space = searchSpace(task, ['disc', 'rings'], judge);
const job: ExploreJob = {
  kind: 'explore',
  variant: 'rings-2',
  aim: { measure: 'time', correction: 0.01 },
  budget: 300,
  seed: 3,
  stream: 5,
  method: 'spread',
};

describe('spread', () => {
  const first = explore({ ...job, method: 'glance' }, judge, space);
  const starts = first.front.map(({ vector }) => vector);
  const volumeOf = (rows: readonly (readonly number[])[]) =>
    hypervolume(rows, [FRONT_REACH * 0.01, 1e-3, 4e-4].map(Math.log));

  it('keeps or beats the front that it starts from, within all limits and the budget', () => {
    expect(starts.length).toBeGreaterThan(0);
    const { front, evaluations } = explore({ ...job, starts }, judge, space);
    expect(evaluations).toBe(job.budget);
    expect(volumeOf(front.map(frontObjectives))).toBeGreaterThan(
      1.02 * volumeOf(first.front.map(frontObjectives)),
    );
    expect(nonDominatedRanks(front.map(frontObjectives)).every((rank) => rank === 1)).toBe(true);
    for (const { scores, misfit } of front) {
      expect(missedLimits(scores, misfit, task)).toEqual([]);
      expect(scores.correction.worst).toBeLessThanOrEqual(FRONT_REACH * task.target.correction);
    }
  });

  it('gives the same for the same job, from a start of its own too, and never tries more than it may', () => {
    expect(explore({ ...job, starts }, judge, space)).toEqual(explore({ ...job, starts }, judge, space));
    for (const budget of [1, 7, 61]) {
      for (const variant of ['disc', 'rings-2']) {
        expect(explore({ ...job, variant, budget }, judge, space).evaluations).toBe(budget);
      }
    }
  });
});
