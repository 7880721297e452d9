import type { Variant } from '../outline/families/family.ts';
import type { Fields } from '../reading/tableShelf.ts';
import { Certifier } from '../score/certifier.ts';
import { fieldsFor, leadingFields } from '../score/farZoneError.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../score/fineness.ts';
import { Judge } from '../score/judge.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { searchSpace } from '../score/searchSpace.ts';
import { explore } from './explore.ts';
import type { FinishingJudges } from './finish.ts';
import { finish } from './finish.ts';
import type { Job, Orders, ResultOf } from './messages.ts';

/** Does jobs one after the other: what a worker holds, and what a test can hold without a thread. */
export class Workshop {
  readonly #orders: Orders;
  readonly #judge: Judge;
  readonly #fields: Fields;
  /** Made when the first design is to be finished: they solve more wavelengths. */
  #fine: FinishingJudges | null = null;
  readonly #space: SearchSpace;

  constructor(orders: Orders) {
    this.#orders = orders;
    this.#fields = leadingFields(orders.task);
    this.#judge = new Judge(orders.task, SEARCH_FINENESS, this.#fields);
    this.#space = searchSpace(orders.task, orders.families, this.#judge);
  }

  /** Every way to draw that the brief allows. */
  get variants(): readonly Variant[] {
    return this.#space.variants;
  }

  do<J extends Job>(job: J): ResultOf<J> {
    if (job.kind === 'explore') return explore(job, this.#judge, this.#space) as ResultOf<J>;
    this.#fine ??= this.#finishingJudges();
    return finish(job, this.#fine, this.#space) as ResultOf<J>;
  }
  #finishingJudges(): FinishingJudges {
    const { task } = this.#orders;
    const other = fieldsFor(task, this.#fields === 'far' ? 'exact' : 'far');
    const judge = new Judge(task, REPORT_FINENESS, this.#fields);
    return {
      judge,
      certifier: new Certifier(judge, this.#fields),
      otherJudge: other === this.#fields ? null : new Judge(task, REPORT_FINENESS, other),
      fields: this.#fields,
    };
  }
}
