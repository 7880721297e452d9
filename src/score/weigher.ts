import { LEAST_GAIN } from './correction.ts';
import type { ElementNodes } from './elementNodes.ts';
import { litElements } from './litElements.ts';
import { noiseOf } from './noisePower.ts';
import type { SampledReadings } from './scorer.ts';
import { solveWeights } from './solveWeights.ts';
import type { Task } from './task.ts';

/** A design whose elements are read apart, over all samples. */
export interface ApartReadings {
  elements: readonly ElementNodes[];
  radiusM: number;
  distanceM: number;
  /** For each element its ratios reading/extinction, a row for each scenario (see `SampledReadings`), in its share of the light. */
  apart: readonly (readonly Float64Array[])[];
}

/**
 * Gives elements that were read apart their weights: those of least time that hold a correction (see `solveWeights`).
 *
 * No weight is above 1, so that area is not traded for amplification: with a gain of one they are as they are solved, with a free
 * gain the largest is 1, and the gain at least `LEAST_GAIN`.
 *
 * @param correction largest allowed |ratio/gain − 1|
 * @param cases further ratios of each element that must hold it: of cases worse than the samples
 */
export function weigh(
  task: Task,
  { elements, radiusM, distanceM, apart }: ApartReadings,
  correction: number,
  cases: readonly (readonly number[])[] = [],
): SampledReadings {
  const { target, detector, light } = task;
  const isFree = target.gain === 'free';
  const lit = litElements(task, elements, distanceM).map(({ areaM2 }) => areaM2);
  const noise = noiseOf(lit, { ...detector, ...light });
  const solved = solveWeights({
    ratios: rowsOf(apart, cases),
    noise,
    correction,
    largest: isFree ? 1 / LEAST_GAIN : 1,
    balanced: detector.balanced ?? false,
  });
  // One element has no balance: it is left as it is, and what holds a search to balances lets none pass.
  const weights = solved?.weights ?? new Float64Array(elements.length).fill(1);
  const largest = Math.max(...weights.map(Math.abs));
  const weighted = weights.map((weight) => (isFree ? weight / largest : weight));
  const rows = apart[0].map((first, s) =>
    first.map((_, p) => apart.reduce((sum, own, j) => sum + weighted[j] * own[s][p], 0)),
  );
  return {
    elements: elements.map((element, j) => ({ ...element, weight: weighted[j] })),
    radiusM,
    distanceM,
    rows,
  };
}

/** One row of the elements' ratios for each sample. */
function rowsOf(apart: ApartReadings['apart'], cases: readonly (readonly number[])[]): Float64Array {
  const n = apart.length;
  const samples = apart[0].reduce((sum, { length }) => sum + length, 0);
  const out = new Float64Array((samples + cases.length) * n);
  apart.forEach((rows, j) => {
    let at = j;
    for (const row of rows) {
      for (const ratio of row) {
        out[at] = ratio;
        at += n;
      }
    }
  });
  cases.forEach((ratios, c) => {
    out.set(ratios, (samples + c) * n);
  });
  return out;
}
