import type { LinearModels } from '../numeric/linearModel.ts';
import type { BoundTools } from '../score/maskBound.ts';
import { MaskBounds } from '../score/maskBound.ts';
import type { MaskKind } from '../score/maskProgram.ts';
import type { MaskStep } from '../score/maskSteps.ts';
import { stepsOf } from '../score/maskSteps.ts';
import { radiusWithinLobe } from '../score/radiusWithinLobe.ts';
import type { Task } from '../score/task.ts';

/** The least masks of one distance, for several gains and corrections. */
export interface MaskJob {
  kind: 'mask';
  masks: MaskKind;
  distanceM: number;
  asks: readonly { gain: number; correction: number }[];
  /** Looks for the worst places for each of them at most: few for masks to begin a search with, more for a tight bound. */
  cuts: number;
  /**
   * Cells of the radius alone if left out. Whatever has a direction, rings and stars to begin a search with are drawn from such masks; a
   * bound for all masks then needs cells of the plane.
   */
  cells?: 'plane';
}

export interface MaskResult {
  /** In the order they were asked for; null where no mask keeps the correction. */
  found: (FoundMask | null)[];
}

/** A bound, and the mask that comes nearest to it. */
export interface FoundMask {
  gain: number;
  /** Proven: no mask has less (area / gain) over λz. */
  areaOverFloor: number;
  /** Taken off for finite cells and tables. */
  error: number;
  /** `steps` along the radius; none for cells of the plane. */
  mask: { areaOverFloor: number; worst: number | null; steps: MaskStep[] };
}

/** The loaded solver, and what all least masks of a task share. */
export interface MaskTools extends BoundTools {
  models: LinearModels;
}

/** Finds least masks for a task. */
export function findMasks(job: MaskJob, task: Task, tools: MaskTools): MaskResult {
  const { distanceM, asks, masks, cuts } = job;
  const cells = job.cells ?? 'radial';
  const radiusM = radiusWithinLobe(task, distanceM);
  const bounds = new MaskBounds(task, tools.models, tools, {
    distanceM,
    radiusM,
    kind: masks,
    cells,
  });
  try {
    const found = asks.map(({ gain, correction }) => {
      const { areaOverFloor, error, mask } = bounds.at(gain, correction, cuts);
      if (areaOverFloor === null || mask === null) return null;
      const steps = cells === 'radial' ? stepsOf(mask.shares, bounds.largestPhase) : [];
      return {
        gain,
        areaOverFloor,
        error,
        mask: { areaOverFloor: mask.areaOverFloor, worst: mask.worst, steps },
      };
    });
    return { found };
  } finally {
    bounds.dispose();
  }
}
