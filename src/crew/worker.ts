import { BroadcastChannel, parentPort, workerData } from 'node:worker_threads';
import { RimwrightError } from '../base/errors.ts';
import type { SharedTables } from '../reading/tableShelf.ts';
import type { Job, Reply, WorkerOrders } from './messages.ts';
import { Workshop } from './workshop.ts';

/** The body of a worker thread: takes a job, does it, replies, and waits for the next. Tables are built once for the whole crew. */
const orders = workerData as WorkerOrders;
const workshop = new Workshop(orders);
const crewmates = new BroadcastChannel(orders.channel);
crewmates.onmessage = (message) => workshop.tables.take((message as { data: SharedTables }).data);
workshop.tables.fresh();

parentPort?.on('message', async (job: Job) => {
  const reply = await replyTo(job);
  for (const tables of workshop.tables.fresh()) crewmates.postMessage(tables);
  parentPort?.postMessage(reply);
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
