import type { Job } from './messages.ts';

/** A job in a few words, for messages: `evolve rings-2, stream 41`. */
export function jobName(job: Job): string {
  if (job.kind === 'explore') return `${job.method} ${job.variant}, stream ${job.stream}`;
  if (job.kind === 'mask') return `least masks at ${job.distanceM} m`;
  if (job.kind === 'builds') return `builds at ${job.plan.distanceM} m`;
  return `finishing of ${job.candidates.map(({ variant }) => variant).join(', ')}`;
}
