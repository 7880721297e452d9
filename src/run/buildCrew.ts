import { readBuilds } from '../crew/buildsJob.ts';
import { Crew } from '../crew/crew.ts';
import type { BuildPlan } from '../score/buildPlan.ts';
import { readingCount } from '../score/buildPlan.ts';
import type { BuildReader } from '../score/buildReader.ts';
import { DEVIATIONS } from '../score/tolerances.ts';

/** Reads builds in full, nine deviations each; `visit` gets them in their order, and may keep no array. */
export type ReadAll = (
  deviations: Float64Array,
  visit: (build: number, ratios: Float64Array) => void,
) => Promise<void>;

/** Builds of one job; a multiple of those that share their particles. */
const TOGETHER = 8;
/** Jobs on their way for each worker: readings of a hundred thousand builds must not all be held. */
const AHEAD = 2;

/**
 * Reads builds in this thread or on a crew of workers, which ends with the work. The readings do not depend on how many there are.
 *
 * @param workers 0 for none
 */
export async function withBuildCrew<T>(
  plan: BuildPlan,
  reader: BuildReader,
  workers: number,
  work: (readAll: ReadAll) => Promise<T>,
): Promise<T> {
  const crew = workers === 0 ? null : await Crew.start(workers, { task: plan.task, families: ['disc'] });
  const readings = readingCount(plan);
  const readAll: ReadAll = async (deviations, visit) => {
    const size = TOGETHER * DEVIATIONS.length;
    const jobs = Math.ceil(deviations.length / size);
    const doJob = (j: number) => {
      const job = {
        kind: 'builds' as const,
        plan,
        deviations: deviations.slice(j * size, (j + 1) * size),
      };
      return crew === null ? Promise.resolve(readBuilds(job, reader)) : crew.do(job);
    };
    const ahead = crew === null ? 1 : AHEAD * workers;
    const sent: ReturnType<typeof doJob>[] = [];
    try {
      for (let j = 0; j < jobs; j++) {
        while (sent.length < jobs && sent.length < j + ahead) sent.push(doJob(sent.length));
        const { ratios } = await sent[j];
        for (let b = 0; b * readings < ratios.length; b++) {
          visit(j * TOGETHER + b, ratios.subarray(b * readings, (b + 1) * readings));
        }
        // Let go of what was visited.
        delete sent[j];
      }
    } finally {
      for (const one of sent) one?.catch(() => {});
    }
  };
  try {
    return await work(readAll);
  } finally {
    await crew?.dismiss();
  }
}
