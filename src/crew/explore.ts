import type { RandomSource } from '../base/random.ts';
import { randomStream } from '../base/random.ts';
import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';
import { missedLimits } from '../score/aim.ts';
import type { Judge } from '../score/judge.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { CmaEs } from '../search/cmaEs.ts';
import { nelderMead } from '../search/nelderMead.ts';
import { ParetoArchive } from '../search/paretoArchive.ts';
import type { Candidate } from './candidate.ts';
import { tryCandidate } from './candidate.ts';

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
  /** Where to begin, and with which share of the usual spread; drawn by the variant if left out. */
  from?: { vector: number[]; spread: number };
  /** Give the last fifth of the budget to Nelder–Mead. */
  polish: boolean;
}

export interface ExploreResult {
  evaluations: number;
  /** The best for the aim, with the value that was made small; null where nothing could be drawn. */
  best: { candidate: Candidate; value: number } | null;
  /** Candidates within all limits that no other one of this job beats in correction, time and radius. */
  front: Candidate[];
}

/** Largest number of candidates that a job brings home for the front. */
const FRONT_SIZE = 24;

/** Differences that matter to the front: 5 % in correction, 3 % in time and radius. */
const FRONT_RESOLUTION = [0.05, 0.03, 0.03];

/** Share of a budget that the polish gets. */
const POLISH_SHARE = 0.2;

/** Runs CMA-ES from one start after the other until the budget is spent, then Nelder–Mead from the best if asked to. */
export function explore(job: ExploreJob, judge: Judge, space: SearchSpace): ExploreResult {
  const variant = space.variants.find(({ id }) => id === job.variant) as Variant;
  const random = randomStream(job.seed, job.stream);
  const box = boxOf(variant, space);
  const archive = new ParetoArchive<Candidate>(FRONT_RESOLUTION, FRONT_SIZE);
  let best: ExploreResult['best'] = null;
  let evaluations = 0;
  const value = (vector: Float64Array): number => {
    evaluations++;
    const { value, candidate } = tryCandidate(judge, space, variant, vector, job.aim);
    if (candidate) {
      if (best === null || value < best.value) best = { candidate, value };
      if (missedLimits(candidate.scores, candidate.misfit, judge.task).length === 0) {
        archive.add(frontObjectives(candidate), candidate);
      }
    }
    return value;
  };
  const forCma = job.polish ? Math.ceil(job.budget * (1 - POLISH_SHARE)) : job.budget;
  for (let run = 0; evaluations < forCma; run++) {
    const own = drawStart(variant, space, random);
    const given = run === 0 ? job.from : undefined;
    const start = given ? Float64Array.from(given.vector) : own.start;
    const cma = new CmaEs({
      start: start.map((x, i) => Math.min(Math.max(x, box.lower[i]), box.upper[i])),
      sigma: given?.spread ?? 1,
      scale: own.spreads,
      ...box,
      random,
      maxEvaluations: forCma - evaluations,
    });
    while (cma.stopReason() === undefined) {
      const points = cma.ask();
      // The last generation may be larger than what is left; the budget is a promise to the user.
      cma.tell(points.map((point) => (evaluations < job.budget ? value(point) : Number.POSITIVE_INFINITY)));
    }
  }
  const found = best as ExploreResult['best'];
  if (job.polish && found !== null && evaluations < job.budget) {
    nelderMead(value, Float64Array.from(found.candidate.vector), {
      ...box,
      maxEvaluations: job.budget - evaluations,
      step: smallSteps(found.candidate.vector),
    });
  }
  return { evaluations, best, front: archive.members().map(({ payload }) => payload) };
}

/** What the front trades against each other, in logarithms: correction, time, radius. */
export function frontObjectives({ scores }: Pick<Candidate, 'scores'>): [number, number, number] {
  return [Math.log(scores.correction.worst), Math.log(scores.snr.time_s), Math.log(scores.radius_m)];
}

/** Ranges of the parameters, and of the distance's place where there is a choice. */
function boxOf(variant: Variant, space: SearchSpace): { lower: Float64Array; upper: Float64Array } {
  const { parameters } = variant;
  return {
    lower: Float64Array.from([...parameters.map(({ low }) => low), ...place(space, 0)]),
    upper: Float64Array.from([...parameters.map(({ high }) => high), ...place(space, 1)]),
  };
}

/** A start of the variant's own, anywhere on the distance grid. */
function drawStart(variant: Variant, space: SearchSpace, random: RandomSource) {
  const { values, spreads } = variant.start(random);
  return {
    start: Float64Array.from([...values, ...place(space, random.uniform())]),
    spreads: Float64Array.from([...spreads, ...place(space, 0.2)]),
  };
}

/** A coordinate for the distance, or none where the brief fixes it. */
function place(space: SearchSpace, value: number): number[] {
  return space.distances.length > 1 ? [value] : [];
}

/** Steps of a thousandth, and of one ten-thousandth for parameters near zero; the distance has found its place. */
function smallSteps(vector: readonly number[]): Float64Array {
  return Float64Array.from(vector, (x) => Math.max(1e-3 * Math.abs(x), 1e-4));
}
