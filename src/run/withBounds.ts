import type { MaskJob } from '../crew/maskJob.ts';
import type { Design } from '../score/design.ts';
import { hasDirection } from '../score/maskBound.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { Hands } from './remembering.ts';

/** Looks for the worst places for one design. */
const CUTS = 12;

/** Designs that are told their bound where each takes seconds: in a brief with a direction, on cells of the plane. */
const MOST_DIRECTED = 4;

/**
 * Designs with the least `areaOverFloor` that any mask could have at their distance, of their gain and worst correction. Left
 * without: in a brief with a preferred direction all but the four fastest that keep the target's correction, or come nearest; all
 * where a source has a finite angle, or a focused beam a direction; and layouts that weigh an element below 0 or stand in several planes, of which
 * the bound is not.
 */
export async function withBounds<D extends Design>(
  designs: readonly D[],
  task: Task,
  hands: Hands,
): Promise<D[]> {
  const asked = toBound(designs, task);
  const results = await Promise.all(asked.map((design) => hands.do(jobFor(design, task))));
  const leasts = new Map(asked.map((design, i) => [design, results[i].found[0]]));
  return designs.map((design) => {
    const found = leasts.get(design);
    if (!found) return design;
    return { ...design, scores: { ...design.scores, leastAreaOverFloor: found.areaOverFloor } };
  });
}

function toBound<D extends Design>(all: readonly D[], task: Task): readonly D[] {
  if (task.light.sourceAngleRad) return [];
  const designs = all.filter(isMask);
  if (!hasDirection(task)) return designs;
  if (task.light.beam !== undefined) return [];
  const beyond = ({ scores }: Design) => Math.max(1, worstOf(scores) / task.target.correction);
  return designs
    .toSorted((p, q) => beyond(p) - beyond(q) || p.scores.snr.time_s - q.scores.snr.time_s)
    .slice(0, MOST_DIRECTED);
}

/** Whether a design reads as a mask would that lets through between nothing and all: what the bound is of. */
function isMask({ elements }: Design): boolean {
  return elements.every(
    ({ weight, distanceM, share }) =>
      weight > 0 && weight <= 1 && distanceM === undefined && share === undefined,
  );
}

function jobFor({ distanceM, scores }: Design, task: Task): MaskJob {
  return {
    kind: 'mask',
    masks: 'any',
    distanceM,
    asks: [{ gain: scores.gain, correction: worstOf(scores) }],
    cuts: CUTS,
    ...(hasDirection(task) && { cells: 'plane' as const }),
  };
}
