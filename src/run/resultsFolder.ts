import { randomUUID } from 'node:crypto';
import { accessSync, constants, existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import type { RimwrightError } from '../base/errors.ts';
import { inputError } from '../base/errors.ts';
import { diskFault } from './diskFault.ts';
import type { TextFile } from './writeWhole.ts';
import { writeFlushed } from './writeWhole.ts';

/** Runs of one title that are kept apart. */
const MOST_RUNS = 9999;

/**
 * Makes a folder unless it is there, and sees that it can be written, before a long search relies on it.
 *
 * @throws RimwrightError `input` or `machine`, as `diskFault`
 */
export function prepareFolder(parent: string): void {
  try {
    mkdirSync(parent, { recursive: true });
    accessSync(parent, constants.W_OK);
  } catch (error) {
    throw diskFault(error, 'write', parent);
  }
}

/**
 * Writes a results folder: `parent/name`, or where that is taken `name-2`, `name-3` and so on. All files are written into
 * a folder beside it that then takes its name in one step, so a results folder is there as a whole or not at all.
 *
 * @param parent a folder that exists
 * @param name one part of a path (see `slug`)
 * @param files paths within the results folder
 * @returns the path of the folder
 * @throws RimwrightError `machine` where the disk fails; nothing is left behind
 */
export function writeResultsFolder(parent: string, name: string, files: readonly TextFile[]): string {
  const draft = join(parent, `.${name}.${randomUUID().slice(0, 8)}.tmp`);
  try {
    mkdirSync(draft);
    for (const { path, text } of files) {
      mkdirSync(dirname(join(draft, path)), { recursive: true });
      writeFlushed(join(draft, path), text);
    }
    return takeFreeName(draft, parent, name);
  } catch (error) {
    throw diskFault(error, 'write', parent);
  } finally {
    rmSync(draft, { recursive: true, force: true });
  }
}

function takeFreeName(draft: string, parent: string, name: string): string {
  for (let run = 1; run <= MOST_RUNS; run++) {
    const folder = join(parent, run === 1 ? name : `${name}-${run}`);
    if (existsSync(folder)) continue;
    try {
      renameSync(draft, folder);
      return folder;
    } catch (error) {
      // Another run took the name since.
      if (!['ENOTEMPTY', 'EEXIST', 'ENOTDIR'].includes((error as NodeJS.ErrnoException).code ?? ''))
        throw error;
    }
  }
  throw tooManyRuns(join(parent, name));
}

function tooManyRuns(file: string): RimwrightError {
  return inputError([{ file, found: `${MOST_RUNS} runs of this title`, expected: 'room for one more' }]);
}
