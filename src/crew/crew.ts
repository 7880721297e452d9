import { fileURLToPath } from 'node:url';
import type { Worker } from 'node:worker_threads';
import Pool from 'worker-threads-pool';
import { RimwrightError } from '../base/errors.ts';
import type { Job, Orders, Reply, ResultOf } from './messages.ts';

/** A job on its way, and what to do with its outcome. */
interface Pending {
  job: Job;
  resolve: (result: unknown) => void;
  reject: (error: Error) => void;
}

/**
 * A crew of worker threads that do jobs side by side.
 *
 * The pool holds the crew within its number: each worker is acquired once and kept (a worker gives its place back only
 * when it exits), and jobs travel by messages. Which worker does a job does not change its result.
 */
export class Crew {
  readonly #pool: Pool;
  readonly #workers: Worker[] = [];
  readonly #idle: Worker[] = [];
  readonly #waiting: { id: number; pending: Pending }[] = [];
  readonly #underway = new Map<number, Pending>();
  #nextId = 0;
  #broken: Error | null = null;

  private constructor(size: number) {
    this.#pool = new Pool({ max: size });
  }

  /**
   * Starts the workers.
   *
   * @param size how many, 1 or more
   * @param entry absolute path of the compiled worker, for tests that run from the sources
   */
  static async start(size: number, orders: Orders, entry = workerEntry()): Promise<Crew> {
    const crew = new Crew(size);
    await Promise.all(Array.from({ length: size }, () => crew.#hire(orders, entry)));
    return crew;
  }

  /** Hands a job to the next free worker. Rejects with what the worker met, or when the crew is dismissed. */
  do<J extends Job>(job: J): Promise<ResultOf<J>> {
    return new Promise<ResultOf<J>>((resolve, reject) => {
      if (this.#broken) return reject(this.#broken);
      const pending: Pending = { job, resolve: resolve as (result: unknown) => void, reject };
      this.#waiting.push({ id: this.#nextId++, pending });
      this.#handOut();
    });
  }

  /** Stops all workers at once; jobs that are not done are rejected. */
  async dismiss(): Promise<void> {
    this.#fail(new RimwrightError('machine', 'the search was stopped'));
    await Promise.all(this.#workers.map((worker) => worker.terminate()));
  }

  async #hire(orders: Orders, entry: string): Promise<void> {
    const worker = await new Promise<Worker>((resolve, reject) => {
      this.#pool.acquire(entry, { workerData: orders }, (error, acquired) =>
        error ? reject(error) : resolve(acquired),
      );
    });
    worker.on('message', (reply: Reply) => this.#settle(worker, reply));
    worker.on('error', (error) => this.#fail(asCrewError(error)));
    // Whatever its code says, a worker that ends by itself leaves its job undone; after a dismissal this changes nothing.
    worker.on('exit', (code) =>
      this.#fail(new RimwrightError('machine', `a worker ended with exit code ${code}`)),
    );
    this.#workers.push(worker);
    this.#idle.push(worker);
  }

  #handOut(): void {
    while (this.#waiting.length > 0 && this.#idle.length > 0) {
      const { id, pending } = this.#waiting.shift() as { id: number; pending: Pending };
      this.#underway.set(id, pending);
      (this.#idle.pop() as Worker).postMessage({ id, job: pending.job });
    }
  }

  #settle(worker: Worker, reply: Reply): void {
    const pending = this.#underway.get(reply.id);
    this.#underway.delete(reply.id);
    this.#idle.push(worker);
    if ('error' in reply) {
      const { code, message, problems } = reply.error;
      pending?.reject(new RimwrightError(code, message, problems));
    } else {
      pending?.resolve(reply.result);
    }
    this.#handOut();
  }

  #fail(error: Error): void {
    if (this.#broken) return;
    this.#broken = error;
    for (const { reject } of this.#underway.values()) reject(error);
    for (const { pending } of this.#waiting) pending.reject(error);
    this.#underway.clear();
    this.#waiting.length = 0;
  }
}

function asCrewError(error: Error): RimwrightError {
  if (error instanceof RimwrightError) return error;
  return new RimwrightError('machine', `a worker failed: ${error.message}`);
}

/** The compiled worker beside this file. */
function workerEntry(): string {
  return fileURLToPath(new URL('./worker.js', import.meta.url));
}
