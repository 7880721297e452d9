import { randomStream } from '../base/random.ts';
import { varianceShares } from '../numeric/varianceShares.ts';
import { refractiveIndex } from '../optics/indexModel.ts';
import type { Fields } from '../reading/tableShelf.ts';
import type { BuildGain } from '../score/buildJudge.ts';
import { BuildJudge } from '../score/buildJudge.ts';
import { BuildReader, readingsOf } from '../score/buildReader.ts';
import { surfaceTerms } from '../score/buildSurface.ts';
import { worstOf } from '../score/scores.ts';
import type { Task } from '../score/task.ts';
import type { ToleranceName, Tolerances } from '../score/tolerances.ts';
import {
  DEVIATIONS,
  deviationsOf,
  drawStandard,
  farthestDeviations,
  noiseOf,
  TOLERANCE_NAMES,
  VARIABLES,
} from '../score/tolerances.ts';
import type { BriefTolerances } from './briefTolerances.ts';
import type { ReadAll } from './buildCrew.ts';
import { withBuildCrew } from './buildCrew.ts';
import type { SurfaceReport } from './fitBuilds.ts';
import { drawBuilds, fitSurface, STREAM, stretched, worstsInFull } from './fitBuilds.ts';
import type { GivenDesign } from './givenDesign.ts';
import { judgeOutline } from './judgeOutline.ts';
import type { NearCounts } from './nearTarget.ts';
import { nearCounts, shareMeeting, zonesOf } from './nearTarget.ts';
import { checkTolerances, edgeWarning, planBuilds } from './planBuilds.ts';
import { resolveTolerances } from './readTolerances.ts';
import { toleranceNeeds } from './toleranceNeeds.ts';
import { present } from './warnings.ts';

export interface YieldOptions {
  /** How many builds; 100 000 if left out. */
  builds?: number;
  seed?: number;
  /** Whether each build is calibrated; if left out where `target.gain` is free. */
  gain?: BuildGain;
  /** Worker threads; 0, if left out, reads all builds in this one. */
  workers?: number;
  /** In place of the design's own distance, metres. */
  distanceM?: number | null;
  fields?: Fields;
  /** Every build is read in full, in place of the surface. */
  inFull?: boolean;
  /** The yield alone, by a coarser surface: for comparing designs. */
  quick?: boolean;
  /** The yield that tolerances are tightened for; 0.95 if left out. */
  wanted?: number;
  onProgress?: (read: number, of: number) => void;
}

/** What one tolerance does to the yield. */
export interface ToleranceRow {
  name: ToleranceName;
  law: 'limits' | 'rms';
  /** In the SI unit of its name (see `TOLERANCE_NAMES`). */
  size: number;
  /** Shares of the variance of the worst correction. */
  worst: { alone: number; total: number };
  /** Shares of the variance of meeting the target or not. */
  miss: { alone: number; total: number };
  /** Yield if this one were nothing. */
  without: number;
  /** Size at which the yield is what is wanted, all others as they are; null where even nothing is not enough. */
  needed: number | null;
}

export interface Yield {
  distance_m: number;
  /** Of the outline. */
  radius_m: number;
  gain: { is: BuildGain; drawing: number };
  target: number;
  /** Worst correction of the drawing itself, certified. */
  drawing: number;
  builds: number;
  seed: number;
  /** Share of builds that meet the target, and its 95 % confidence interval: for so many builds, and so many of the near ones. */
  yield: number;
  interval: [low: number, high: number];
  /** Builds that the surface puts within its error of the target, how many of them were read in full, and of these came out otherwise; null where all were read. */
  near: NearCounts | null;
  /** Worst correction of builds: that of the middle one, and what 95 % stay below. */
  worst: { median: number; most95: number };
  /** Readings that judge each build. */
  readings: number;
  surface: SurfaceReport;
  /** The worst correction of each build, in their order. */
  worsts: Float64Array;
  wanted: number;
  /** Empty where `quick` was asked for. */
  tolerances: ToleranceRow[];
  /** What all tolerances together would have to be multiplied by; null where even nothing is not enough, or it was not asked for. */
  togetherNeeded: number | null;
  /** What the user should know of these builds. */
  warnings: string[];
}

/** Points of each of the two samples for shares; builds that tolerances are tightened with. */
const SHARE_POINTS = 8000;
const NEEDS_BUILDS = 20_000;
/** The nearer of two zones about the target, in rms of the surface's error; most builds of each that are read in full. */
const NEAREST = 1.5;
const ZONE_READ = { usual: 200, quick: 30 };

/**
 * How many builds of a design meet the target's correction: each differs from the drawing within the tolerances, and is judged over the
 * whole brief. What a brief calls offset, depth and drift is what every build must bear, wherever in it the particle and the light are.
 *
 * @throws RimwrightError `input` for tolerances that leave no instrument, or as `judgeOutline`
 */
