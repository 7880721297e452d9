import type { RandomSource } from '../base/random.ts';
import { randomStream } from '../base/random.ts';
import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';
import type { Judge } from '../score/judge.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { nelderMead } from '../search/nelderMead.ts';
import { RestartedCma } from '../search/restartedCma.ts';
import type { Candidate } from './candidate.ts';
import { drawCandidate } from './candidate.ts';
import { cutShift } from './cutShift.ts';
import { descend } from './descend.ts';
import { spread } from './spread.ts';
import { boxOf, drawStart } from './startPoints.ts';
import { Trials } from './trials.ts';

/** One piece of searching, done by one worker without talking to the others. */
export interface ExploreJob {
  kind: 'explore';
  variant: string;
  aim: Aim;
  /** Evaluations granted. */
  budget: number;
  seed: number;
  /** Stream of the seed that belongs to this job alone. */
  stream: number;
  /**
   * `glance`: descents from many starts. `evolve`: CMA-ES from start after start, then a descent from its best.
   * `refine`: descents and Nelder–Mead from `from`, at its distance and at neighbouring ones. `seed`: one descent from there.
   * `spread`: the whole front of correction, time and radius from `starts`.
   */
  method: 'glance' | 'evolve' | 'refine' | 'seed' | 'spread';
  /** Where to refine or seed from; a start of the variant's own if left out. */
  from?: number[];
  /** Whether to count what the shop's cutting does to the candidate `from`, for all that are tried. */
  asCut?: true;
  /** Good candidates of the variant for `spread` to begin with. */
  starts?: number[][];
}

export interface ExploreResult {
  evaluations: number;
  /** The best for the aim, with the value that was made small; null where nothing could be drawn. */
  best: { candidate: Candidate; value: number } | null;
  /** Candidates within all limits that no other one of this job beats in correction, time and radius. */
  front: Candidate[];
}

/** Share of a budget that evolution leaves to the descent after it. */
const DESCENT_SHARE = 0.2;

/** Differences in the logarithm of what is made small below this are not worth a generation: the descent finds them. */
const LEAST_GAIN = 1e-4;

/** First steps from a seed, over the variant's natural lengths. */
const SEED_STEP = 0.5;

/** Does one job within its budget. */
export function explore(job: ExploreJob, judge: Judge, space: SearchSpace): ExploreResult {
  const variant = space.variants.find(({ id }) => id === job.variant) as Variant;
  const shift = job.asCut && job.from ? shiftOf(judge, space, variant, job.from) : null;
  const trials = new Trials(judge, space, variant, job.aim, job.budget, shift);
  const random = randomStream(job.seed, job.stream);
  const from = Float64Array.from(job.from ?? drawStart(trials, random).start);
  if (job.method === 'glance') glance(trials, random);
  else if (job.method === 'evolve') evolve(trials, random);
  else if (job.method === 'spread') spread(trials, job.starts ?? [], random);
  else (job.method === 'seed' ? descendOnce : refine)(trials, from, random);
  return { evaluations: trials.spent, best: trials.best, front: trials.front };
}

function shiftOf(
  judge: Judge,
  space: SearchSpace,
  variant: Variant,
  from: readonly number[],
): Float64Array | null {
  const drawn = drawCandidate(judge, space, variant, from);
  return 'shape' in drawn ? cutShift(judge, drawn.shape, drawn.distanceM) : null;
}

/** Descents from start after start: a descent settles within a hundred evaluations or so. */
function glance(trials: Trials, random: RandomSource): void {
  while (trials.left > 0) {
    const { start, scales } = drawStart(trials, random);
    descend(trials, start, scales);
  }
}

/** CMA-ES with restarts until its share is spent; a descent sharpens the best. */
function evolve(trials: Trials, random: RandomSource): void {
  const { start, scales } = drawStart(trials, random);
  const budget = trials.left - Math.floor(trials.left * DESCENT_SHARE);
  const cma = new RestartedCma({
    nextStart: (source, run) => ({ start: run === 0 ? start : drawStart(trials, source).start, sigma: 1 }),
    budget,
    random,
    ...boxOf(trials),
    scale: scales,
    tolFun: LEAST_GAIN,
  });
  while (!cma.done) cma.tell(cma.ask().map((point) => trials.try(point).value));
  const { best } = trials;
  if (best && trials.left > 0) descend(trials, Float64Array.from(best.candidate.vector), scales);
}

/** One descent from a start that is known to be good. */
function descendOnce(trials: Trials, from: Float64Array, random: RandomSource): void {
  const { scales } = drawStart(trials, random);
  descend(
    trials,
    from,
    scales.map((scale) => SEED_STEP * scale),
  );
}

/** Descents from a candidate, walking along the distances while that helps; Nelder–Mead has the last word. */
function refine(trials: Trials, from: Float64Array, random: RandomSource): void {
  const { scales } = drawStart(trials, random);
  const steps = scales.map((scale) => 0.5 * scale);
  let at = descend(trials, from, steps);
  const place = at.length - 1;
  for (
    let stride = trials.space.distances.length > 1 ? 0.16 : 0;
    stride > 0.005 && trials.left > 0;
    stride /= 2
  ) {
    for (const sign of [1, -1]) {
      let improved = true;
      while (improved && trials.left > 0) {
        const before = trials.best?.value ?? Number.POSITIVE_INFINITY;
        const moved = at.slice();
        moved[place] = Math.min(1, Math.max(0, at[place] + sign * stride));
        const reached = descend(trials, moved, steps);
        improved = (trials.best?.value ?? before) < before - 1e-6;
        if (improved) at = reached;
      }
    }
  }
  const { best } = trials;
  if (best === null || trials.left <= 2 * at.length) return;
  nelderMead(
    (vector) => (trials.left > 0 ? trials.try(vector).value : best.value + 1),
    Float64Array.from(best.candidate.vector),
    {
      ...boxOf(trials),
      maxEvaluations: trials.left,
      step: Float64Array.from(best.candidate.vector, (x) => Math.max(1e-3 * Math.abs(x), 1e-4)),
      tolX: 1e-6,
      tolFun: 1e-6,
    },
  );
}
