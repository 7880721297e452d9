import type { BuildPlan } from '../score/buildPlan.ts';
import { readingCount } from '../score/buildPlan.ts';
import type { BuildReader } from '../score/buildReader.ts';
import { DEVIATIONS } from '../score/tolerances.ts';

/** Builds of one design to be read in full. */
export interface BuildsJob {
  kind: 'builds';
  plan: BuildPlan;
  /** Nine numbers a build (see `DEVIATIONS`). */
  deviations: Float64Array;
}

export interface BuildsResult {
  /** Ratios reading/extinction, build by build (see `BuildReader.read`). */
  ratios: Float64Array;
}

/** @param reader made for the job's plan */
export function readBuilds({ plan, deviations }: BuildsJob, reader: BuildReader): BuildsResult {
  const builds = deviations.length / DEVIATIONS.length;
  const readings = readingCount(plan);
  const ratios = new Float64Array(builds * readings);
  for (let b = 0; b < builds; b++) {
    const build = deviations.subarray(b * DEVIATIONS.length, (b + 1) * DEVIATIONS.length);
    reader.read(build, ratios.subarray(b * readings, (b + 1) * readings));
  }
  return { ratios };
}
