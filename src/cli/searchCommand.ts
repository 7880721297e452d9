import { jsonText } from '../run/jsonText.ts';
import { missesOf } from '../run/ranking.ts';
import type { Nearest } from '../run/results.ts';
import { searchToJson } from '../run/results.ts';
import type { SearchResult } from '../run/search.ts';
import { search, smallest } from '../run/search.ts';
import type { SearchRun } from '../run/searchRun.ts';
import { diffusionWarning, fieldsWarning, outlineOf, present } from '../run/warnings.ts';
import { worstOf } from '../score/scores.ts';
import { EXIT } from './exit.ts';
import { printFront } from './front.ts';
import { interruptible, uninterrupted } from './interrupt.ts';
import { note, print, warn } from './notes.ts';
import { printEnding } from './printEnding.ts';
import { resultFiles } from './resultFiles.ts';
import type { ResumableOptions } from './resuming.ts';
import { keepingCheckpoint, noteResume, openRun } from './resuming.ts';
import { withProgress, workersOf } from './searching.ts';

const COMMAND = 'search';

/** Share of the candidates that looking for the nearest design gets, where nothing keeps the brief's limits. */
const NEAREST_SHARE = 0.25;
const LEAST_CANDIDATES = 100;

/** Runs `rimwright search` and gives its exit code. */
export async function run(place: string | undefined, options: ResumableOptions): Promise<number> {
  const run = await openRun(COMMAND, place, options, async () => null);
  const { opened, folder } = run;
  const { brief } = opened;
  const { result, nearest } = await keepingCheckpoint(run, COMMAND, options, () =>
    interruptible((signal) => searchOrNearest(run, options, signal)),
  );
  const { designs } = result;
  const warnings = present([
    fieldsWarning(brief.task, designs),
    diffusionWarning(brief.task, designs.map(outlineOf)),
  ]);
  const json = searchToJson(brief, result, nearest, warnings);
  const files = resultFiles(opened, result, json, workersOf(options));
  const written = tried(() => uninterrupted(() => run.write(files, !result.stopped)));
  warn(warnings);
  if (options.json) print(jsonText(json));
  else {
    printFront(brief, result, nearest);
    printEnding(brief, result);
  }
  // A long search is not lost where the disk fails: what it found has been printed.
  if ('fault' in written) {
    noteResume(folder, COMMAND);
    throw written.fault;
  }
  const parts = '  report.html  front.json  front.csv  run.json  drawings/';
  if (!options.json) print(`\nWritten to ${folder}/\n${parts}`);
  else if (!options.quiet) note(`Written to ${folder}`);
  if (result.stopped) noteResume(folder, COMMAND);
  return designs.some(({ meetsTarget }) => meetsTarget) ? EXIT.done : EXIT.target;
}

function tried<T>(work: () => T): { value: T } | { fault: unknown } {
  try {
    return { value: work() };
  } catch (fault) {
    return { fault };
  }
}

/** Searches; where no design keeps the brief's limits at all, looks for the one that comes nearest. */
async function searchOrNearest(
  run: SearchRun,
  options: ResumableOptions,
  signal: AbortSignal,
): Promise<{ result: SearchResult; nearest: Nearest | null }> {
  const { brief } = run.opened;
  const result = await withProgress(brief, options, signal, run.memory('front'), (course) =>
    search(brief, course),
  );
  const { designs } = result;
  if (designs.some(({ meetsTarget }) => meetsTarget)) return { result, nearest: null };
  const [best] = designs.toSorted((a, b) => worstOf(a.scores) - worstOf(b.scores));
  if (best !== undefined) return { result, nearest: { design: best, misses: missesOf(best, brief.task) } };
  if (result.stopped || signal.aborted) return { result, nearest: null };
  if (!options.quiet)
    note('No design keeps the limits of this brief. Looking for the one that comes nearest.');
  const candidates = Math.max(LEAST_CANDIDATES, Math.round(NEAREST_SHARE * brief.search.candidates));
  const shorter = { ...brief, search: { ...brief.search, candidates } };
  const more = await withProgress(shorter, options, signal, run.memory('nearest'), (course) =>
    smallest(shorter, 'time', course),
  );
  const { nearest: design, misses } = more;
  return {
    result: {
      designs: more.design === null ? [] : [more.design],
      evaluations: result.evaluations + more.evaluations,
      seconds: result.seconds + more.seconds,
      stopped: more.stopped,
      ending: more.ending,
    },
    nearest: design && more.design === null ? { design, misses } : null,
  };
}
