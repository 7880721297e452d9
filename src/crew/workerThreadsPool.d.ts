/** The part of worker-threads-pool 2.0.0 that is used; the package has no types of its own. */
declare module 'worker-threads-pool' {
  import type { Worker, WorkerOptions } from 'node:worker_threads';

  export default class Pool {
    constructor(options: { max: number });
    acquire(
      filename: string,
      options: WorkerOptions,
      callback: (error: Error | null, worker: Worker) => void,
    ): void;
  }
}
