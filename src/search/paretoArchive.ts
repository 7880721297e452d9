import { inputError, type Problem, RimwrightError } from '../base/errors.ts';
import { checkCount, checkPositive } from './box.ts';
import { compareRows, dominates } from './pareto.ts';

/** A kept point. */
export interface ArchiveMember<Payload> {
  readonly objectives: readonly number[];
  readonly payload: Payload;
}

/** A member, its box on the finest grid, and its box on the grid in use. */
interface Entry<Payload> extends ArchiveMember<Payload> {
  readonly finest: readonly number[];
  readonly box: readonly number[];
}

/** How many times `capacity` points are held, before any is given up for want of room. */
const RESERVE = 4;

/**
 * The best trade-offs seen, at most `capacity` of them, well spread. Smaller objectives are better.
 *
 * The space of objectives is cut into boxes of a given resolution. Only boxes that no other box dominates
 * are kept, with one point each; no member dominates another, and whatever was turned away is beaten by a
 * member but for less than a box's side. (ε-dominance: Laumanns, Thiele, Deb & Zitzler (2002), Evol.
 * Comput. 10, 263.) When too many boxes are left, the sides of all boxes double.
 *
 * The order in which points come does not matter, but for two things: of exactly equal points the first
 * stays, and once more than four times `capacity` points had to be held at a time, sides stay doubled.
 */
export class ParetoArchive<Payload> {
  private readonly resolution: readonly number[];
  private readonly capacity: number;
  private held: Entry<Payload>[] = [];
  /** Sides have doubled this often. */
  private level = 0;

  /**
   * @param resolution side of a box along each objective, above 0, in that objective's unit: the smallest
   * difference that matters (give logarithms as objectives where a ratio matters)
   * @param capacity most members to give, at least 2 to the number of objectives: around 0 that many boxes
   * stay apart however wide they grow
   * @throws RimwrightError `input`
   */
  constructor(resolution: readonly number[], capacity = 300) {
    const problems: Problem[] = [];
    for (const [j, side] of resolution.entries()) checkPositive(`resolution[${j}]`, side, problems);
    checkCount('capacity', capacity, 2 ** resolution.length, problems);
    if (problems.length > 0) throw inputError(problems);
    this.resolution = resolution.slice();
    this.capacity = capacity;
  }

  /**
   * Offers a point. One with an infinite objective is never kept.
   *
   * @returns whether the point is now held
   * @throws RimwrightError `input` at a wrong number of objectives or a resolution too fine for them (more
   * than 2^53 boxes from 0), `machine` at NaN
   */
  add(objectives: readonly number[], payload: Payload): boolean {
    this.check(objectives);
    if (!objectives.every(Number.isFinite)) return false;
    const finest = this.finestBox(objectives);
    const entry = { objectives: objectives.slice(), payload, finest, box: boxAt(finest, this.level) };
    this.held = withEntry(this.held, entry, this.level);
    while (this.held.length > RESERVE * this.capacity) this.held = regridded(this.held, ++this.level);
    return this.held.some((other) => other.finest === finest);
  }

  /** At most `capacity` members, in the order of their first objective, then the second, … */
  members(): ArchiveMember<Payload>[] {
    let entries = this.held;
    for (let level = this.level + 1; entries.length > this.capacity; level++) {
      entries = regridded(entries, level);
    }
    return entries
      .toSorted((a, b) => compareRows(a.objectives, b.objectives))
      .map(({ objectives, payload }) => ({ objectives, payload }));
  }

  private check(objectives: readonly number[]): void {
    const expected = this.resolution.length;
    if (objectives.length !== expected) {
      const found = objectives.length;
      throw new RimwrightError('input', `archive: found ${found} objectives, expected ${expected}`);
    }
    if (objectives.some(Number.isNaN)) {
      throw new RimwrightError('machine', `archive: objectives [${objectives.join(', ')}]`);
    }
  }

  private finestBox(objectives: readonly number[]): number[] {
    const box = objectives.map((x, j) => Math.floor(x / this.resolution[j]));
    if (!box.every(Number.isSafeInteger)) {
      const [point, sides] = [objectives.join(', '), this.resolution.join(', ')];
      throw new RimwrightError('input', `archive: [${point}] is too far out for boxes of [${sides}]`);
    }
    return box;
  }
}

/** The entries with one more, less those that it beats; the same ones where it is beaten. */
function withEntry<P>(entries: Entry<P>[], entry: Entry<P>, level: number): Entry<P>[] {
  if (entries.some((other) => beats(other, entry, level))) return entries;
  return [...entries.filter((other) => !beats(entry, other, level)), entry];
}

/** What is left of the entries on a coarser grid. */
function regridded<P>(entries: Entry<P>[], level: number): Entry<P>[] {
  let left: Entry<P>[] = [];
  for (const entry of entries) left = withEntry(left, { ...entry, box: boxAt(entry.finest, level) }, level);
  return left;
}

/** Whether a keeps b out: by a better box, or in the same box by order. */
function beats<P>(a: Entry<P>, b: Entry<P>, level: number): boolean {
  if (dominates(a.box, b.box)) return true;
  return compareRows(a.box, b.box) === 0 && orderInBox(a, b, level) <= 0;
}

/**
 * Which of two points represents a box: the one nearer its best corner, by the sum of its box numbers on
 * the next finer grid, then the next, …, and in the end by its objectives. A box that dominates another on
 * any grid has the smaller sum there and no greater one on coarser grids. So a point turned away on a fine
 * grid would not have stood for a coarse box either, and it does not matter when the sides doubled.
 */
function orderInBox<P>(a: Entry<P>, b: Entry<P>, level: number): number {
  for (let finer = level - 1; finer >= 0; finer--) {
    const difference = sum(boxAt(a.finest, finer)) - sum(boxAt(b.finest, finer));
    if (difference !== 0) return difference;
  }
  return compareRows(a.objectives, b.objectives);
}

/** The box on the grid whose sides are 2^level times the finest. */
function boxAt(finest: readonly number[], level: number): number[] {
  return finest.map((index) => Math.floor(index / 2 ** level));
}

const sum = (numbers: readonly number[]) => numbers.reduce((total, x) => total + x, 0);
