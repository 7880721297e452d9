import { formatQuantity } from '../base/quantity.ts';
import type { Design } from '../score/design.ts';
import type { Brief } from './brief.ts';
import type { CourseResult } from './course.ts';
import { hintsFor } from './hints.ts';

/** How a search ended, and what may take the next one further. */
export interface Ending {
  /** The candidates were spent; all laps were done before that; or the user interrupted it. */
  reason: 'spent' | 'settled' | 'interrupted';
  /** As `FrontHistory` says: 0.02 is 2 %. */
  movedInLastQuarter: number | null;
  /** Sentences without full stop, each beginning with a key of the brief. */
  hints: string[];
}

/** @param designs those that the search ends with */
export function endingOf(
  { stopped, settled, movedInLastQuarter }: Omit<CourseResult<never>, 'designs'>,
  brief: Brief,
  designs: readonly Design[],
): Ending {
  const reason = stopped ? 'interrupted' : settled ? 'settled' : 'spent';
  return { reason, movedInLastQuarter, hints: hintsFor(brief, designs, movedInLastQuarter) };
}

/** Why a search ended and how much its front still moved, in a sentence or two. */
export function endingText({ reason, movedInLastQuarter }: Ending, evaluations: number, candidates: number) {
  // Where no design keeps the limits, looking for the nearest comes on top.
  const tried =
    evaluations > candidates
      ? `${evaluations} candidates were tried, those for the nearest design counted`
      : `${evaluations} of ${candidates} candidates were tried`;
  // A share of the candidates is kept for designs that finer judging finds a little beyond the target: not all may need it.
  const kept = evaluations < candidates ? ', the others were kept for repairs' : '';
  const why = {
    spent: `The search ended because its candidates were spent: ${tried}${kept}.`,
    settled: `The search ended because every lap had settled: ${tried}.`,
    interrupted: `The search was interrupted: ${tried}.`,
  }[reason];
  if (movedInLastQuarter === null) return why;
  const share =
    movedInLastQuarter < 1e-4 ? 'less than 0.01 %' : formatQuantity(movedInLastQuarter, 'ratio', 2);
  return `${why} In their last quarter the front moved by ${share}.`;
}
