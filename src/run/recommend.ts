import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { RankedDesign } from './ranking.ts';
import { missesOf } from './ranking.ts';

/** A design beside others, with the share of its builds that meets the target where that was asked for. */
export type Candidate = RankedDesign & { yield?: number };

/** What to take of several designs, and why, in one sentence without full stop. */
export interface Recommendation {
  id: string | null;
  reason: string;
}

/** A yield that is as good as any other, for choosing by other things. */
const GOOD_YIELD = 0.95;

/** Yields that differ by less are alike: two thousand builds tell no more. */
const ALIKE = 0.03;

/**
 * Recommends one of several designs: of those that meet the target the fastest whose yield is good, or else the one that most builds of
 * keep it; where none meets it, none, and which comes nearest.
 *
 * @param designs at least one
 */
export function recommend(designs: readonly Candidate[], task: Task): Recommendation {
  const meeting = designs.filter(({ meetsTarget }) => meetsTarget);
  if (meeting.length === 0) return { id: null, reason: nearestText(designs, task) };
  const best = Math.max(...meeting.map((design) => design.yield ?? 1));
  const enough = Math.min(GOOD_YIELD, best - ALIKE);
  const kept = meeting.filter((design) => (design.yield ?? 1) >= enough);
  const chosen = kept.reduce((a, b) => (b.scores.snr.time_s < a.scores.snr.time_s ? b : a));
  return { id: chosen.id, reason: reasonText(chosen, designs, meeting, kept) };
}

function reasonText(
  chosen: Candidate,
  designs: readonly Candidate[],
  meeting: readonly Candidate[],
  kept: readonly Candidate[],
): string {
  const { yield: share } = chosen;
  const ofBuilds = share === undefined ? '' : `, and ${percent(share)} of its builds do`;
  if (meeting.length === 1) {
    const others = designs.length === 1 ? 'it meets the target' : 'it alone meets the target';
    return `${others}${ofBuilds}`;
  }
  if (share === undefined) return `it is the fastest of the ${meeting.length} that meet the target`;
  if (kept.length === 1 && share < GOOD_YIELD) {
    return `of the ${meeting.length} that meet the target it keeps it in most builds, ${percent(share)}`;
  }
  const among =
    kept.length === meeting.length
      ? `the ${meeting.length} that meet the target`
      : `the ${kept.length} that meet the target in most builds`;
  return kept.length === 1
    ? `of the ${meeting.length} that meet the target it alone does so in ${percent(share)} of its builds`
    : `it is the fastest of ${among}${ofBuilds}`;
}

function nearestText(designs: readonly Candidate[], task: Task): string {
  const ranked = designs
    .map((design) => ({ design, factor: Math.max(...missesOf(design, task).map(({ factor }) => factor)) }))
    .sort((p, q) => p.factor - q.factor);
  const { design, factor } = ranked[0];
  const worst = Number((100 * worstOf(design.scores)).toPrecision(4));
  return `none meets the target; ${design.id} comes nearest, with a worst correction of ${worst} % and its limits missed by a factor of ${Number(factor.toPrecision(3))}`;
}

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(3))} %`;
}
