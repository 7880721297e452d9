import type { Aim, Measure, Miss } from '../score/aim.ts';
import { aimValue } from '../score/aim.ts';
import type { Design } from '../score/design.ts';
import type { Brief } from './brief.ts';
import type { CourseOptions } from './course.ts';
import { runCourse } from './course.ts';
import type { Ending } from './ending.ts';
import { endingOf } from './ending.ts';
import type { RankedDesign } from './ranking.ts';
import { missesOf, rankAll, rankFront } from './ranking.ts';

export interface SearchResult {
  /** By rank, within a rank by time. */
  designs: RankedDesign[];
  evaluations: number;
  seconds: number;
  /** Set where the search was stopped before its budget was spent. */
  stopped: boolean;
  ending: Ending;
}

export interface SmallestResult {
  /** The smallest design that meets the target, or null. */
  design: RankedDesign | null;
  /** The best that was found where none meets the target. */
  nearest: RankedDesign | null;
  /** The limits that `nearest` misses. */
  misses: Miss[];
  evaluations: number;
  seconds: number;
  stopped: boolean;
  ending: Ending;
}

/** Corrections that a search aims for, over the target: the front shows what more or less of it costs. */
const LADDER = [1, 0.3, 2.5];

/** A search aims a little below the target, so that finer judging leaves it met. */
const MARGIN = 0.99;

/** Candidates for the target itself that are finished for a front. */
const ON_TARGET = 3;

/** Candidates that are finished for `smallest`: if finer judging fails the best, the next may hold. */
const FINALISTS = 6;

/** Searches outlines and distances, and ranks what is worth having. */
export async function search(brief: Brief, options: CourseOptions): Promise<SearchResult> {
  const { correction } = brief.task.target;
  const aims: Aim[] = [
    ...LADDER.map((factor) => ({ measure: 'time' as const, correction: MARGIN * factor * correction })),
    { measure: 'radius', correction: MARGIN * correction },
  ];
  const course = await runCourse(brief, aims, options, async (finish) => {
    const onTarget = await finish.untilMet(0, ON_TARGET);
    const { front, best } = finish.findings;
    const others = aims.slice(1).flatMap((_, k) => best[k + 1].slice(0, 1));
    const rest = [...others, ...best[0].slice(ON_TARGET)].map(({ candidate }) => candidate);
    const all = [...onTarget, ...(await finish.keptInCutting([...front, ...rest], 0))];
    return finish.bounded(rankFront(all, brief.task));
  });
  const { designs, evaluations, seconds, stopped } = course;
  return { designs, evaluations, seconds, stopped, ending: endingOf(course, brief, designs) };
}

/** Searches for the one design with the least `measure` that meets the target. */
export async function smallest(
  brief: Brief,
  measure: Measure,
  options: CourseOptions,
): Promise<SmallestResult> {
  const { task } = brief;
  const aim: Aim = { measure, correction: MARGIN * task.target.correction };
  const target: Aim = { measure, correction: task.target.correction };
  const worth = ({ scores, shop }: Design) => aimValue(scores, shop.misfit, target, task);
  const course = await runCourse(brief, [aim], options, async (finish) => {
    const ranked = rankAll(await finish.untilMet(0, FINALISTS), task).sort((a, b) => worth(a) - worth(b));
    const chosen = ranked.find(({ meetsTarget }) => meetsTarget) ?? ranked[0];
    // It stands alone: the others that were judged do not number it.
    return chosen ? finish.bounded([{ ...chosen, id: `${chosen.family}-1`, rank: 1 }]) : [];
  });
  const [nearest = null] = course.designs;
  const design = nearest?.meetsTarget ? nearest : null;
  const { evaluations, seconds, stopped } = course;
  // Its front is a by-product, of which nothing is told.
  const ending = endingOf({ ...course, movedInLastQuarter: null }, brief, nearest ? [nearest] : []);
  const misses = nearest ? missesOf(nearest, task) : [];
  return { design, nearest, misses, evaluations, seconds, stopped, ending };
}
