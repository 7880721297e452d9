import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';
import { missedLimits } from '../score/aim.ts';
import type { Judge } from '../score/judge.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { ParetoArchive } from '../search/paretoArchive.ts';
import type { Candidate, Trial } from './candidate.ts';
import { tryCandidate } from './candidate.ts';

/** Largest number of candidates that a job brings home for the front. */
const FRONT_SIZE = 24;

/** Differences that matter to the front: 5 % in correction, 3 % in time and radius. */
export const FRONT_RESOLUTION = [0.05, 0.03, 0.03];

/** Designs whose correction is beyond this many times the target are of no use to anyone. */
export const FRONT_REACH = 4;

/** What the front trades against each other, in logarithms: correction, time, radius. */
export function frontObjectives({ scores }: Candidate): [number, number, number] {
  return [Math.log(scores.correction.worst), Math.log(scores.snr.time_s), Math.log(scores.radius_m)];
}

/** Counts and keeps what one job tries: every candidate goes through here, whatever method asks. */
export class Trials {
  readonly judge: Judge;
  readonly space: SearchSpace;
  readonly variant: Variant;
  readonly aim: Aim;
  readonly #budget: number;
  readonly #shift: Float64Array | null;
  readonly #archive = new ParetoArchive<Candidate>(FRONT_RESOLUTION, FRONT_SIZE);
  #spent = 0;
  #best: { candidate: Candidate; value: number } | null = null;

  /** @param shift what is added to every candidate's ratios (see `cutShift`) */
  constructor(
    judge: Judge,
    space: SearchSpace,
    variant: Variant,
    aim: Aim,
    budget: number,
    shift: Float64Array | null = null,
  ) {
    this.judge = judge;
    this.space = space;
    this.variant = variant;
    this.aim = aim;
    this.#budget = budget;
    this.#shift = shift;
  }

  get spent(): number {
    return this.#spent;
  }

  get left(): number {
    return this.#budget - this.#spent;
  }

  /** The best for the aim. */
  get best(): { candidate: Candidate; value: number } | null {
    return this.#best;
  }

  /** Candidates within all limits that no other one beats in correction, time and radius. */
  get front(): Candidate[] {
    return this.#archive.members().map(({ payload }) => payload);
  }

  /** Tries one point. */
  try(vector: Float64Array): Trial {
    this.#spent++;
    const trial = tryCandidate(this.judge, this.space, this.variant, vector, this.aim, this.#shift);
    const { candidate, value } = trial;
    if (candidate) {
      if (this.#best === null || value < this.#best.value) this.#best = { candidate, value };
      const { task } = this.judge;
      const isWithin = candidate.scores.correction.worst <= FRONT_REACH * task.target.correction;
      if (isWithin && missedLimits(candidate.scores, candidate.misfit, task).length === 0) {
        this.#archive.add(frontObjectives(candidate), candidate);
      }
    }
    return trial;
  }
}
