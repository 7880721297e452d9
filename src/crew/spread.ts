import type { RandomSource } from '../base/random.ts';
import { missedLimits } from '../score/aim.ts';
import type { Outcome } from '../search/frontMember.ts';
import { minimiseFront } from '../search/multiObjective.ts';
import type { Trial } from './candidate.ts';
import { boxOf, drawStart } from './startPoints.ts';
import type { Trials } from './trials.ts';
import { FRONT_REACH, frontObjectives } from './trials.ts';

/** Points to breed from at first: jobs are short, and the starts are good already. */
const POPULATION = 16;

/** How far beyond its starts a job looks, over the variant's natural lengths. */
const AROUND = 2;

/**
 * Searches a variant's whole front of correction, time and radius at once, by hypervolume.
 *
 * @param starts vectors of good candidates of the variant; a start of its own where there are none
 */
export function spread(trials: Trials, starts: readonly (readonly number[])[], random: RandomSource): void {
  if (trials.left < 1) return;
  const whole = boxOf(trials);
  const { start, scales } = drawStart(trials, random);
  const known = starts.length > 0 ? starts.map((x) => Float64Array.from(x)) : [start];
  // Few of the points drawn from all of a variant's ranges have an outline at all.
  const lower = whole.lower.map((low, i) =>
    Math.max(low, Math.min(...known.map((x) => x[i])) - AROUND * scales[i]),
  );
  const upper = whole.upper.map((high, i) =>
    Math.min(high, Math.max(...known.map((x) => x[i])) + AROUND * scales[i]),
  );
  minimiseFront((x) => outcomeOf(trials, trials.try(x)), {
    objectives: 3,
    lower,
    upper,
    budget: trials.left,
    random,
    starts: known,
    population: POPULATION,
  });
}

/** What the search for a front is told: missed limits, and corrections of no use to anyone, are not allowed. */
function outcomeOf({ judge: { task } }: Trials, { candidate }: Trial): Outcome {
  if (candidate === null) return { objectives: new Array<number>(3).fill(Number.POSITIVE_INFINITY) };
  const { scores, misfit } = candidate;
  const misses = missedLimits(scores, misfit, task).map(({ factor }) => factor);
  const beyond = Math.max(1, scores.correction.worst / (FRONT_REACH * task.target.correction));
  const violation = [...misses, beyond].reduce((sum, factor) => sum + Math.log(factor), 0);
  return { objectives: frontObjectives(candidate), violation };
}
