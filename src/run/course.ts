import type { Candidate } from '../crew/candidate.ts';
import { Crew } from '../crew/crew.ts';
import type { FinishJob } from '../crew/finish.ts';
import type { Job, Orders, ResultOf } from '../crew/messages.ts';
import { Workshop } from '../crew/workshop.ts';
import type { Aim } from '../score/aim.ts';
import type { Design } from '../score/design.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { Brief } from './brief.ts';
import type { JobMemory } from './journal.ts';
import type { Progress } from './progress.ts';
import { Pace } from './progress.ts';
import type { Again, Findings } from './quest.ts';
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
  /** As `asTheyAre`; those that meet the target as drawn and lose it in the cutting are refined for the aim, as cut. */
  keptInCutting(candidates: readonly Candidate[], aim: number): Promise<Design[]>;
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

/** Designs that cutting takes off the target and that are refined for that. */
const MOST_LOST = 6;

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

/** A design with the candidate and the aim that it came from. */
interface Finished extends Again {
  design: Design;
}

/** What to ask for a design that misses the target: first that it be met as cut, then more room. Null where neither helps. */
function repairOf({ design, candidate, aim, asCut }: Finished, task: Task): Again | null {
  const misses = missesOf(design, task);
  const only = misses.length === 1 && misses[0].limit === 'target.correction' ? misses[0].factor : 0;
  if (only === 0 || only > REPAIRABLE) return null;
  if (design.asDrawn && !asCut) return { candidate, aim, asCut: true };
  const room = { ...aim, correction: aim.correction / (only * REPAIR_ROOM) };
  return { candidate, aim: room, ...(asCut && { asCut }) };
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
  /** Refines what misses the target alone, and by a little, until it is met; all that was finished on the way. */
  const repaired = async (first: readonly Finished[]) => {
    const all: Design[] = [];
    let finished = first;
    for (let repair = 0; mayRepair && repair < REPAIRS; repair++) {
      const asked = finished.flatMap((one) => repairOf(one, brief.task) ?? []);
      if (asked.length === 0) break;
      const results = await rounds.again(asked);
      const found = results.flatMap(({ best }, i) =>
        best ? [{ ...asked[i], candidate: best.candidate }] : [],
      );
      if (found.length === 0) break;
      const designs = await asTheyAre(found.map(({ candidate }) => candidate));
      all.push(...designs);
      finished = found.map((one, i) => ({ ...one, design: designs[i] }));
    }
    return all;
  };
  const untilMet = async (k: number, count: number) => {
    const candidates = rounds.findings.best[k].slice(0, count).map(({ candidate }) => candidate);
    const designs = await asTheyAre(candidates);
    const aim = aims[k];
    return [
      ...designs,
      ...(await repaired(designs.map((design, i) => ({ design, aim, candidate: candidates[i] })))),
    ];
  };
  const keptInCutting = async (candidates: readonly Candidate[], k: number) => {
    const designs = await asTheyAre(candidates);
    const { correction } = brief.task.target;
    const lost = designs.flatMap((design, i): Finished[] => {
      const isLost =
        design.asDrawn && design.asDrawn.worst <= correction && worstOf(design.scores) > correction;
      return isLost ? [{ design, aim: aims[k], candidate: candidates[i] }] : [];
    });
    return [...designs, ...(await repaired(lost.slice(0, MOST_LOST)))];
  };
  const bounded = <D extends Design>(designs: readonly D[]) => withBounds(designs, brief.task, hands);
  return { findings: rounds.findings, asTheyAre, untilMet, keptInCutting, bounded };
}
