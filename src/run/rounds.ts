import type { Candidate } from '../crew/candidate.ts';
import type { Crew } from '../crew/crew.ts';
import type { ExploreJob, ExploreResult } from '../crew/explore.ts';
import { frontObjectives } from '../crew/explore.ts';
import type { Variant } from '../outline/families/family.ts';
import type { Aim } from '../score/aim.ts';
import { missedLimits } from '../score/aim.ts';
import type { Task } from '../score/task.ts';
import { ParetoArchive } from '../search/paretoArchive.ts';

/** What a search is asked. */
export interface Quest {
  task: Task;
  variants: readonly Variant[];
  /** The first is the main one. */
  aims: readonly Aim[];
  candidates: number;
  seed: number;
}

/** How far a search has come. */
export interface Progress {
  evaluations: number;
  candidates: number;
  /** The best candidate for the main aim so far. */
  best: Candidate | null;
  /** What was worked on last. */
  variant: string;
}

/** What a search found, in candidates. */
export interface Findings {
  evaluations: number;
  /** For each aim the best candidates, one a variant, best first. */
  best: { candidate: Candidate; value: number }[][];
  /** Trade-offs of correction, time and radius within the brief's limits. */
  front: Candidate[];
}

/** Shares of the budget: looking everywhere, digging where it pays, and refining what was found. */
const SHARES = { scout: 0.35, dig: 0.35, refine: 0.3 };

/** Evaluations of one job when digging; a run of CMA-ES in a handful of dimensions comes to rest in about as many. */
const DIG = 1200;

/** Candidates whose correction is beyond this many times the target are of no use to anyone. */
const FRONT_REACH = 4;

/** Evaluations per variant below which a first look tells nothing. */
const LEAST_LOOK = 40;

/**
 * The course of a search: a first look at every variant, then new starts for the best of them, then refinement of the best
 * candidates for every aim. Jobs within a round do not depend on each other, and a round begins when the one before is
 * done, so that the outcome does not depend on the number of workers.
 */
export class Rounds {
  readonly #quest: Quest;
  readonly #crew: Pick<Crew, 'do'>;
  readonly #onProgress: (progress: Progress) => void;
  readonly #best: Map<string, { candidate: Candidate; value: number }>[];
  readonly #archive = new ParetoArchive<Candidate>([0.05, 0.03, 0.03], 60);
  #evaluations = 0;
  #stream = 0;
  /** The best for the main aim that a report has shown. */
  #shown: ExploreResult['best'] = null;

  constructor(quest: Quest, crew: Pick<Crew, 'do'>, onProgress: (progress: Progress) => void) {
    this.#quest = quest;
    this.#crew = crew;
    this.#onProgress = onProgress;
    this.#best = quest.aims.map(() => new Map());
  }

  /** Runs all rounds. When the crew is dismissed in between, what has been found stays in `findings`. */
  async run(): Promise<void> {
    await this.#round(this.#scout());
    await this.#round(this.#dig());
    await this.#round(this.#refine());
  }

  get findings(): Findings {
    return {
      evaluations: this.#evaluations,
      best: this.#best.map((found) => [...found.values()].sort((a, b) => a.value - b.value)),
      front: this.#archive.members().map(({ payload }) => payload),
    };
  }

  /** Every family gets the same share, split over its variants. */
  #scout(): ExploreJob[] {
    const { variants, candidates } = this.#quest;
    const families = new Set(variants.map(({ family }) => family));
    const perFamily = (SHARES.scout * candidates) / families.size;
    return variants.map((variant) => {
      const siblings = variants.filter(({ family }) => family === variant.family).length;
      return this.#job(variant.id, 0, Math.max(LEAST_LOOK, Math.floor(perFamily / siblings)));
    });
  }

  /** New starts go to the variants that look best for the main aim, the better the more often. */
  #dig(): ExploreJob[] {
    const ranked = this.findings.best[0].map(({ candidate }) => candidate.variant);
    if (ranked.length === 0) return [];
    const count = Math.max(2, Math.round(this.#left(SHARES.dig) / DIG));
    const jobs: ExploreJob[] = [];
    for (let lap = 1; jobs.length < count; lap++) {
      // 1, then 1 2, then 1 2 3 …: the first comes up most often, and every one in the end.
      for (let i = 0; i < Math.min(lap, ranked.length) && jobs.length < count; i++) {
        jobs.push(
          this.#job(ranked[i], jobs.length % this.#quest.aims.length, this.#left(SHARES.dig) / count),
        );
      }
    }
    return jobs;
  }

  /** The best candidates of every aim are refined from where they stand. */
  #refine(): ExploreJob[] {
    const { aims } = this.#quest;
    const left = this.#quest.candidates - this.#evaluations;
    const perAim = Math.max(1, Math.min(4, Math.floor(left / (500 * aims.length))));
    const main = this.findings.best[0];
    return aims.flatMap((_, k) => {
      const own = this.findings.best[k];
      const starts = (own.length > 0 ? own : main).slice(0, perAim);
      return starts.map(({ candidate }) => ({
        ...this.#job(candidate.variant, k, left / (perAim * aims.length)),
        from: { vector: candidate.vector, spread: 0.15 },
        polish: true,
      }));
    });
  }

  /** Budget left for a share of all candidates. */
  #left(share: number): number {
    return Math.max(0, Math.min(share * this.#quest.candidates, this.#quest.candidates - this.#evaluations));
  }

  #job(variant: string, aim: number, budget: number): ExploreJob {
    return {
      kind: 'explore',
      variant,
      aim: this.#quest.aims[aim],
      budget: Math.floor(budget),
      seed: this.#quest.seed,
      stream: this.#stream++,
      polish: false,
    };
  }

  async #round(jobs: ExploreJob[]): Promise<void> {
    const worthwhile = jobs.filter(({ budget }) => budget > 0);
    const results: (ExploreResult | undefined)[] = worthwhile.map(() => undefined);
    try {
      await Promise.all(
        worthwhile.map(async (job, i) => {
          const result = await this.#crew.do(job);
          results[i] = result;
          this.#evaluations += result.evaluations;
          this.#report(job, result);
        }),
      );
    } finally {
      // Kept in the order of the jobs, not of their arrival; what a stopped round had finished counts as well.
      results.forEach((result, i) => {
        if (result) this.#keep(worthwhile[i], result);
      });
    }
  }

  #keep(job: ExploreJob, { best, front }: ExploreResult): void {
    for (const candidate of front) this.#offer(candidate);
    if (best === null) return;
    const found = this.#best[this.#quest.aims.indexOf(job.aim)];
    const held = found.get(job.variant);
    if (!held || best.value < held.value) found.set(job.variant, best);
  }

  #offer(candidate: Candidate): void {
    const { scores, misfit } = candidate;
    const { task } = this.#quest;
    if (scores.correction.worst > FRONT_REACH * task.target.correction) return;
    if (missedLimits(scores, misfit, task).length > 0) return;
    this.#archive.add(frontObjectives(candidate), candidate);
  }

  #report(job: ExploreJob, { best }: ExploreResult): void {
    const isMain = job.aim === this.#quest.aims[0];
    if (isMain && best && (this.#shown === null || best.value < this.#shown.value)) this.#shown = best;
    this.#onProgress({
      evaluations: this.#evaluations,
      candidates: this.#quest.candidates,
      best: this.#shown?.candidate ?? null,
      variant: job.variant,
    });
  }
}
