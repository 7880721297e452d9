import type { Candidate } from '../crew/candidate.ts';
import { Crew } from '../crew/crew.ts';
import type { FinishJob } from '../crew/finish.ts';
import type { Orders } from '../crew/messages.ts';
import { Workshop } from '../crew/workshop.ts';
import type { Aim, Measure, Miss } from '../score/aim.ts';
import { aimValue, missedLimits } from '../score/aim.ts';
import type { Design } from '../score/design.ts';
import type { Task } from '../score/task.ts';
import { crowdingDistances, nonDominatedRanks } from '../search/pareto.ts';
import type { Brief } from './brief.ts';
import type { Findings, Progress } from './rounds.ts';
import { Rounds } from './rounds.ts';

/** A design of a front. */
export interface RankedDesign extends Design {
  /** `rings-2`: the family, and its number within the front. */
  id: string;
  /** 1 is the front; 2 would be if the front were taken away, and so on. */
  rank: number;
  meetsTarget: boolean;
}

export interface SearchResult {
  /** By rank, within a rank by time. */
  designs: RankedDesign[];
  evaluations: number;
  seconds: number;
  /** Set where the search was stopped before its budget was spent. */
  stopped: boolean;
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
}

export interface SearchOptions {
  /** Worker threads, 1 or more. */
  workers: number;
  onProgress?: (progress: Progress) => void;
  /** Ends the search early; what was found so far is still finished and ranked. */
  signal?: AbortSignal;
  /** Absolute path of the compiled worker, for tests that run from the sources. */
  workerEntry?: string;
}

/** Corrections that a search aims for, over the target: the front shows what more or less of it costs. */
const LADDER = [1, 0.3, 2.5];

/** A search aims a little below the target, so that finer judging leaves it met. */
const MARGIN = 0.99;

/** Most designs that a front keeps. */
const FRONT_SIZE = 24;

/** Candidates that are finished for `smallest`: if finer judging fails the best, the next may hold. */
const FINALISTS = 6;

/** Searches outlines and distances, and ranks what is worth having. */
export async function search(brief: Brief, options: SearchOptions): Promise<SearchResult> {
  const { correction } = brief.task.target;
  const aims: Aim[] = [
    ...LADDER.map((factor) => ({ measure: 'time' as const, correction: MARGIN * factor * correction })),
    { measure: 'radius', correction: MARGIN * correction },
  ];
  return withCrew(brief, options, aims, async (findings, finishAll, seconds, stopped) => {
    const designs = await finishAll([
      ...findings.front,
      ...findings.best.flatMap((found) => found.slice(0, 1)).map(({ candidate }) => candidate),
    ]);
    return {
      designs: rankFront(designs, brief.task),
      evaluations: findings.evaluations,
      seconds: seconds(),
      stopped,
    };
  });
}

/** Searches for the one design with the least `measure` that meets the target. */
export async function smallest(
  brief: Brief,
  measure: Measure,
  options: SearchOptions,
): Promise<SmallestResult> {
  const { task } = brief;
  const aim: Aim = { measure, correction: MARGIN * task.target.correction };
  return withCrew(brief, options, [aim], async (findings, finishAll, seconds, stopped) => {
    const finalists = findings.best[0].slice(0, FINALISTS).map(({ candidate }) => candidate);
    const designs = await finishAll(finalists);
    const target: Aim = { measure, correction: task.target.correction };
    const worth = (design: Design) => aimValue(design.scores, design.shop.misfit, target, task);
    const ranked = rankAll(designs, task).sort((a, b) => worth(a) - worth(b));
    const design = ranked.find(({ meetsTarget }) => meetsTarget) ?? null;
    const nearest = design ?? ranked[0] ?? null;
    return {
      design,
      nearest,
      misses: nearest ? missesOf(nearest, task) : [],
      evaluations: findings.evaluations,
      seconds: seconds(),
      stopped,
    };
  });
}

/** Every limit of the brief that a design misses, the correction included, the worst first. */
export function missesOf(design: Design, task: Task): Miss[] {
  const misses = missedLimits(design.scores, design.shop.misfit, task);
  const factor = design.scores.correction.worst / task.target.correction;
  if (factor > 1) misses.push({ limit: 'target.correction', factor });
  return misses.sort((a, b) => b.factor - a.factor);
}

async function withCrew<Result>(
  brief: Brief,
  options: SearchOptions,
  aims: Aim[],
  conclude: (
    findings: Findings,
    finishAll: (candidates: Candidate[]) => Promise<Design[]>,
    seconds: () => number,
    stopped: boolean,
  ) => Promise<Result>,
): Promise<Result> {
  const started = performance.now();
  const seconds = () => (performance.now() - started) / 1000;
  const { task, families } = brief;
  const orders: Orders = { task, families };
  // The variants' names are all that the main thread needs of the space.
  const workshop = new Workshop(orders);
  const crew = await Crew.start(options.workers, orders, options.workerEntry);
  const stop = () => void crew.dismiss();
  options.signal?.addEventListener('abort', stop, { once: true });
  try {
    const quest = { task, variants: workshop.variants, aims, ...brief.search };
    const rounds = new Rounds(quest, crew, options.onProgress ?? (() => {}));
    try {
      await rounds.run();
    } catch (error) {
      if (!options.signal?.aborted) throw error;
    }
    const stopped = options.signal?.aborted ?? false;
    const finishAll = (candidates: Candidate[]) => finishWith(stopped ? workshop : crew, candidates);
    return await conclude(rounds.findings, finishAll, seconds, stopped);
  } finally {
    options.signal?.removeEventListener('abort', stop);
    await crew.dismiss();
  }
}

/** Finishes candidates four at a time; a stopped crew's work is done in the main thread. */
async function finishWith(
  hands: { do(job: FinishJob): { designs: Design[] } | Promise<{ designs: Design[] }> },
  candidates: Candidate[],
): Promise<Design[]> {
  const jobs: FinishJob[] = [];
  for (let i = 0; i < candidates.length; i += 4) {
    jobs.push({ kind: 'finish', candidates: candidates.slice(i, i + 4) });
  }
  const results = await Promise.all(jobs.map((job) => hands.do(job)));
  return results.flatMap(({ designs }) => designs);
}

/** Ranks by correction, time and radius those designs that keep every other limit. */
function rankFront(designs: readonly Design[], task: Task): RankedDesign[] {
  const within = designs.filter(
    ({ scores, shop }) => shop.fits && missedLimits(scores, shop.misfit, task).length === 0,
  );
  return rankAll(thin(distinct(within)), task);
}

function objectives({ scores }: Design): number[] {
  return [scores.correction.worst, scores.snr.time_s, scores.radius_m];
}

/** One design of each that agree in all objectives. */
function distinct(designs: readonly Design[]): Design[] {
  const seen = new Set<string>();
  return designs.filter((design) => {
    const key = objectives(design)
      .map((value) => value.toPrecision(6))
      .join(' ');
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
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
function rankAll(designs: readonly Design[], task: Task): RankedDesign[] {
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
