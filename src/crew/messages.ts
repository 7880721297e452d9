import type { ErrorCode, Problem } from '../base/errors.ts';
import type { FamilyName } from '../outline/families/family.ts';
import type { Task } from '../score/task.ts';
import type { BuildsJob, BuildsResult } from './buildsJob.ts';
import type { ExploreJob, ExploreResult } from './explore.ts';
import type { FinishJob, FinishResult } from './finish.ts';
import type { MaskJob, MaskResult } from './maskJob.ts';

/** What every worker is told when it starts. */
export interface Orders {
  task: Task;
  families: readonly FamilyName[];
}

/** The same, and the channel on which the workers of one crew hand tables to each other. */
export interface WorkerOrders extends Orders {
  channel: string;
}

export type Job = ExploreJob | FinishJob | MaskJob | BuildsJob;

export type Result = ExploreResult | FinishResult | MaskResult | BuildsResult;

/** The result that belongs to a kind of job. */
export type ResultOf<J extends Job> = J extends ExploreJob
  ? ExploreResult
  : J extends MaskJob
    ? MaskResult
    : J extends BuildsJob
      ? BuildsResult
      : FinishResult;

/** From a worker: what came of its job. An error's code, message and problems travel as plain data. */
export type Reply =
  | { result: Result }
  | { error: { code: ErrorCode; message: string; problems: readonly Problem[] } };
