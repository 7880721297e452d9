/** A worker that ends at every job but those for a disc. */
import { parentPort } from 'node:worker_threads';

parentPort.on('message', ({ variant }) => {
  if (variant !== 'disc') process.exit(9);
  parentPort.postMessage({ result: variant });
});
