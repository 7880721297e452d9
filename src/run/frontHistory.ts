import { hypervolume } from '../search/hypervolume.ts';

/** One front: rows of logarithms of correction, time and radius. */
type Front = readonly (readonly number[])[];

/** Snapshots kept: a search is looked back on in steps of a hundredth of its budget. */
const SNAPSHOTS = 100;

/** The last part of a search that it is asked how much it still brought. */
const LAST_SHARE = 0.25;

/** How the front of a search grew. */
export class FrontHistory {
  readonly #step: number;
  readonly #snapshots: { evaluations: number; front: Front }[] = [];

  /** @param candidates budget of the search */
  constructor(candidates: number) {
    this.#step = candidates / SNAPSHOTS;
  }

  /** Takes note of the front after so many evaluations, unless the last note is too near. */
  note(evaluations: number, front: () => Front): void {
    const last = this.#snapshots.at(-1);
    if (last !== undefined && evaluations < last.evaluations + this.#step) return;
    this.#snapshots.push({ evaluations, front: front() });
  }

  /**
   * How much the front moved in the last quarter of the evaluations: the share of its hypervolume (in logarithms) that was
   * not there before, from 0 to 1; 1 where there was none before, null where there is no front at all. Its corner is the worst
   * of either front in each objective and a factor of e beyond, so that its ends count as well.
   */
  movedInLastQuarter(evaluations: number, final: Front): number | null {
    if (final.length === 0) return null;
    const before = this.#snapshots.findLast((one) => one.evaluations <= (1 - LAST_SHARE) * evaluations);
    const earlier = before?.front ?? [];
    const corner = [0, 1, 2].map((j) => 1 + Math.max(...[...final, ...earlier].map((row) => row[j])));
    const whole = hypervolume(final, corner);
    // Boxes of the archive that grew may have given up a point: the front went nowhere then.
    return Math.max(0, 1 - hypervolume(earlier, corner) / whole);
  }
}
