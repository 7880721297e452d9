import type { Candidate } from '../crew/candidate.ts';
import { Crew } from '../crew/crew.ts';
import type { FinishJob } from '../crew/finish.ts';
import type { Job, Orders, ResultOf } from '../crew/messages.ts';
import { Workshop } from '../crew/workshop.ts';
import type { Aim } from '../score/aim.ts';
import type { Design } from '../score/design.ts';
import type { Brief } from './brief.ts';
import type { JobMemory } from './journal.ts';
import type { Progress } from './progress.ts';
import { Pace } from './progress.ts';
import type { Findings } from './quest.ts';
import { missesOf } from './ranking.ts';
import type { Hands } from './remembering.ts';
import { remembering } from './remembering.ts';
import { Rounds } from './rounds.ts';
import { withBounds } from './withBounds.ts';

export interface CourseOptions {
  /** Worker threads, 1 or more. */
  workers: number;
  onProgress?: (progress: Progress) => void;
  /** Ends the search early; what was found so far is still finished and ranked. */
  signal?: AbortSignal;
  /** What has been done before an interruption, and where to write down what is done now. */
  memory?: JobMemory;
  /** Absolute path of the compiled worker, for tests that run from the sources. */
  workerEntry?: string;
}

/** How candidates become designs when the rounds are over. */
export interface Finish {
  findings: Findings;
  /** Draws and judges candidates finely, for better or worse. */
  asTheyAre(candidates: readonly Candidate[]): Promise<Design[]>;
  /** The same for the best `count` of an aim; those that finer judging finds a little beyond the target are refined with more room. */
  untilMet(aim: number, count: number): Promise<Design[]>;
  /** Says of every design how little area a mask could do with in its place. */
  bounded<D extends Design>(designs: readonly D[]): Promise<D[]>;
}

export interface CourseResult<D extends Design> {
  designs: D[];
  evaluations: number;
  seconds: number;
  /** Set where the search was stopped before its budget was spent. */
  stopped: boolean;
  /** As in `Findings`. */
  settled: boolean;
  movedInLastQuarter: number | null;
}

/** Times that a candidate beyond the target is refined once more, and how far beyond it may be for that. */
const REPAIRS = 3;
const REPAIRABLE = 1.3;

/** How much more than what was missed a repair leaves, so that the next certificate does not miss by a hair. */
const REPAIR_ROOM = 1.01;

/** Candidates of one finishing job. */
const BATCH = 3;

/** Runs a search from the first look to finished designs, with a crew of its own. */
export async function runCourse<D extends Design>(
  brief: Brief,
  aims: readonly Aim[],
  options: CourseOptions,
  conclude: (finish: Finish) => Promise<D[]>,
): Promise<CourseResult<D>> {
  const pace = new Pace(options.memory?.seconds ?? 0);
  const { task, families } = brief;
  const orders: Orders = { task, families };
  // The variants are what the main thread needs of it; it also finishes what a stopped crew has left.
  const workshop = new Workshop(orders);
  const crew = await Crew.start(options.workers, orders, options.workerEntry);
  const stop = () => void crew.dismiss();
  options.signal?.addEventListener('abort', stop, { once: true });
  // A signal that came before, or while the crew started, tells nobody any more.
  if (options.signal?.aborted) stop();
  try {
    const { variants, distances } = workshop.space;
    const quest = { task, variants, distances, aims, ...brief.search };
    const hands = options.memory ? remembered(crew, options.memory, pace) : crew;
    let last: Progress | null = null;
    const rounds = new Rounds(quest, hands, (progress) => {
      last = pace.timed(progress);
      options.onProgress?.(last);
    });
    await runRounds(rounds, options.signal);
    if (last !== null) options.onProgress?.({ ...(last as Progress), phase: 'judging', remainingS: null });
    const finishWith = (hands: Hands, mayRepair: boolean) =>
      conclude(finishing(rounds, brief, aims, hands, mayRepair));
    const designs = await untilStopped(
      () => finishWith(hands, true),
      () => finishWith(handsOf(workshop), false),
      options.signal,
    );
    const { evaluations, settled, movedInLastQuarter } = rounds.findings;
    const stopped = options.signal?.aborted ?? false;
    return { designs, evaluations, seconds: pace.elapsedS, stopped, settled, movedInLastQuarter };
  } finally {
    options.signal?.removeEventListener('abort', stop);
    await crew.dismiss();
  }
}

/** Runs the rounds to their end, or until the user stops them. */
async function runRounds(rounds: Rounds, signal: AbortSignal | undefined): Promise<void> {
  try {
    await rounds.run();
  } catch (error) {
    if (!signal?.aborted) throw error;
  }
}

/** Does a thing with the crew; where the user has dismissed that, before or meanwhile, does it without. */
async function untilStopped<Result>(
  withCrew: () => Promise<Result>,
  without: () => Promise<Result>,
  signal: AbortSignal | undefined,
): Promise<Result> {
  if (signal?.aborted) return without();
  try {
    return await withCrew();
  } catch (error) {
    if (signal?.aborted) return without();
    throw error;
  }
}

function remembered(crew: Crew, memory: JobMemory, pace: Pace): Hands {
  return remembering(
    crew,
    memory,
    () => pace.elapsedS,
    (result) => pace.recall('evaluations' in result ? result.evaluations : 0),
  );
}

function handsOf(workshop: Workshop): Hands {
  return { do: async <J extends Job>(job: J): Promise<ResultOf<J>> => workshop.do(job) };
}

function finishing(
  rounds: Rounds,
  brief: Brief,
  aims: readonly Aim[],
  hands: Hands,
  mayRepair: boolean,
): Finish {
  const asTheyAre = async (candidates: readonly Candidate[]) => {
    const jobs: FinishJob[] = [];
    for (let i = 0; i < candidates.length; i += BATCH) {
      jobs.push({ kind: 'finish', candidates: candidates.slice(i, i + BATCH) });
    }
    const results = await Promise.all(jobs.map((job) => hands.do(job)));
    return results.flatMap(({ designs }) => designs);
  };
  const untilMet = async (k: number, count: number) => {
    let candidates = rounds.findings.best[k].slice(0, count).map(({ candidate }) => candidate);
    let corrections = candidates.map(() => aims[k].correction);
    let designs = await asTheyAre(candidates);
    const all = [...designs];
    for (let repair = 0; mayRepair && repair < REPAIRS; repair++) {
      const asked = candidates.flatMap((candidate, i) => {
        const misses = missesOf(designs[i], brief.task);
        const only = misses.length === 1 && misses[0].limit === 'target.correction' ? misses[0].factor : 0;
        if (only === 0 || only > REPAIRABLE) return [];
        return [{ candidate, aim: { ...aims[k], correction: corrections[i] / (only * REPAIR_ROOM) } }];
      });
      if (asked.length === 0) break;
      const results = await rounds.again(asked);
      if (results.length === 0) break;
      candidates = results.flatMap(({ best }) => (best ? [best.candidate] : []));
      corrections = results.flatMap(({ best }, i) => (best ? [asked[i].aim.correction] : []));
      designs = await asTheyAre(candidates);
      all.push(...designs);
    }
    return all;
  };
  const bounded = <D extends Design>(designs: readonly D[]) => withBounds(designs, brief.task, hands);
  return { findings: rounds.findings, asTheyAre, untilMet, bounded };
}
