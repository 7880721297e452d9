import { leastSquares } from '../numeric/leastSquares.ts';
import type { Term, VariableKind } from '../numeric/polynomialBasis.ts';
import { evaluateTerms, sparseTerms, termWork } from '../numeric/polynomialBasis.ts';
import type { BuildJudge } from './buildJudge.ts';
import type { Deviations } from './tolerances.ts';
import { DEVIATIONS } from './tolerances.ts';

/** Builds that were read in full. */
export interface ReadBuilds {
  /** Nine numbers a build. */
  deviations: Float64Array;
  /** Readings of each build (see `BuildReader.read`). */
  ratios: readonly Float64Array[];
}

/** A reading that comes within this share of the target of a build's extreme stands for it. */
const STANDS_FOR = 0.004;
/** Terms that move no reading by this share of the target are left out. */
const LEAST_TERM = 0.002;

const WIDTH = DEVIATIONS.length;

/**
 * The corrections of a design's builds as polynomials in how they differ from the drawing (a sparse polynomial chaos by regression:
 * Blatman & Sudret, 2011), fitted to builds that were read in full. Only readings that are the least or the most of some build are kept.
 * How far it errs must be seen on builds that it was not fitted to.
 */
export class BuildSurface {
  readonly #judge: BuildJudge;
  readonly #scales: Float64Array;
  readonly #terms: readonly Term[];
  /** Of the calibration's reference, then of each kept reading. */
  readonly #coefficients: Float64Array;
  readonly #noiseShares: Float64Array;
  readonly #values: Float64Array;
  readonly #point = new Float64Array(WIDTH);
  readonly #work = termWork(WIDTH);

  private constructor(judge: BuildJudge, scales: Float64Array, fit: Fit, kept: readonly number[]) {
    this.#judge = judge;
    this.#scales = scales;
    this.#terms = fit.terms;
    this.#coefficients = fit.coefficients;
    this.#noiseShares = Float64Array.from(kept, (reading) => judge.noiseShare(reading));
    this.#values = new Float64Array(fit.terms.length);
  }

  /**
   * @param every terms to choose from (see `surfaceTerms`); more builds than these are needed
   * @param noises for the choice of readings, some values of noise as builds have
   * @param target the largest correction allowed
   * @throws RimwrightError `machine` for fewer builds than terms
   */
  static fit(
    builds: ReadBuilds,
    judge: BuildJudge,
    every: readonly Term[],
    farthest: Deviations,
    noises: readonly number[],
    target: number,
  ): BuildSurface {
    const scales = Float64Array.from(DEVIATIONS, (name) => (farthest[name] > 0 ? 1 / farthest[name] : 0));
    const kept = tellingReadings(builds, judge, noises, STANDS_FOR * target);
    const responses = 1 + kept.length;
    const values = new Float64Array(builds.ratios.length * responses);
    builds.ratios.forEach((ratios, b) => {
      values[b * responses] = judge.reference(ratios);
      kept.forEach((reading, k) => {
        values[b * responses + 1 + k] = ratios[reading];
      });
    });
    const all = fitTerms(every, builds.deviations, scales, values, responses);
    const terms = tellingTerms(all, LEAST_TERM * target);
    const fit = fitTerms(terms, builds.deviations, scales, values, responses);
    return new BuildSurface(judge, scales, fit, kept);
  }

