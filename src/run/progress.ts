import type { RoundsProgress } from './quest.ts';

/** How far a search has come, and how long it takes. */
export interface Progress extends RoundsProgress {
  /** `judging`: the rounds are over, and the best are judged finely, some of them refined once more. */
  phase: 'searching' | 'judging';
  /** Seconds spent, those before an interruption counted in. */
  elapsedS: number;
  /** Seconds to go for the rounds, as far as their pace so far tells; null where it does not. */
  remainingS: number | null;
}

/** Keeps the time of a search that may have been interrupted. */
export class Pace {
  readonly #earlierS: number;
  readonly #started = performance.now();
  #recalled = 0;
  /** When the first new result came: what it takes to start is no measure of the pace. */
  #first: { elapsedS: number; fresh: number } | null = null;

  /** @param earlierS seconds spent before the interruption */
  constructor(earlierS: number) {
    this.#earlierS = earlierS;
  }

  get elapsedS(): number {
    return this.#earlierS + (performance.now() - this.#started) / 1000;
  }

  /** Counts evaluations that were there already: they took no time today. */
  recall(evaluations: number): void {
    this.#recalled += evaluations;
  }

  /** Adds the times to what the rounds say. */
  timed(progress: RoundsProgress): Progress {
    const { elapsedS } = this;
    const { evaluations, candidates } = progress;
    const fresh = evaluations - this.#recalled;
    if (this.#first === null && fresh > 0) this.#first = { elapsedS, fresh };
    const since = this.#first ?? { elapsedS, fresh };
    const left = Math.max(0, candidates - evaluations);
    const remainingS =
      fresh > since.fresh ? ((elapsedS - since.elapsedS) / (fresh - since.fresh)) * left : null;
    return { ...progress, phase: 'searching', elapsedS, remainingS };
  }
}
