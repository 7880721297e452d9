import { RimwrightError } from '../base/errors.ts';

/** What a search makes small. +Infinity marks a point that cannot be used at all. */
export type Objective = (x: Float64Array) => number;

/** A point and its value. */
export interface Scored {
  x: Float64Array;
  value: number;
}

/**
 * The value itself, if a search can rank it: any number, or +Infinity.
 *
 * @param label how the message calls the candidate, such as `candidate 3 of 10`
 * @throws RimwrightError `machine` at NaN or −Infinity, with the candidate that made it: a fault of the
 * score that would otherwise steer the search in silence
 */
export function rankableValue(value: number | undefined, x: Float64Array, label: string): number {
  if (value === undefined || Number.isNaN(value) || value === Number.NEGATIVE_INFINITY) {
    throw new RimwrightError('machine', `${label} scored ${value} at [${Array.from(x).join(', ')}]`);
  }
  return value;
}
