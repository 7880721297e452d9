import { LinearModels } from '../numeric/linearModel.ts';
import type { Fields, TableShelf } from '../reading/tableShelf.ts';
import { BuildReader } from '../score/buildReader.ts';
import { Certifier } from '../score/certifier.ts';
import { leadingFields } from '../score/farZoneError.ts';
import { REPORT_FINENESS, SEARCH_FINENESS } from '../score/fineness.ts';
import { guardedTask } from '../score/guards.ts';
import { Judge } from '../score/judge.ts';
import { boundTools } from '../score/maskBound.ts';
import type { SearchSpace } from '../score/searchSpace.ts';
import { searchSpace } from '../score/searchSpace.ts';
import { readBuilds } from './buildsJob.ts';
import { explore } from './explore.ts';
import type { FinishingJudges } from './finish.ts';
import { finish } from './finish.ts';
import type { MaskTools } from './maskJob.ts';
import { findMasks } from './maskJob.ts';
import type { Job, Orders, Result, ResultOf } from './messages.ts';

/** Does jobs one after the other: what a worker holds, and what a test can hold without a thread. */
export class Workshop {
  readonly #orders: Orders;
  readonly #judge: Judge;
  readonly #fields: Fields;
  /** Made when the first design is to be finished: they solve more wavelengths. */
  #fine: FinishingJudges | null = null;
  /** Likewise, for the first least mask. */
  #masks: MaskTools | null = null;
  /** Likewise, for the first build of a design; all jobs of a crew are about one. */
  #builds: BuildReader | null = null;
  readonly #space: SearchSpace;

  constructor(orders: Orders) {
    this.#orders = orders;
    this.#fields = leadingFields(orders.task);
    this.#judge = new Judge(guardedTask(orders.task), SEARCH_FINENESS, this.#fields);
    this.#space = searchSpace(orders.task, orders.families, this.#judge);
  }

  /** The search's tables: the same for every workshop with these orders. */
  get tables(): TableShelf {
    return this.#judge.tables;
  }

  /** Every way to draw, and every distance, that the brief allows. */
  get space(): SearchSpace {
    return this.#space;
  }

  async do<J extends Job>(job: J): Promise<ResultOf<J>> {
    return (await this.#resultOf(job)) as ResultOf<J>;
  }

  async #resultOf(job: Job): Promise<Result> {
    switch (job.kind) {
      case 'explore':
        return explore(job, this.#judge, this.#space);
      case 'finish':
        this.#fine ??= this.#finishingJudges();
        return finish(job, this.#fine, this.#space);
      case 'mask':
        this.#masks ??= await this.#maskTools();
        return findMasks(job, this.#orders.task, this.#masks);
      case 'builds':
        this.#builds ??= new BuildReader(job.plan);
        return readBuilds(job, this.#builds);
    }
  }

  async #maskTools(): Promise<MaskTools> {
    const models = await LinearModels.load();
    return { models, ...boundTools(this.#orders.task, this.#fields) };
  }

  #finishingJudges(): FinishingJudges {
    const { task } = this.#orders;
    const other = this.#fields === 'far' ? 'exact' : 'far';
    const judge = new Judge(task, REPORT_FINENESS, this.#fields);
    return {
      judge,
      certifier: new Certifier(judge, this.#fields),
      otherJudge: new Judge(task, REPORT_FINENESS, other),
      fields: this.#fields,
    };
  }
}
