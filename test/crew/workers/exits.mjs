/** A worker that ends at its first job, with the exit code that its orders name. */
import { parentPort, workerData } from 'node:worker_threads';

parentPort.on('message', () => process.exit(workerData.exitCode));
