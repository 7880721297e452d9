import type { MaskJob } from '../crew/maskJob.ts';
import type { Design } from '../score/design.ts';
import { hasDirection } from '../score/maskBound.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { Hands } from './remembering.ts';

/** Looks for the worst places for one design. */
const CUTS = 12;

/**
 * Designs with the least `areaOverFloor` that any mask could have at their distance, of their gain and worst correction; without,
 * where a bound would take longer than a search: directions, and sources of finite angle. */
export async function withBounds<D extends Design>(
  designs: readonly D[],
  task: Task,
  hands: Hands,
): Promise<D[]> {
  if (hasDirection(task) || task.light.sourceAngleRad) return [...designs];
  const results = await Promise.all(designs.map((design) => hands.do(jobFor(design))));
  return designs.map((design, i) => {
    const [found] = results[i].found;
    if (found === null) return design;
    return { ...design, scores: { ...design.scores, leastAreaOverFloor: found.areaOverFloor } };
  });
}

function jobFor({ distanceM, scores }: Design): MaskJob {
  return {
    kind: 'mask',
    masks: 'any',
    distanceM,
    asks: [{ gain: scores.gain, correction: worstOf(scores) }],
    cuts: CUTS,
  };
}
