import type { Problem } from '../base/errors.ts';

/** Lower and upper bounds of each coordinate; −Infinity and +Infinity where there is none. */
export interface Box {
  lower: Float64Array;
  upper: Float64Array;
}

/** Fills in the bounds that were left out, and notes what is wrong with those given. */
export function checkedBox(
  given: { lower?: Float64Array; upper?: Float64Array },
  dimension: number,
  problems: Problem[],
): Box {
  const box = {
    lower: given.lower ?? new Float64Array(dimension).fill(Number.NEGATIVE_INFINITY),
    upper: given.upper ?? new Float64Array(dimension).fill(Number.POSITIVE_INFINITY),
  };
  for (const side of ['lower', 'upper'] as const) {
    const length = box[side].length;
    if (length !== dimension) {
      problems.push({ key: side, found: `${length} numbers`, expected: `${dimension}, one a coordinate` });
    }
  }
  for (let i = 0; i < dimension; i++) {
    const [low, high] = [box.lower[i], box.upper[i]];
    if (low >= high || Number.isNaN(low) || Number.isNaN(high)) {
      problems.push({ key: `lower[${i}]`, found: `${low}`, expected: `less than upper[${i}] = ${high}` });
    }
  }
  return box;
}

/** Notes every coordinate of a start that is not finite or lies outside the box. */
export function checkStart(start: Float64Array, box: Box, problems: Problem[]): void {
  if (start.length === 0) {
    problems.push({ key: 'start', found: 'no coordinates', expected: 'at least one' });
  }
  for (const [i, x] of start.entries()) {
    // A bound that is missing here was reported with the box.
    const low = box.lower[i] ?? Number.NEGATIVE_INFINITY;
    const high = box.upper[i] ?? Number.POSITIVE_INFINITY;
    if (!Number.isFinite(x) || x < low || x > high) {
      problems.push({ key: `start[${i}]`, found: `${x}`, expected: `a number from ${low} to ${high}` });
    }
  }
}

/** Notes a number that is not finite or not above zero. */
export function checkPositive(key: string, value: number, problems: Problem[]): void {
  if (!Number.isFinite(value) || value <= 0) {
    problems.push({ key, found: `${value}`, expected: 'a finite number above 0' });
  }
}

/** Notes a count that is not a whole number of at least `least`; Infinity stands for no limit. */
export function checkCount(key: string, value: number, least: number, problems: Problem[]): void {
  if (value === Number.POSITIVE_INFINITY) return;
  if (!Number.isInteger(value) || value < least) {
    problems.push({ key, found: `${value}`, expected: `a whole number, at least ${least}` });
  }
}
