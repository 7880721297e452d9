import { parentPort, workerData } from 'node:worker_threads';
import { RimwrightError } from '../base/errors.ts';
import type { Job, Orders, Reply } from './messages.ts';
import { Workshop } from './workshop.ts';

/** The body of a worker thread: takes a job, does it, replies, and waits for the next. */
const workshop = new Workshop(workerData as Orders);

parentPort?.on('message', async (job: Job) => {
  parentPort?.postMessage(await replyTo(job));
});

async function replyTo(job: Job): Promise<Reply> {
  try {
    return { result: await workshop.do(job) };
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    const { code, problems } =
      error instanceof RimwrightError ? error : { code: 'machine' as const, problems: [] };
    return { error: { code, message, problems } };
  }
}