  get size(): { terms: number; readings: number } {
    return { terms: this.#terms.length, readings: this.#noiseShares.length };
  }

  /**
   * Worst |reading/(gain · extinction) − 1| of a build.
   *
   * @param deviations nine numbers
   * @param enough once it is above this, the first value above it is given
   */
  worst(deviations: Float64Array, noise: number, enough = Number.POSITIVE_INFINITY): number {
    for (let v = 0; v < WIDTH; v++) this.#point[v] = deviations[v] * this.#scales[v];
    evaluateTerms(this.#terms, this.#point, this.#values, this.#work);
    const perGain = 1 / this.#judge.gainOf(this.#response(0));
    const shares = this.#noiseShares;
    let worst = 0;
    for (let k = 0; k < shares.length && worst <= enough; k++) {
      worst = Math.max(worst, Math.abs((this.#response(k + 1) + noise * shares[k]) * perGain - 1));
    }
    return worst;
  }

  #response(k: number): number {
    const values = this.#values;
    const coefficients = this.#coefficients;
    const count = values.length;
    const from = k * count;
    // Four sums that do not wait for each other: thrice as fast as one.
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    let t = 0;
    for (; t + 3 < count; t += 4) {
      s0 += coefficients[from + t] * values[t];
      s1 += coefficients[from + t + 1] * values[t + 1];
      s2 += coefficients[from + t + 2] * values[t + 2];
      s3 += coefficients[from + t + 3] * values[t + 3];
    }
    for (; t < count; t++) s0 += coefficients[from + t] * values[t];
    return s0 + s1 + s2 + s3;
  }
}

/** Powers of a deviation alone: of the mask, and of what turns a sphere's amplitudes for each radian of it; at most. */
const POWERS = { mask: 6, amplitudes: 4, perRadian: 3, most: 12 };
/** Turns of a sphere's amplitudes, radians, beyond which they ripple. */
const RIPPLES = 0.3;

/**
 * Terms of a surface for such deviations. What changes a sphere's size parameter x or index turns the phases of its partial waves
 * by about x times the change, and its amplitudes ripple with them.
 *
 * @param sizeParameter the largest x of the brief
 * @param quick squares alone, for a first look
 */
export function surfaceTerms(
  farthest: Deviations,
  sizeParameter: number,
  wavelengthM: number,
  quick: boolean,
): Term[] {
  const turns: Partial<Deviations> = {
    wavelengthM: (2 * sizeParameter * farthest.wavelengthM) / wavelengthM,
    index: 2 * sizeParameter * farthest.index,
    size: 2 * sizeParameter * farthest.size,
  };
  const kinds = DEVIATIONS.flatMap((name, variable): VariableKind[] => {
    if (farthest[name] === 0) return [];
    const turn = turns[name] ?? 0;
    const ripples = turn > RIPPLES;
    if (quick) return [{ variable, power: ripples ? 4 : 2, ripples: false }];
    const own = POWERS.amplitudes + Math.ceil(POWERS.perRadian * turn);
    const power = name in turns ? Math.min(POWERS.most, own) : POWERS.mask;
    return [{ variable, power, ripples }];
  });
  return sparseTerms(kinds);
}

/** The variables with powers above those of the mask's own. */
export function ripplingOf(terms: readonly Term[]): number[] {
  const high = terms.filter(({ firstDegree }) => firstDegree > POWERS.mask).map(({ first }) => first);
  return [...new Set(high)];
}

interface Fit {
  terms: readonly Term[];
  coefficients: Float64Array;
  /** Root mean square of each term over the builds. */
  sizes: Float64Array;
}

function fitTerms(
  terms: readonly Term[],
  deviations: Float64Array,
  scales: Float64Array,
  values: Float64Array,
  responses: number,
): Fit {
  const builds = deviations.length / WIDTH;
  const matrix = new Float64Array(builds * terms.length);
  const sizes = new Float64Array(terms.length);
  const [point, work] = [new Float64Array(WIDTH), termWork(WIDTH)];
  for (let b = 0; b < builds; b++) {
    for (let v = 0; v < WIDTH; v++) point[v] = deviations[b * WIDTH + v] * scales[v];
    const row = matrix.subarray(b * terms.length, (b + 1) * terms.length);
    evaluateTerms(terms, point, row, work);
    for (let t = 0; t < terms.length; t++) sizes[t] += row[t] * row[t];
  }
  return {
    terms,
    coefficients: leastSquares(matrix, terms.length, values, responses),
    sizes: sizes.map((sum) => Math.sqrt(sum / builds)),
  };
}

/** The terms that move some reading by `least` or more, as a root mean square. */
function tellingTerms({ terms, coefficients, sizes }: Fit, least: number): Term[] {
  return terms.filter((_, t) => {
    if (t === 0) return true;
    let largest = 0;
    for (let at = t; at < coefficients.length; at += terms.length) {
      largest = Math.max(largest, Math.abs(coefficients[at]) * sizes[t]);
    }
    return largest >= least;
  });
}

/**
 * A few readings among which every build finds its least and its most, to within `slack`: greedily the one that stands for
 * most of those that are left.
 */
function tellingReadings(
  { ratios }: ReadBuilds,
  judge: BuildJudge,
  noises: readonly number[],
  slack: number,
): number[] {
  const extremes = ratios.flatMap((row) =>
    noises.map((noise) => ({ row, noise, ...judge.extremes(row, noise) })),
  );
  const candidates = [...new Set(extremes.flatMap(({ at }) => at))];
  // For each extreme, the candidates that stand for it.
  const standing = extremes.flatMap(({ row, noise, least, most }) => {
    const gain = judge.gainOf(judge.reference(row));
    const corrections = candidates.map(
      (reading) => (row[reading] + noise * judge.noiseShare(reading)) / gain - 1,
    );
    const near = (wanted: (correction: number) => boolean) =>
      candidates.flatMap((_, c) => (wanted(corrections[c]) ? [c] : []));
    return [near((one) => one <= least + slack), near((one) => one >= most - slack)];
  });
  const kept: number[] = [];
  let left = standing;
  while (left.length > 0) {
    const counts = new Float64Array(candidates.length);
    for (const near of left) for (const c of near) counts[c]++;
    const best = counts.indexOf(Math.max(...counts));
    kept.push(candidates[best]);
    left = left.filter((near) => !near.includes(best));
  }
  return kept;
}
