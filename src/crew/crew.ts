import { randomUUID } from 'node:crypto';
import { fileURLToPath } from 'node:url';
import type { Worker } from 'node:worker_threads';
import Pool from 'worker-threads-pool';
import { RimwrightError } from '../base/errors.ts';
import { jobName } from './jobName.ts';
import type { Job, Orders, Reply, ResultOf, WorkerOrders } from './messages.ts';

/** A job on its way, and what to do with its outcome. */
interface Pending {
  job: Job;
  /** Workers that ended over it. */
  deaths: number;
  resolve: (result: unknown) => void;
  reject: (error: Error) => void;
}

/** A worker, the job in its hands, and what it said before it ended. */
interface Member {
  worker: Worker;
  pending: Pending | null;
  lastWords: Error | null;
}

/** A job that as many workers end over is at fault itself. */
const MOST_DEATHS = 3;

/**
 * A crew of worker threads that do jobs side by side.
 *
 * The pool holds the crew within its number: each worker is acquired once and kept (a worker gives its place back only
 * when it exits), and jobs travel by messages. Which worker does a job does not change its result, so the job of a worker
 * that ends, for want of memory or whatever else, is simply done again by one that takes its place.
 */
export class Crew {
  readonly #pool: Pool;
  readonly #size: number;
  readonly #orders: WorkerOrders;
  readonly #entry: string;
  readonly #members = new Set<Member>();
  readonly #waiting: Pending[] = [];
  /** Workers asked of the pool that are not there yet. */
  #hiring = 0;
  #dismissed: Error | null = null;

  private constructor(size: number, orders: Orders, entry: string) {
    this.#pool = new Pool({ max: size });
    this.#size = size;
    this.#orders = { ...orders, channel: randomUUID() };
    this.#entry = entry;
  }

  /**
   * Starts the workers.
   *
   * @param size how many, 1 or more
   * @param entry absolute path of the compiled worker, for tests that run from the sources
   */
  static async start(size: number, orders: Orders, entry = workerEntry()): Promise<Crew> {
    const crew = new Crew(size, orders, entry);
    await Promise.all(Array.from({ length: size }, () => crew.#hire()));
    return crew;
  }

  /**
   * Hands a job to the next free worker. Rejects with what the worker met, when the crew is dismissed, or where one worker
   * after the other ends over this job.
   */
  do<J extends Job>(job: J): Promise<ResultOf<J>> {
    return new Promise<ResultOf<J>>((resolve, reject) => {
      if (this.#dismissed) return reject(this.#dismissed);
      this.#waiting.push({ job, deaths: 0, resolve: resolve as (result: unknown) => void, reject });
      this.#handOut();
    });
  }

  /** Stops all workers at once; jobs that are not done are rejected. */
  async dismiss(): Promise<void> {
    this.#dismissed ??= new RimwrightError('machine', 'the search was stopped');
    for (const member of this.#members) {
      member.pending?.reject(this.#dismissed);
      member.pending = null;
    }
    for (const { reject } of this.#waiting.splice(0)) reject(this.#dismissed);
    await Promise.all([...this.#members].map(({ worker }) => worker.terminate()));
  }

  async #hire(): Promise<void> {
    this.#hiring++;
    const worker = await new Promise<Worker>((resolve, reject) => {
      this.#pool.acquire(this.#entry, { workerData: this.#orders }, (error, acquired) =>
        error ? reject(error) : resolve(acquired),
      );
    }).finally(() => this.#hiring--);
    const member: Member = { worker, pending: null, lastWords: null };
    worker.on('message', (reply: Reply) => this.#settle(member, reply));
    worker.on('error', (error) => {
      member.lastWords = error;
    });
    // Follows an error too. Whatever its code says, a worker that ends by itself leaves its job undone.
    worker.on('exit', (code) => this.#bury(member, code));
    this.#members.add(member);
    if (this.#dismissed) void worker.terminate();
    else this.#handOut();
  }

  #handOut(): void {
    for (const member of this.#members) {
      if (member.pending !== null) continue;
      const pending = this.#waiting.shift();
      if (pending === undefined) return;
      member.pending = pending;
      member.worker.postMessage(pending.job);
    }
    // Only for a job that waits: a worker that cannot start would otherwise be replaced for ever.
    for (let wanted = this.#waiting.length - this.#hiring; wanted > 0 && this.#hasRoom; wanted--) {
      this.#hire().catch((error: Error) => this.#waiting.shift()?.reject(error));
    }
  }

  /** The pool must never be asked for more than it holds. */
  get #hasRoom(): boolean {
    return this.#members.size + this.#hiring < this.#size;
  }

  #settle(member: Member, reply: Reply): void {
    const { pending } = member;
    member.pending = null;
    if ('error' in reply) {
      const { code, message, problems } = reply.error;
      pending?.reject(new RimwrightError(code, message, problems));
    } else {
      pending?.resolve(reply.result);
    }
    this.#handOut();
  }

  /** Hands the job of a worker that has ended to another one. */
  #bury(member: Member, exitCode: number): void {
    this.#members.delete(member);
    if (this.#dismissed) return;
    const { pending, lastWords } = member;
    if (pending !== null && ++pending.deaths < MOST_DEATHS) this.#waiting.unshift(pending);
    else pending?.reject(faultOf(pending.job, exitCode, lastWords));
    this.#handOut();
  }
}

function faultOf(job: Job, exitCode: number, lastWords: Error | null): RimwrightError {
  const cause = lastWords === null ? `it ended with exit code ${exitCode}` : lastWords.message;
  return new RimwrightError(
    'machine',
    `a worker failed, and so did ${MOST_DEATHS - 1} in its place (${jobName(job)}): ${cause}`,
  );
}

/** The compiled worker beside this file. */
function workerEntry(): string {
  return fileURLToPath(new URL('./worker.js', import.meta.url));
}
