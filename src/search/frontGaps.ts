import type { RandomSource } from '../base/random.ts';
import { alongFront } from './frontMember.ts';
import { hypervolume } from './hypervolume.ts';

/** Worst corner of the hypervolume, in units of the spans: a tenth beyond the worst, so that the ends of the front count too. */
export const CORNER = 1.1;

/** Room beyond an end of the front in an objective that only the end itself bounds: little, so that its turn comes late. */
const ROOM_BEYOND = 3e-4;

/** Shortest and longest step beyond the front, in units of the spans, by their logarithm alike. */
const STEPS_BEYOND = [0.003, 3] as const;

/** A place where the front left room: no point of it lay below the corner, and some lay at every larger one. */
export interface FilledGap {
  /** In the objectives; +Infinity where no point bounds it. */
  corner: readonly number[];
  /** For each objective the point that bounds the corner there. */
  holders: readonly (readonly number[] | undefined)[];
}

interface Gap extends FilledGap {
  /** Hypervolume, in units of the spans, between the corner and the middle of its holders. */
  room: number;
  /** How often a point that was meant for it missed it. */
  misses: number;
  isFilled: boolean;
}

/**
 * All gaps of the front of the points told so far: about twice as many as points for three objectives.
 *
 * A point brings hypervolume if and only if it lies below the corner of a gap; what it brings follows from those gaps alone.
 * Source: Klamroth, Lacour & Vanderpooten (2015), Eur. J. Oper. Res. 245, 767 (local upper bounds, with redundancy avoided).
 */
export class FrontGaps {
  private readonly gaps: Gap[];
  /** The corners of all gaps, one after the other: they are looked at most often. */
  private readonly corners: number[];
  private given: Gap[] = [];
  private best: readonly number[];
  private spans: readonly number[];

  /** @param objectives 2 or 3 */
  constructor(objectives: number) {
    this.best = new Array<number>(objectives).fill(0);
    this.spans = new Array<number>(objectives).fill(1);
    this.gaps = [
      {
        corner: new Array<number>(objectives).fill(Number.POSITIVE_INFINITY),
        holders: new Array<undefined>(objectives).fill(undefined),
        room: 0,
        misses: 0,
        isFilled: false,
      },
    ];
    this.corners = this.gaps[0].corner.slice();
  }

  /** Measures from now on by the best objectives and the spans. */
  measure(best: readonly number[], spans: readonly number[]): void {
    this.best = best;
    this.spans = spans;
    for (const gap of this.gaps) gap.room = this.roomIn(gap);
  }

  /**
   * Takes a point in.
   *
   * @returns the gaps that it lies in; none where another point is as good
   */
  add(point: readonly number[]): FilledGap[] {
    const { gaps, corners } = this;
    const width = point.length;
    const filled: Gap[] = [];
    for (let k = gaps.length - 1; k >= 0; k--) {
      let j = 0;
      while (j < width && point[j] < corners[width * k + j]) j++;
      if (j < width) continue;
      gaps[k].isFilled = true;
      filled.push(gaps[k]);
      // The last one was looked at before.
      const last = gaps.length - 1;
      gaps[k] = gaps[last];
      for (j = 0; j < width; j++) corners[width * k + j] = corners[width * last + j];
      gaps.length = last;
      corners.length = width * last;
    }
    for (const gap of filled) for (let j = 0; j < width; j++) this.split(gap, j, point);
    return filled;
  }

  /** Hypervolume that a point brings, in units of the spans, from the gaps that it filled. */
  brought(point: readonly number[], filled: readonly FilledGap[]): number {
    // Seen from the point, the corners dominate what it brings.
    const reversed = (row: readonly number[]) => this.placed(row).map((x) => -x);
    return hypervolume(
      filled.map(({ corner }) => reversed(corner)),
      reversed(point),
    );
  }

  /**
   * The place along the front of the gap with most room, less of it after every miss; each is given once a round. Where
   * nothing bounds the gap on one side, the place is somewhere on that side: the front may go on there.
   *
   * @returns undefined where no gap is left
   */
  take(random: RandomSource): number[] | undefined {
    let most = 0;
    let found: Gap | undefined;
    for (const gap of this.gaps) {
      if (!(gap.room > most) || this.given.includes(gap)) continue;
      most = gap.room;
      found = gap;
    }
    if (!found) return undefined;
    this.given.push(found);
    const [near, far] = STEPS_BEYOND;
    const { holders } = found;
    return alongFront(
      this.middle(found).map((x, j) => (holders[j] ? x : x + near * (far / near) ** random.uniform())),
    );
  }

  /** Gaps that were given out and are there still were missed. */
  endRound(): void {
    for (const gap of this.given) {
      if (gap.isFilled) continue;
      gap.misses++;
      gap.room = this.roomIn(gap);
    }
    this.given = [];
  }

  /** Keeps the part of a gap that lies below the point in objective j, if no other gap covers it. */
  private split({ corner, holders }: Gap, j: number, point: readonly number[]): void {
    for (let i = 0; i < holders.length; i++) {
      const holder = holders[i];
      // Of equal coordinates the later one counts as larger, so that nothing is lost.
      if (i !== j && holder && holder[j] > point[j]) return;
    }
    const gap: Gap = {
      corner: corner.with(j, point[j]),
      holders: holders.with(j, point),
      room: 0,
      misses: 0,
      isFilled: false,
    };
    gap.room = this.roomIn(gap);
    this.gaps.push(gap);
    this.corners.push(...gap.corner);
  }

  private roomIn(gap: Gap): number {
    const middle = this.middle(gap);
    const corner = this.placed(gap.corner);
    const isEnd = gap.holders.filter((holder) => holder).length === 1;
    const room = corner.reduce(
      (product, x, j) => product * Math.max(isEnd ? ROOM_BEYOND : 0, x - middle[j]),
      1,
    );
    return room * 0.5 ** gap.misses;
  }

  private middle({ holders }: Gap): number[] {
    const sum = this.best.map(() => 0);
    let count = 0;
    for (const holder of holders) {
      if (!holder) continue;
      count++;
      for (let j = 0; j < sum.length; j++) sum[j] += (holder[j] - this.best[j]) / this.spans[j];
    }
    return sum.map((x) => (count > 0 ? x / count : CORNER));
  }

  private placed(point: readonly number[]): number[] {
    return point.map((x, j) => Math.min(CORNER, (x - this.best[j]) / this.spans[j]));
  }
}
