/** A worker that answers every job with the problem that its orders name. */
import { parentPort, workerData } from 'node:worker_threads';

parentPort.on('message', ({ id }) =>
  parentPort.postMessage({
    id,
    error: { code: 'input', message: 'refused', problems: [workerData.problem] },
  }),
);
