import { Certifier } from '../score/certifier.ts';
import type { Task } from '../score/task.ts';
import { inspectOutline } from '../shop/inspect.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { OutlineJudge } from './judgeOutline.ts';
import type { RankedDesign } from './ranking.ts';
import { missesOf } from './ranking.ts';

/**
 * The certified scores of an outline from outside, over every particle, wavelength and position of the brief. Its rank is 1
 * as long as it stands alone.
 */
export function scoreGiven(
  task: Task,
  given: GivenDesign,
  { judge, distanceM, fields }: OutlineJudge,
): RankedDesign {
  const { id, family, elements } = given;
  const { scores } = new Certifier(judge, fields).scoreOutline(elements, distanceM);
  const shop =
    task.shop === null ? { fits: true, notes: [], misfit: 0 } : inspectOutline(elements, task.shop);
  const design = { family, distanceM, elements, scores, fields, shop };
  return { ...design, id, rank: 1, meetsTarget: missesOf(design, task).length === 0 };
}

/** Designs by whether they meet the target, then by time, each with that place as its rank. */
export function rankGiven<T extends RankedDesign>(designs: readonly T[]): T[] {
  return [...designs]
    .sort(
      (a, b) => Number(b.meetsTarget) - Number(a.meetsTarget) || a.scores.snr.time_s - b.scores.snr.time_s,
    )
    .map((design, i) => ({ ...design, rank: i + 1 }));
}
