import type { RoundsProgress } from './rounds.ts';

/** How far a search has come, and how long it takes. */
export interface Progress extends RoundsProgress {
  /** Seconds spent, those before an interruption counted in. */
  elapsedS: number;
  /** Seconds to go for the rounds, as far as the pace so far tells; null before anything was tried. */
  remainingS: number | null;
}

/** Keeps the time of a search that may have been interrupted. */
export class Pace {
  readonly #earlierS: number;
  readonly #started = performance.now();
  #recalled = 0;

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
    const left = Math.max(0, candidates - evaluations);
    const remainingS = fresh > 0 ? ((elapsedS - this.#earlierS) / fresh) * left : null;
    return { ...progress, elapsedS, remainingS };
  }
}
