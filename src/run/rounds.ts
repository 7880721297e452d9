import type { Candidate } from '../crew/candidate.ts';
import type { Crew } from '../crew/crew.ts';
import type { ExploreJob, ExploreResult } from '../crew/explore.ts';
import { FRONT_REACH, FRONT_RESOLUTION, frontObjectives } from '../crew/trials.ts';
import { missedLimits } from '../score/aim.ts';
import { ParetoArchive } from '../search/paretoArchive.ts';
import { FrontCredit } from './frontCredit.ts';
import { FrontHistory } from './frontHistory.ts';
import type { Again, Findings, Quest, RoundsProgress } from './quest.ts';
import { maskJobs, seedsOf } from './seeding.ts';
import { Standing } from './standing.ts';

/** Shares of the budget that the seeds and the first look get; laps of digging and refining share the rest. */
const SHARES = { seed: 0.25, scout: 0.15 };

/** Share of the budget that is kept for refining once more what finer judging finds a little beyond the target. */
const RESERVE = 0.08;

/** Laps that the budget is planned for, and the most there are where refinement settles early. */
const LAPS = 3;
const MOST_LAPS = 12;

/** Share of a lap that goes to whole fronts, where several aims ask for one; measured by `bench/realFronts.ts`. */
const SPREAD_SHARE = 0.4;

/** Corrections up to this many times what is aimed for count as met: repairs do the rest. */
const MET = 1.02;

/** Evaluations of one search for a variant's whole front. */
const SPREAD = 800;

/** Share of what is left of a lap that goes to new starts. */
const DIG_SHARE = 0.65;

/** Candidates refined for each aim, and the evaluations below which a refinement is not worth its start. */
const FEW = 4;
const LEAST_REFINE = 250;

/** Evaluations for one candidate that is refined once more. */
const AGAIN_BUDGET = 400;

/** And for one that cutting alone takes beyond what it was refined for: it is nearly there. */
const AS_CUT_BUDGET = 160;

/** Evaluations that a seed's descent may take. */
const SEED_BUDGET = 500;

