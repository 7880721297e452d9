import { note } from './notes.ts';

/**
 * Runs a search that Ctrl-C ends early: the first one aborts its signal, so that what was found is still written. From
 * then on Ctrl-C has its usual effect, which ends the process at once (a shell sees exit code 130).
 */
export async function interruptible<T>(work: (signal: AbortSignal) => Promise<T>): Promise<T> {
  const controller = new AbortController();
  const stop = () => {
    note('Stopping: finishing what was found. Ctrl-C again ends at once.');
    controller.abort();
  };
  process.once('SIGINT', stop);
  try {
    return await work(controller.signal);
  } finally {
    process.removeListener('SIGINT', stop);
  }
}

const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const;

/** Holds off signals while something is written that must not be left half-done. */
export function uninterrupted<T>(write: () => T): T {
  const wait = () => {};
  for (const signal of SIGNALS) process.on(signal, wait);
  try {
    return write();
  } finally {
    for (const signal of SIGNALS) process.removeListener(signal, wait);
  }
}
