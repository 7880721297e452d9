import { availableParallelism } from 'node:os';
import type { Brief } from '../run/brief.ts';
import type { CourseOptions } from '../run/course.ts';
import type { JobMemory } from '../run/journal.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import { openBrief } from '../run/openBrief.ts';
import type { Progress } from '../run/progress.ts';
import { note, noteDefaults } from './notes.ts';
import { openProgress } from './progress.ts';

/** Options that every search has. */
export interface SearchingOptions {
  json?: true;
  quiet?: true;
  workers?: number;
  candidates?: number;
  seed?: number;
}

/** Workers unless the user says how many: one a core, and no more than gain anything. */
const MOST_WORKERS = 8;

/** How many workers a search gets. */
export function workersOf({ workers }: SearchingOptions): number {
  return workers ?? Math.min(availableParallelism(), MOST_WORKERS);
}

/** Opens a brief for a search, and says on standard error what it left out. */
export async function openForSearch(place: string, options: SearchingOptions): Promise<OpenedBrief> {
  const { candidates, seed, quiet } = options;
  const opened = await openBrief(place, {
    ...(candidates !== undefined && { candidates }),
    ...(seed !== undefined && { seed }),
  });
  if (!quiet) noteDefaults(opened.brief.defaults);
  return opened;
}

/** Runs one search with its progress on standard error. */
export async function withProgress<T>(
  { title, search }: Brief,
  options: SearchingOptions,
  signal: AbortSignal,
  memory: JobMemory | null,
  work: (course: CourseOptions) => Promise<T>,
): Promise<T> {
  const quiet = options.quiet ?? false;
  const workers = workersOf(options);
  if (!quiet) note(`${title}: ${search.candidates} candidates, seed ${search.seed}, workers: ${workers}`);
  const display = openProgress(search.candidates, quiet);
  try {
    const onProgress = (progress: Progress) => display.show(progress);
    return await work({ workers, signal, onProgress, ...(memory && { memory }) });
  } finally {
    display.close();
  }
}
