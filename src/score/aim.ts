import type { Scores } from './scores.ts';
import { worstOf } from './scores.ts';
import type { Task } from './task.ts';

/** What one run of the search makes small. `cost` is area over gain, every element's area times its weight. */
export const MEASURES = ['radius', 'area', 'cost', 'time'] as const;
export type Measure = (typeof MEASURES)[number];

/** One question to a search: the smallest `measure` whose worst correction is at most `correction`. */
export interface Aim {
  measure: Measure;
  correction: number;
}

/** The measure's own value in its SI unit (`cost`: area over gain, m²). */
export function measureOf(scores: Scores, measure: Measure): number {
  switch (measure) {
    case 'radius':
      return scores.radius_m;
    case 'area':
      return scores.area_m2;
    case 'cost':
      return (scores.weightedArea_m2 ?? scores.area_m2) / scores.gain;
    case 'time':
      return scores.snr.time_s;
  }
}

/** A limit of the brief and the factor by which a design misses it, above 1. */
export interface Miss {
  limit: string;
  factor: number;
}

/** Every limit of the brief other than the correction, with the factor by which a design uses it up: 1 is just met. */
export function limitFactors(scores: Scores, misfit: number, task: Task): Miss[] {
  const { target, detector } = task;
  return [
    { limit: 'target.lobe', factor: target.lobe === null ? 0 : scores.lobe.ratio / target.lobe },
    { limit: 'target.time', factor: target.timeS === null ? 0 : scores.snr.time_s / target.timeS },
    { limit: 'detector.radius', factor: scores.radius_m / detector.radiusM[1] },
    { limit: 'detector.radius', factor: detector.radiusM[0] / scores.radius_m },
    { limit: 'shop', factor: 1 + misfit },
  ];
}

/** The limits other than the correction that a design misses. */
export function missedLimits(scores: Scores, misfit: number, task: Task): Miss[] {
  // Coordinates are written to a nanometre, which may take a radius over its limit by that much.
  return limitFactors(scores, misfit, task).filter(({ factor }) => factor > 1 + 1e-5);
}

/**
 * What a factor f by which a limit is missed weighs against the measure: 2 L + 3 L², L = log f. Halving the allowed
 * correction costs less than a factor of two in area on every brief tried, so the first term lets no run gain by missing a
 * limit by a little. The second keeps runs from vanishing outlines, which read nothing: a correction of 100 % at no cost.
 */
export const MISS_WEIGHT = { weight: 2, bend: 3 } as const;

/**
 * The limits that bear on an aim. One on the very measure that is made small is left out: it is met if anything can meet
 * it, and as a penalty it would only outweigh the others.
 */
export function limitsBeside(scores: Scores, misfit: number, aim: Aim, task: Task): Miss[] {
  return limitFactors(scores, misfit, task).filter(
    ({ limit }) => !(aim.measure === 'time' && limit === 'target.time'),
  );
}

/**
 * The number that a search makes small: the logarithm of the measure, and a penalty for the logarithm of each factor by
 * which a limit is missed.
 */
export function aimValue(scores: Scores, misfit: number, aim: Aim, task: Task): number {
  let penalty = weigh(worstOf(scores) / aim.correction);
  for (const { factor } of limitsBeside(scores, misfit, aim, task)) penalty += weigh(factor);
  return Math.log(measureOf(scores, aim.measure)) + penalty;
}

/** The part of `aimValue` that a radius alone decides, for missing the limits of size: known before anything is read. */
export function sizePenalty(lobe: number, radiusM: number, { target, detector }: Task): number {
  const [least, most] = detector.radiusM;
  const byLobe = target.lobe === null ? 0 : weigh(lobe / target.lobe);
  return byLobe + weigh(radiusM / most) + weigh(least / radiusM);
}

function weigh(factor: number): number {
  const excess = Math.log(Math.max(1, factor));
  return MISS_WEIGHT.weight * excess + MISS_WEIGHT.bend * excess * excess;
}