/** Evaluations of one job when digging; a run of CMA-ES in a handful of dimensions comes to rest in about as many. */
const DIG = 1200;

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
  readonly #onProgress: (progress: RoundsProgress) => void;
  readonly #best: Map<string, { candidate: Candidate; value: number }>[];
  readonly #archive = new ParetoArchive<Candidate>(FRONT_RESOLUTION, 60);
  readonly #standing: Standing;
  readonly #credit: FrontCredit;
  readonly #history: FrontHistory;
  #evaluations = 0;
  /** Those whose candidates are kept, in the order of the jobs. */
  #kept = 0;
  #stream = 0;
  #settled = false;

  constructor(quest: Quest, crew: Pick<Crew, 'do'>, onProgress: (progress: RoundsProgress) => void) {
    this.#quest = quest;
    this.#crew = crew;
    this.#onProgress = onProgress;
    this.#credit = new FrontCredit(quest.variants);
    this.#standing = new Standing(quest.variants, quest.aims[0]);
    this.#history = new FrontHistory(quest.candidates);
    this.#best = quest.aims.map(() => new Map());
  }

  /** Runs all rounds. When the crew is dismissed in between, what has been found stays in `findings`. */
  async run(): Promise<void> {
    const seeds = await this.#seeds();
    await this.#round([...seeds, ...this.#glances()]);
    for (let lap = 0; this.#left > 0.03 * this.#quest.candidates; lap++) {
      if (lap === MOST_LAPS) {
        this.#settled = true;
        return;
      }
      // Early laps leave something for later ones, which start from what is found by then.
      const share = this.#left / Math.max(1, LAPS - lap);
      const spread = this.#spreadShare * share;
      await this.#round(this.#dig(DIG_SHARE * (share - spread), lap === 0));
      await this.#round([...this.#refine((1 - DIG_SHARE) * (share - spread)), ...this.#spread(spread)]);
    }
  }

  /** Refines candidates once more for aims of their own, such as a correction that leaves more room. */
  async again(asked: readonly Again[]): Promise<ExploreResult[]> {
    const left = this.#quest.candidates - this.#evaluations;
    const share = left / asked.length;
    if (share < LEAST_LOOK) return [];
    const jobs = asked.map(({ candidate, aim, asCut }) => ({
      ...this.#job(candidate.variant, 0, Math.min(asCut ? AS_CUT_BUDGET : AGAIN_BUDGET, share)),
      aim,
      method: 'refine' as const,
      ...(asCut && { asCut }),
      from: candidate.vector,
    }));
    const results = await Promise.all(jobs.map((job) => this.#crew.do(job)));
    for (const { evaluations } of results) this.#evaluations += evaluations;
    return results;
  }

  get findings(): Findings {
    return {
      evaluations: this.#evaluations,
      best: this.#best.map((found) => [...found.values()].sort((a, b) => a.value - b.value)),
      front: this.#members(),
      settled: this.#settled,
      movedInLastQuarter: this.#history.movedInLastQuarter(this.#kept, this.#objectives()),
    };
  }

  #objectives(): (readonly number[])[] {
    return this.#archive.members().map(({ objectives }) => objectives);
  }

  /** Descents from what the least masks stand for. */
  async #seeds(): Promise<ExploreJob[]> {
    const budget = SHARES.seed * this.#quest.candidates;
    const jobs = maskJobs(this.#quest, budget);
    const results = await Promise.all(jobs.map((job) => this.#crew.do(job)));
    const seeds = seedsOf(this.#quest, jobs, results);
    return seeds.map(({ variant, vector }) => ({
      ...this.#job(variant, 0, Math.min(SEED_BUDGET, budget / seeds.length)),
      method: 'seed' as const,
      from: vector,
    }));
  }

  /** Every family gets the same share, split over its variants. */
  #glances(): ExploreJob[] {
    const { variants, candidates } = this.#quest;
    const families = [...new Set(variants.map(({ family }) => family))];
    const perFamily = (SHARES.scout * candidates) / families.length;
    // A budget too small for all variants looks at the first of each family.
    const most = Math.max(1, Math.floor(perFamily / LEAST_LOOK));
    return families.flatMap((name) => {
      const looked = variants.filter(({ family }) => family === name).slice(0, most);
      return looked.map(({ id }) => this.#job(id, 0, perFamily / looked.length));
    });
  }

  /**
   * New starts go to the variants that look best for the main aim, the better the more often; in the first lap every
   * family's best variant has its turn.
   */
  #dig(budget: number, everyFamily: boolean): ExploreJob[] {
    const ranked = this.findings.best[0].map(({ candidate }) => candidate.variant);
    if (ranked.length === 0) return [];
    const turns = everyFamily ? this.#firstOfFamily(ranked) : [];
    const count = Math.max(2, turns.length, Math.round(budget / DIG));
    for (let reach = 1; turns.length < count; reach++) {
      // 1, then 1 2, then 1 2 3 …: the first comes up most often, and every one in the end.
      turns.push(...ranked.slice(0, reach));
    }
    return turns.slice(0, count).map((variant, i) => {
      const aim = everyFamily ? 0 : i % this.#quest.aims.length;
      return { ...this.#job(variant, aim, budget / count), method: 'evolve' };
    });
  }

  /** Of variants in order of rank, those that are the first of their family. */
  #firstOfFamily(ranked: readonly string[]): string[] {
    const familyOf = new Map(this.#quest.variants.map(({ id, family }) => [id, family]));
    const seen = new Set<string | undefined>();
    return ranked.filter((id) => !seen.has(familyOf.get(id)) && seen.add(familyOf.get(id)));
  }

  /** The best candidates of every aim are refined from where they stand. */
  #refine(budget: number): ExploreJob[] {
    const { aims } = this.#quest;
    const perAim = Math.max(1, Math.min(FEW, Math.floor(budget / (LEAST_REFINE * aims.length))));
    const main = this.findings.best[0];
    return aims.flatMap((_, k) => {
      const own = this.findings.best[k];
      const starts = (own.length > 0 ? own : main).slice(0, perAim);
      return starts.map(({ candidate }) => ({
        ...this.#job(candidate.variant, k, budget / (perAim * aims.length)),
        method: 'refine' as const,
        from: candidate.vector,
      }));
    });
  }

  /** Whole fronts, of the variants that have moved the common front of late, from what is known of each. */
  #spread(budget: number): ExploreJob[] {
    const count = Math.round(budget / SPREAD);
    const ranked = this.findings.best[0].map(({ candidate }) => candidate.variant);
    return this.#credit.deal(count, ranked).map((id) => {
      const members = this.#members().filter(({ variant }) => variant === id);
      const bests = this.#best.flatMap((found) => found.get(id)?.candidate ?? []);
      const starts = [...members, ...bests].map(({ vector }) => vector);
      return { ...this.#job(id, 0, budget / count), method: 'spread' as const, starts };
    });
  }

  /** Until the target itself is met, all is spent on that. */
  get #spreadShare(): number {
    const { aims, spreadShare = SPREAD_SHARE } = this.#quest;
    return aims.length > 1 && this.#isTargetMet ? spreadShare : 0;
  }

  get #isTargetMet(): boolean {
    const { aims, task } = this.#quest;
    return [...this.#best[0].values()].some(
      ({ candidate: { scores, misfit } }) =>
        scores.correction.worst <= MET * aims[0].correction &&
        missedLimits(scores, misfit, task).length === 0,
    );
  }

  #members(): Candidate[] {
    return this.#archive.members().map(({ payload }) => payload);
  }

  /** What the rounds may still spend. */
  get #left(): number {
    return (1 - RESERVE) * this.#quest.candidates - this.#evaluations;
  }

  #job(variant: string, aim: number, budget: number): ExploreJob {
    return {
      kind: 'explore',
      variant,
      aim: this.#quest.aims[aim],
      budget: Math.floor(budget),
      seed: this.#quest.seed,
      stream: this.#stream++,
      method: 'glance',
    };
  }

  async #round(jobs: ExploreJob[]): Promise<void> {
    const worthwhile = jobs.filter(({ budget }) => budget > 0);
    const before = this.#members();
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
      this.#credit.note(before, this.#members());
    }
  }

  #keep(job: ExploreJob, { best, front, evaluations }: ExploreResult): void {
    for (const candidate of front) this.#offer(candidate);
    this.#kept += evaluations;
    this.#history.note(this.#kept, () => this.#objectives());
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

  #report(job: ExploreJob, result: ExploreResult): void {
    this.#standing.note(job, result);
    this.#onProgress({
      evaluations: this.#evaluations,
      candidates: this.#quest.candidates,
      best: this.#standing.best,
      families: this.#standing.families,
      variant: job.variant,
    });
  }
}
