import { RimwrightError } from '../base/errors.ts';
import { dominates } from './pareto.ts';

/** What is told of a point. Smaller is better. */
export interface Outcome {
  /** Two or three numbers; +Infinity in any makes the point unusable. */
  objectives: readonly number[];
  /** How far the point is from what is allowed; 0, or left out, where it is allowed. Its objectives do not count then. */
  violation?: number;
}

/** A scored point of the search for a front. */
export interface Member {
  /** Place in the unit cube that stands for the box. */
  readonly unit: Float64Array;
  readonly objectives: readonly number[];
  readonly violation: number;
  /** Objectives in units of the population's spans: 0 at the best, 1 at the worst. */
  place: number[];
  /** Hypervolume that would be lost without it, in those units; 0 for points that are not on the front. */
  worth: number;
}

/**
 * A member made of what was told.
 *
 * @param label how a message calls the candidate
 * @throws RimwrightError `machine` at NaN, −Infinity, a violation below 0, or a wrong number of objectives
 */
export function memberOf(unit: Float64Array, outcome: Outcome, count: number, label: string): Member {
  const { objectives, violation = 0 } = outcome;
  const isSound =
    violation >= 0 && objectives.length === count && objectives.every((x) => x > Number.NEGATIVE_INFINITY);
  if (!isSound) {
    const found = `[${objectives.join(', ')}] with violation ${violation}`;
    throw new RimwrightError('machine', `${label} scored ${found}, expected ${count} numbers and one ≥ 0`);
  }
  const isUsable = objectives.every(Number.isFinite);
  return {
    unit,
    objectives: objectives.slice(),
    violation: isUsable ? violation : Number.POSITIVE_INFINITY,
    place: [],
    worth: 0,
  };
}

/**
 * Whether a is better beyond dispute: allowed where b is not, less far from allowed, or dominating it.
 * Source: Deb, Pratap, Agarwal & Meyarivan (2002), IEEE Trans. Evol. Comput. 6, 182, section VI.
 */
export function beats(a: Member, b: Member): boolean {
  if (a.violation > 0 || b.violation > 0) return a.violation < b.violation;
  return dominates(a.objectives, b.objectives);
}
