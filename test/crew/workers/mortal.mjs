/** A worker that does its jobs well and ends, without a word, at its third. */
import { parentPort, workerData } from 'node:worker_threads';
import { Workshop } from '../../../dist/crew/workshop.js';

const workshop = new Workshop(workerData);
let jobs = 0;
parentPort.on('message', async (job) => {
  if (++jobs === 3) process.exit(0);
  parentPort.postMessage({ result: await workshop.do(job) });
});
