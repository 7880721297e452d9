/** A worker that answers every job with the problem that its orders name. */
import { parentPort, workerData } from 'node:worker_threads';

parentPort.on('message', () =>
  parentPort.postMessage({
    error: { code: 'input', message: 'refused', problems: [workerData.problem] },
  }),
);
