import { FRONT_REACH } from '../crew/trials.ts';
import type { Miss } from '../score/aim.ts';
import { missedLimits } from '../score/aim.ts';
import type { Design } from '../score/design.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import { crowdingDistances, nonDominatedRanks } from '../search/pareto.ts';

export { FRONT_REACH };

/** A design of a front. */
export interface RankedDesign extends Design {
  /** `rings-2`: the family, and its number within the front. */
  id: string;
  /** 1 is the front; 2 would be if the front were taken away, and so on. */
  rank: number;
  meetsTarget: boolean;
}

/** Most designs that a front keeps. */
const FRONT_SIZE = 24;

/**
 * Every limit of the brief that a design misses, the worst first; the correction is the certified one. Where the far zone's
 * fields led, the exact ones must meet the target as well.
 */
export function missesOf(design: Design, task: Task): Miss[] {
  const misses = missedLimits(design.scores, design.shop.misfit, task);
  const { worst } = design.scores.correction;
  // Only samples are read in the exact fields: what these add there, they are taken to add to the certified worst.
  const added = design.fields === 'far' ? Math.max(0, (design.otherFields?.worst ?? 0) - worst) : 0;
  const factor = (worstOf(design.scores) + added) / task.target.correction;
  if (factor > 1) misses.push({ limit: 'target.correction', factor });
  return misses.sort((p, q) => q.factor - p.factor);
}

/** Ranks by correction, time and radius those designs that keep every other limit, and are not far off the target. */
export function rankFront(designs: readonly Design[], task: Task): RankedDesign[] {
  const within = designs.filter(
    ({ scores, shop }) =>
      worstOf(scores) <= FRONT_REACH * task.target.correction &&
      missedLimits(scores, shop.misfit, task).length === 0,
  );
  // Of two that are one to whoever chooses, the one that meets the target stays.
  const meets = within.map((design) => missesOf(design, task).length === 0);
  const front = thin(distinct([...within.filter((_, i) => meets[i]), ...within.filter((_, i) => !meets[i])]));
  return rankAll([...front, ...familyBests(within, front, task)], task);
}

/** For each family that is not on the front, what comes nearest to it: the fastest on target, or else the truest. */
function familyBests(designs: readonly Design[], front: readonly Design[], task: Task): Design[] {
  const worth = ({ scores }: Design) =>
    Math.log(scores.snr.time_s) + 10 * Math.log(Math.max(1, worstOf(scores) / task.target.correction));
  const present = new Set(front.map(({ family }) => family));
  const bests = new Map<string, Design>();
  for (const design of designs) {
    const held = bests.get(design.family);
    if (!present.has(design.family) && (!held || worth(design) < worth(held)))
      bests.set(design.family, design);
  }
  return [...bests.values()];
}

function objectives({ scores }: Design): number[] {
  return [worstOf(scores), scores.snr.time_s, scores.radius_m];
}

/** Designs that agree to this share in every objective are one to whoever chooses. */
const SAME = 0.03;

/** Leaves out designs that another one before them is as good as. */
function distinct(designs: readonly Design[]): Design[] {
  const kept: { design: Design; at: number[] }[] = [];
  for (const design of designs) {
    const at = objectives(design).map(Math.log);
    if (!kept.some((held) => held.at.every((value, j) => Math.abs(value - at[j]) < SAME)))
      kept.push({ design, at });
  }
  return kept.map(({ design }) => design);
}

/** Keeps the first ranks, and of the last one that still has room those that lie farthest from their neighbours. */
function thin(designs: readonly Design[]): Design[] {
  const values = designs.map((design) => objectives(design).map(Math.log));
  const ranks = nonDominatedRanks(values);
  const kept: number[] = [];
  for (let rank = 1; kept.length < FRONT_SIZE && ranks.includes(rank); rank++) {
    const members = [...ranks.keys()].filter((i) => ranks[i] === rank);
    const distances = crowdingDistances(values, members);
    const order = [...members.keys()].sort((a, b) => distances[b] - distances[a] || a - b);
    kept.push(...order.slice(0, FRONT_SIZE - kept.length).map((i) => members[i]));
  }
  return kept.sort((a, b) => a - b).map((i) => designs[i]);
}

/** Gives every design its rank and name. */
export function rankAll(designs: readonly Design[], task: Task): RankedDesign[] {
  const ranks = nonDominatedRanks(designs.map(objectives));
  const order = [...designs.keys()].sort(
    (a, b) => ranks[a] - ranks[b] || designs[a].scores.snr.time_s - designs[b].scores.snr.time_s || a - b,
  );
  const counts = new Map<string, number>();
  return order.map((i) => {
    const design = designs[i];
    const number = (counts.get(design.family) ?? 0) + 1;
    counts.set(design.family, number);
    return {
      ...design,
      id: `${design.family}-${number}`,
      rank: ranks[i],
      meetsTarget: missesOf(design, task).length === 0,
    };
  });
}
