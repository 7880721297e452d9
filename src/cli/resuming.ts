import { inputError } from '../base/errors.ts';
import type { OpenedBrief } from '../run/openBrief.ts';
import { prepareFolder, UNFINISHED } from '../run/resultsFolder.ts';
import { SearchRun } from '../run/searchRun.ts';
import { note } from './notes.ts';
import type { SearchingOptions } from './searching.ts';
import { openForSearch } from './searching.ts';

/** Options of the commands that keep a checkpoint. */
export interface ResumableOptions extends SearchingOptions {
  out?: string;
  resume?: string;
}

/** Where results folders go unless the user says. */
const RESULTS = 'results';

/**
 * Begins a command's run in a results folder of its own, or goes on with one where the user says so.
 *
 * @param ask what the command is asked besides the brief, as plain data
 * @param fixed other options that cannot be given when a run goes on
 * @throws RimwrightError as `SearchRun` and `openBrief`
 */
export async function openRun<Asked>(
  command: string,
  place: string | undefined,
  options: ResumableOptions,
  ask: (opened: OpenedBrief) => Promise<Asked>,
  fixed: Record<string, unknown> = {},
): Promise<SearchRun<Asked>> {
  const { out, resume, candidates, seed, quiet } = options;
  if (resume !== undefined) {
    refuseGiven({ brief: place, '--candidates': candidates, '--seed': seed, '--out': out, ...fixed });
    const run = SearchRun.resume<Asked>(resume, command);
    if (!quiet) note(`Going on with ${resume}: ${run.size} pieces of it are done.`);
    return run;
  }
  if (place === undefined) {
    const expected = `a brief, or --resume with the folder of a ${command}`;
    throw inputError([{ key: 'brief', found: 'none', expected }]);
  }
  const opened = await openForSearch(place, options);
  const asked = await ask(opened);
  const parent = out ?? RESULTS;
  prepareFolder(parent);
  const others = SearchRun.unfinished(parent, command, opened, asked);
  const run = SearchRun.begin(parent, command, opened, asked);
  if (!quiet) {
    for (const other of others)
      note(`${other} holds a ${command} of this brief that has not ended: ${resumeLine(other, command)}`);
    note(`Checkpoint in ${run.folder}/${UNFINISHED}; after a break ${resumeLine(run.folder, command)}`);
  }
  return run;
}

function refuseGiven(given: Record<string, unknown>): void {
  const expected = 'none: --resume goes on as it began';
  const problems = Object.entries(given)
    .filter(([, value]) => value !== undefined)
    .map(([key, value]) => ({ key, found: String(value), expected }));
  if (problems.length > 0) throw inputError(problems);
}

/** Does a run's work. Where that fails, says that its checkpoint stays; a new one that nothing came of goes. */
export async function keepingCheckpoint<T, Asked>(
  run: SearchRun<Asked>,
  command: string,
  { resume }: ResumableOptions,
  work: () => Promise<T>,
): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (run.size === 0 && resume === undefined) run.discard();
    else noteResume(run.folder, command);
    throw error;
  }
}

/** Says that nothing is lost of a run that did not end. */
export function noteResume(folder: string, command: string): void {
  note(`Its checkpoint is kept: ${resumeLine(folder, command)}`);
}

/** The command that goes on with a run, as a user would type it, and that it does so. */
function resumeLine(folder: string, command: string): string {
  const plain = /^[\w./@%+=:,-]+$/.test(folder);
  const quoted = plain ? folder : `'${folder.replaceAll("'", "'\\''")}'`;
  return `rimwright ${command} --resume ${quoted} goes on with it.`;
}
