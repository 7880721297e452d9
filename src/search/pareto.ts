import { RimwrightError } from '../base/errors.ts';
import { ascending } from './ascending.ts';

/** True when a is nowhere worse than b and somewhere better; smaller is better. */
export function dominates(a: readonly number[], b: readonly number[]): boolean {
  let isBetter = false;
  for (let j = 0; j < a.length; j++) {
    if (!(a[j] <= b[j])) return false;
    if (a[j] < b[j]) isBetter = true;
  }
  return isBetter;
}

/**
 * Pareto rank of each point: 1 for those that no other dominates, 2 for those that only rank 1 dominates,
 * and so on. Smaller is better; equal points share a rank.
 *
 * Sorted by the first objective, a point is dominated only by those before it, and the fronts that dominate
 * it are the first ones: binary search finds its own (Zhang, Tian, Cheng & Jin (2015), IEEE Trans. Evol.
 * Comput. 19, 201). Up to three objectives a front is asked by binary search too, N log² N in all.
 *
 * @param objectives one row a point, all of the same length; infinities are allowed
 * @throws RimwrightError `input` where rows differ in length or hold NaN
 */
export function nonDominatedRanks(objectives: readonly (readonly number[])[]): number[] {
  checkRows(objectives);
  const order = [...objectives.keys()].sort((a, b) => compareRows(objectives[a], objectives[b]));
  const makeFront = (objectives[0]?.length ?? 0) <= 3 ? () => new Staircase() : () => new PlainFront();
  const fronts: Front[] = [];
  const ranks = new Array<number>(objectives.length).fill(0);
  let previous: number | undefined;
  for (const k of order) {
    const row = objectives[k];
    if (previous !== undefined && compareRows(objectives[previous], row) === 0) {
      ranks[k] = ranks[previous];
      continue;
    }
    previous = k;
    let low = 0;
    let high = fronts.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (fronts[middle].dominates(row)) low = middle + 1;
      else high = middle;
    }
    if (low === fronts.length) fronts.push(makeFront());
    fronts[low].add(row);
    ranks[k] = low + 1;
  }
  return ranks;
}

/**
 * How lonely each of some points is among the others, in units of the span of each objective; infinite at
 * the ends. Source: Deb, Pratap, Agarwal & Meyarivan (2002), IEEE Trans. Evol. Comput. 6, 182, section III.B.
 *
 * @param objectives one row a point, as for `nonDominatedRanks`
 * @param members indices into `objectives`, usually of one rank
 * @returns one distance a member, in the order of `members`; an objective adds nothing where it is the same
 * for all, or infinite for some; one or two members are infinitely lonely
 */
export function crowdingDistances(
  objectives: readonly (readonly number[])[],
  members: readonly number[],
): number[] {
  const rows = members.map((k) => objectives[k]);
  checkRows(rows);
  const distances = new Array<number>(members.length).fill(members.length > 2 ? 0 : Number.POSITIVE_INFINITY);
  for (let j = 0; j < (rows[0]?.length ?? 0); j++) {
    // The whole row decides between equal values, so that the order of points does not.
    const order = [...rows.keys()].sort(
      (a, b) => ascending(rows[a][j], rows[b][j]) || compareRows(rows[a], rows[b]),
    );
    const first = order[0];
    const last = order[order.length - 1];
    const span = rows[last][j] - rows[first][j];
    if (!(span > 0) || !Number.isFinite(span)) continue;
    distances[first] = Number.POSITIVE_INFINITY;
    distances[last] = Number.POSITIVE_INFINITY;
    for (let i = 1; i + 1 < order.length; i++) {
      distances[order[i]] += (rows[order[i + 1]][j] - rows[order[i - 1]][j]) / span;
    }
  }
  return distances;
}

/** Order by the first objective that differs; 0 for equal rows. */
export function compareRows(a: readonly number[], b: readonly number[]): number {
  for (let j = 0; j < a.length; j++) {
    const order = ascending(a[j], b[j]);
    if (order !== 0) return order;
  }
  return 0;
}

/** Points of one rank; asked and filled in the order of `compareRows`, never twice with the same row. */
interface Front {
  dominates(row: readonly number[]): boolean;
  add(row: readonly number[]): void;
}

/**
 * A front of up to three objectives. Of the points so far only those matter whose second and third
 * objective no other undercuts: they form stairs, the second rising and the third falling.
 */
class Staircase implements Front {
  private readonly second: number[] = [];
  private readonly third: number[] = [];

  dominates(row: readonly number[]): boolean {
    const [, second = 0, third = 0] = row;
    const step = this.stepsUpTo(second) - 1;
    return step >= 0 && this.third[step] <= third;
  }

  add(row: readonly number[]): void {
    const [, second = 0, third = 0] = row;
    const from = firstIndex(this.second.length, (i) => this.second[i] >= second);
    let to = from;
    while (to < this.third.length && this.third[to] >= third) to++;
    this.second.splice(from, to - from, second);
    this.third.splice(from, to - from, third);
  }

  /** How many steps have a second objective of at most this. */
  private stepsUpTo(second: number): number {
    return firstIndex(this.second.length, (i) => this.second[i] > second);
  }
}

/** A front of any number of objectives. */
class PlainFront implements Front {
  private readonly rows: (readonly number[])[] = [];

  dominates(row: readonly number[]): boolean {
    return this.rows.some((other) => dominates(other, row));
  }

  add(row: readonly number[]): void {
    this.rows.push(row);
  }
}

/** The first index from 0 on that passes a test which all later ones pass too; `length` where none does. */
function firstIndex(length: number, passes: (index: number) => boolean): number {
  let low = 0;
  let high = length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (passes(middle)) high = middle;
    else low = middle + 1;
  }
  return low;
}

function checkRows(rows: readonly (readonly number[])[]): void {
  for (const [k, row] of rows.entries()) {
    if (row.length !== rows[0].length || row.some(Number.isNaN)) {
      throw new RimwrightError(
        'input',
        `objectives[${k}]: found [${row.join(', ')}], expected ${rows[0].length} numbers`,
      );
    }
  }
}
