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
  readonly x: Float64Array;
  /** Its place in the unit cube that stands for the box. */
  readonly unit: Float64Array;
  readonly objectives: readonly number[];
  readonly violation: number;
  /** Objectives in units of the population's spans: 0 at the best, 1 at the worst. */
  place: number[];
  /** Its place along the front, see `alongFront`. */
  along: number[];
  /** Hypervolume that would be lost without it, in those units; 0 for points that are not on the front. */
  worth: number;
}

/**
 * A member made of what was told.
 *
 * @param count number of objectives
 * @param label how a message calls the candidate
 * @throws RimwrightError `machine` at NaN, −Infinity, a violation below 0, or a wrong number of objectives
 */
export function memberOf(
  { x, unit }: Pick<Member, 'x' | 'unit'>,
  { objectives, violation = 0 }: Outcome,
  count: number,
  label: string,
): Member {
  const isSound =
    violation >= 0 &&
    objectives.length === count &&
    objectives.every((value) => value > Number.NEGATIVE_INFINITY);
  if (!isSound) {
    const found = `[${objectives.join(', ')}] with violation ${violation} at [${x.join(', ')}]`;
    throw new RimwrightError('machine', `${label} scored ${found}, expected ${count} numbers and one ≥ 0`);
  }
  return {
    x,
    unit,
    objectives: objectives.slice(),
    violation: objectives.every(Number.isFinite) ? violation : Number.POSITIVE_INFINITY,
    place: [],
    along: [],
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

/** Coordinates across the direction (1, 1, …), one fewer than objectives: no two points of a front share them. */
export function alongFront(place: readonly number[]): number[] {
  let sum = 0;
  return place.slice(1).map((x, j) => {
    sum += place[j];
    return (sum - (j + 1) * x) / Math.sqrt((j + 1) * (j + 2));
  });
}
