import type { Variant } from '../outline/families/family.ts';
import { Judge, REPORT_FINENESS, SEARCH_FINENESS } from '../score/judge.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { searchSpace } from '../score/searchSpace.ts';
import { explore } from './explore.ts';
import { finish } from './finish.ts';
import type { Job, Orders, ResultOf } from './messages.ts';

/** Does jobs one after the other: what a worker holds, and what a test can hold without a thread. */
export class Workshop {
  readonly #orders: Orders;
  readonly #judge: Judge;
  /** Made when the first design is to be finished: it solves more wavelengths. */
  #fineJudge: Judge | null = null;
  readonly #space: SearchSpace;

  constructor(orders: Orders) {
    this.#orders = orders;
    this.#judge = new Judge(orders.task, SEARCH_FINENESS);
    this.#space = searchSpace(orders.task, orders.families, this.#judge);
  }

  /** Every way to draw that the brief allows. */
  get variants(): readonly Variant[] {
    return this.#space.variants;
  }

  do<J extends Job>(job: J): ResultOf<J> {
    if (job.kind === 'explore') return explore(job, this.#judge, this.#space) as ResultOf<J>;
    this.#fineJudge ??= new Judge(this.#orders.task, REPORT_FINENESS);
    return finish(job, this.#fineJudge, this.#space) as ResultOf<J>;
  }
}
