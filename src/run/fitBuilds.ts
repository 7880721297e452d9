import { randomStream } from '../base/random.ts';
import type { Term } from '../numeric/polynomialBasis.ts';
import type { BuildJudge } from '../score/buildJudge.ts';
import type { ReadBuilds } from '../score/buildSurface.ts';
import { BuildSurface, ripplingOf } from '../score/buildSurface.ts';
import type { Tolerances } from '../score/tolerances.ts';
import {
  DEVIATIONS,
  deviationsOf,
  drawStandard,
  farthestDeviations,
  noiseOf,
  TOLERANCE_NAMES,
  VARIABLES,
} from '../score/tolerances.ts';
import type { ReadAll } from './buildCrew.ts';

/** How well the surface follows builds that it was not fitted to. */
export interface SurfaceReport {
  terms: number;
  readings: number;
  fitted: number;
  checked: number;
  /** Of the worst correction: surface less full reading. */
  error: { rms: number; largest: number };
  /** Builds among the checked of which the two say different things. */
  disagreed: number;
}

/** Streams of the seed. */
export const STREAM = { fit: 0, check: 1, builds: 2, shares: 3, sharesToo: 4, ends: 5 };
/** Builds that are fitted, for each term; as many of them in a row share their particles and tables. */
const PER_TERM = 2.5;
const FEWEST = 60;
const SHARING = 2;
const CHECKED = { usual: 160, quick: 48 };
/** Fits reach beyond what is asked of them. */
const STRETCH = { limits: 1.05, rms: 1.25 };
const WIDTH = DEVIATIONS.length;

/**
 * A surface through builds that are read in full, and how far it errs on others.
 *
 * @param terms to choose from
 * @param quick few others, for a first look
 */
export async function fitSurface(
  read: ReadAll,
  judge: BuildJudge,
  tolerances: Tolerances,
  terms: readonly Term[],
  seed: number,
  target: number,
  quick: boolean,
): Promise<{ surface: BuildSurface; report: SurfaceReport }> {
  const count = SHARING * Math.ceil(Math.max(FEWEST, PER_TERM * terms.length) / SHARING);
  const wider = stretched(tolerances);
  const fitted = await readFitted(read, wider, ripplingOf(terms), seed, count);
  const noise = 2 * tolerances.noise.size;
  const noises = noise === 0 ? [0] : [0, noise, -noise];
  const surface = BuildSurface.fit(fitted, judge, terms, farthestDeviations(wider), noises, target);
  const checked = quick ? CHECKED.quick : CHECKED.usual;
  const report = await checkSurface(read, surface, judge, tolerances, seed, target, checked, count);
  return { surface, report };
}

/** The law's own width made wider, so that what is asked lies within what was fitted. */
export function stretched(tolerances: Tolerances): Tolerances {
  const entries = TOLERANCE_NAMES.map((name) => {
    const { law, size } = tolerances[name];
    return [name, { law, size: size * STRETCH[law] }];
  });
  return Object.fromEntries(entries) as Tolerances;
}

export function drawBuilds(
  tolerances: Tolerances,
  seed: number,
  stream: number,
  count: number,
): Float64Array[] {
  const random = randomStream(seed, stream);
  return Array.from({ length: count }, () => {
    const standard = new Float64Array(VARIABLES.length);
    drawStandard(tolerances, random, standard);
    return standard;
  });
}

function allDeviations(drawn: readonly Float64Array[], tolerances: Tolerances): Float64Array {
  const all = new Float64Array(drawn.length * WIDTH);
  drawn.forEach((standard, b) => {
    deviationsOf(standard, tolerances, all.subarray(b * WIDTH, (b + 1) * WIDTH));
  });
  return all;
}

/** Builds to fit to; of each few in a row only the masks differ, which saves most of the work. */
async function readFitted(
  read: ReadAll,
  tolerances: Tolerances,
  rippling: readonly number[],
  seed: number,
  count: number,
): Promise<ReadBuilds> {
  const farthest = farthestDeviations(tolerances);
  const random = randomStream(seed, STREAM.ends);
  const drawn = drawBuilds(tolerances, seed, STREAM.fit, count);
  const deviations = allDeviations(drawn, tolerances);
  // High powers must be held at the ends of their range, where normal numbers seldom come.
  for (let b = 0; b < count; b++) {
    for (const variable of rippling) {
      const name = DEVIATIONS[variable];
      deviations[b * WIDTH + variable] = farthest[name] * Math.cos(Math.PI * random.uniform());
    }
  }
  const shared = ['distanceM', 'wavelengthM', 'index', 'size'] as const;
  for (let b = 0; b < count; b++) {
    const first = b - (b % SHARING);
    for (const v of shared.map((name) => DEVIATIONS.indexOf(name))) {
      deviations[b * WIDTH + v] = deviations[first * WIDTH + v];
    }
  }
  const ratios: Float64Array[] = [];
  await read(deviations, (build, row) => {
    ratios[build] = row.slice();
  });
  return { deviations, ratios };
}

async function checkSurface(
  read: ReadAll,
  surface: BuildSurface,
  judge: BuildJudge,
  tolerances: Tolerances,
  seed: number,
  target: number,
  count: number,
  fitted: number,
): Promise<SurfaceReport> {
  const drawn = drawBuilds(tolerances, seed, STREAM.check, count);
  const deviations = allDeviations(drawn, tolerances);
  let [squares, largest, disagreed] = [0, 0, 0];
  await read(deviations, (build, row) => {
    const noise = noiseOf(drawn[build], tolerances);
    const inFull = judge.worst(row, noise);
    const fast = surface.worst(deviations.subarray(build * WIDTH, (build + 1) * WIDTH), noise);
    squares += (fast - inFull) ** 2;
    largest = Math.max(largest, Math.abs(fast - inFull));
    if (fast <= target !== inFull <= target) disagreed++;
  });
  const error = { rms: Math.sqrt(squares / count), largest };
  return { ...surface.size, fitted, checked: count, error, disagreed };
}

export async function worstsInFull(
  read: ReadAll,
  judge: BuildJudge,
  drawn: readonly Float64Array[],
  tolerances: Tolerances,
): Promise<Float64Array> {
  const worsts = new Float64Array(drawn.length);
  await read(allDeviations(drawn, tolerances), (build, row) => {
    worsts[build] = judge.worst(row, noiseOf(drawn[build], tolerances));
  });
  return worsts;
}
