/** A worker that throws at its first job, outside of anything that would catch it. */
import { parentPort } from 'node:worker_threads';

parentPort.on('message', () => {
  throw new Error('out of paper');
});