export async function yieldOf(
  task: Task,
  given: GivenDesign,
  asked: BriefTolerances,
  options: YieldOptions = {},
): Promise<Yield> {
  const {
    builds = 100_000,
    seed = 1,
    workers = 0,
    distanceM = null,
    fields = 'far',
    wanted = 0.95,
  } = options;
  const quick = options.quick ?? false;
  const judged = judgeOutline(task, given, distanceM, null, fields);
  const planned = planBuilds(given, judged);
  const { gain, snr } = planned.scores;
  const target = task.target.correction;
  const tolerances = resolveTolerances(asked, task.shop, target, snr.time_s);
  const farthest = farthestDeviations(stretched(tolerances));
  checkTolerances(task, judged.distanceM, farthest);
  const plan = { ...planned.plan, farthest };

  const reader = new BuildReader(plan);
  const drawing = readingsOf(plan);
  reader.read(new Float64Array(DEVIATIONS.length), drawing);
  const gainIs = options.gain ?? (task.target.gain === 'free' ? 'recalibrated' : 'nominal');
  const judge = new BuildJudge(plan, gain, gainIs, drawing, reader.extinctionsM2());

  return withBuildCrew(plan, reader, workers, async (readAll) => {
    let total = 0;
    let done = 0;
    const read: ReadAll = (deviations, visit) => {
      total = Math.max(total, done + deviations.length / DEVIATIONS.length);
      return readAll(deviations, (build, ratios) => {
        visit(build, ratios);
        options.onProgress?.(++done, total);
      });
    };
    const terms = surfaceTerms(farthest, largestSizeParameter(task), task.light.wavelengthM, quick);
    const { surface, report } = await fitSurface(read, judge, tolerances, terms, seed, target, quick);
    const drawn = drawBuilds(tolerances, seed, STREAM.builds, builds);
    const ofSurface = (standard: Float64Array, sizes: Tolerances, enough?: number) => {
      deviationsOf(standard, sizes, scratch);
      return surface.worst(scratch, noiseOf(standard, sizes), enough);
    };
    const scratch = new Float64Array(DEVIATIONS.length);
    const worsts = options.inFull
      ? await worstsInFull(read, judge, drawn, tolerances)
      : Float64Array.from(drawn, (standard) => ofSurface(standard, tolerances));
    const sorted = worsts.toSorted();
    const { rms, largest } = report.error;
    const ends = options.inFull ? [] : [NEAREST * rms, largest];
    const said = worsts.reduce((sum, worst) => sum + Number(worst <= target), 0);
    const zones = zonesOf(worsts, target, ends, quick ? ZONE_READ.quick : ZONE_READ.usual);
    for (const zone of zones) {
      const inFull = await worstsInFull(
        read,
        judge,
        zone.read.map((build) => drawn[build]),
        tolerances,
      );
      zone.read.forEach((build, i) => {
        zone.changes.push(Number(inFull[i] <= target) - Number(worsts[build] <= target));
        worsts[build] = inFull[i];
      });
    }
    const { share, interval } = shareMeeting(said, zones, builds);
    const details = quick
      ? { tolerances: [], togetherNeeded: null }
      : detailsOf(tolerances, seed, target, wanted, drawn.slice(0, NEEDS_BUILDS), ofSurface);
    return {
      distance_m: judged.distanceM,
      radius_m: judged.radiusM,
      gain: { is: gainIs, drawing: gain },
      target,
      drawing: worstOf(planned.scores),
      builds,
      seed,
      yield: share,
      interval,
      near: options.inFull ? null : nearCounts(zones),
      worst: {
        median: sorted[Math.floor((builds - 1) / 2)],
        most95: sorted[Math.ceil(0.95 * builds) - 1],
      },
      readings: drawing.length,
      surface: report,
      worsts,
      wanted,
      ...details,
      warnings: present([edgeWarning(given.elements, farthestDeviations(tolerances).shiftM)]),
    };
  });
}

/** x = k d/2 of the largest sphere. */
function largestSizeParameter({ light, medium, particles }: Task): number {
  const [index] = refractiveIndex(medium, light.wavelengthM);
  return (Math.PI * index * Math.max(...particles.map(({ diameterM }) => diameterM))) / light.wavelengthM;
}

/** Shares and needs of every tolerance that is not nothing. */
function detailsOf(
  tolerances: Tolerances,
  seed: number,
  target: number,
  wanted: number,
  drawn: readonly Float64Array[],
  worstOfBuild: (standard: Float64Array, sizes: Tolerances, enough?: number) => number,
): Pick<Yield, 'tolerances' | 'togetherNeeded'> {
  const names = TOLERANCE_NAMES.filter((name) => tolerances[name].size > 0);
  const groups = names.map((name) => VARIABLES.flatMap((one, v) => (one === name ? [v] : [])));
  const streams = [randomStream(seed, STREAM.shares), randomStream(seed, STREAM.sharesToo)];
  const [worst, miss] = varianceShares(
    (sample, point) => drawStandard(tolerances, streams[sample], point),
    VARIABLES.length,
    groups,
    (point) => {
      const value = worstOfBuild(point, tolerances);
      return [value, Number(value > target)];
    },
    2,
    SHARE_POINTS,
  );
  const meets = (sizes: Tolerances) =>
    drawn.reduce((sum, standard) => sum + Number(worstOfBuild(standard, sizes, target) <= target), 0) /
    drawn.length;
  const { rows, together } = toleranceNeeds(tolerances, names, wanted, meets);
  return {
    tolerances: names.map((name, i) => ({
      ...{ name, ...tolerances[name], worst: worst[i], miss: miss[i] },
      ...rows[i],
    })),
    togetherNeeded: together,
  };
}
