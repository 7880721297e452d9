import { randomUUID } from 'node:crypto';
import { existsSync, lstatSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { diskFault } from './diskFault.ts';
import type { TextFile } from './writeWhole.ts';
import { writeFlushed } from './writeWhole.ts';

/** Runs of one title that are kept apart. */
const MOST_RUNS = 9999;

/** Folder within a results folder that is there as long as its search has not ended. */
export const UNFINISHED = 'unfinished';

/**
 * Makes a folder unless it is there, and sees that it can be written, before a long search relies on it.
 *
 * @throws RimwrightError `input` or `machine`, as `diskFault`
 */
export function prepareFolder(parent: string): void {
  const probe = join(parent, `.${randomUUID().slice(0, 8)}.tmp`);
  try {
    mkdirSync(parent, { recursive: true });
    // Rights alone do not tell: a full disk takes names, but no bytes.
    writeFlushed(probe, 'Rimwright can write here.\n');
  } catch (error) {
    throw diskFault(error, 'write', parent);
  } finally {
    remove(probe);
  }
}

/**
 * Makes a results folder: `parent/name`, or where that is taken `name-2`, `name-3` and so on. There is only `unfinished/` in
 * it, which is prepared beside it, so that a results folder never stands without.
 *
 * @param parent a folder that exists
 * @param name one part of a path (see `slug`)
 * @param prepare fills the folder that becomes `unfinished/`
 * @returns the path of the results folder
 * @throws RimwrightError as `diskFault`, or what `prepare` throws; nothing is left behind
 */
export function claimResultsFolder(
  parent: string,
  name: string,
  prepare: (unfinished: string) => void,
): string {
  const draft = join(parent, `.${name}.${randomUUID().slice(0, 8)}.tmp`);
  try {
    mkdirSync(join(draft, UNFINISHED), { recursive: true });
    prepare(join(draft, UNFINISHED));
    return takeFreeName(draft, parent, name);
  } catch (error) {
    throw diskFault(error, 'write', parent);
  } finally {
    remove(draft);
  }
}

function takeFreeName(draft: string, parent: string, name: string): string {
  for (let run = 1; run <= MOST_RUNS; run++) {
    const folder = numbered(parent, name, run);
    if (isThere(folder)) continue;
    try {
      renameSync(draft, folder);
      return folder;
    } catch (error) {
      // Another run took the name since.
      if (!['ENOTEMPTY', 'EEXIST', 'ENOTDIR'].includes((error as NodeJS.ErrnoException).code ?? ''))
        throw error;
    }
  }
  const file = join(parent, name);
  throw inputError([{ file, found: `${MOST_RUNS} runs of this title`, expected: 'room for one more' }]);
}

/** The results folders of a name whose search has not ended. */
export function unfinishedFolders(parent: string, name: string): string[] {
  const folders: string[] = [];
  for (let run = 1; run <= MOST_RUNS; run++) {
    const folder = numbered(parent, name, run);
    if (!existsSync(folder)) break;
    if (existsSync(join(folder, UNFINISHED))) folders.push(folder);
  }
  return folders;
}

function numbered(parent: string, name: string, run: number): string {
  return join(parent, run === 1 ? name : `${name}-${run}`);
}

/**
 * Puts a search's results into its folder, in place of those of an interruption. All are written whole into `unfinished/`
 * first; then each takes its place in one step, the first of `files` last. A folder without `unfinished/` is whole: that is
 * for the caller to take away.
 *
 * @param files paths within the folder
 * @throws RimwrightError `machine` where the disk fails; `unfinished/` is still there then
 */
export function fillResultsFolder(folder: string, files: readonly TextFile[]): void {
  const draft = join(folder, UNFINISHED, 'draft');
  const replaced = join(folder, UNFINISHED, 'replaced');
  try {
    for (const place of [draft, replaced]) {
      rmSync(place, { recursive: true, force: true });
      mkdirSync(place);
    }
    for (const { path, text } of files) {
      mkdirSync(dirname(join(draft, path)), { recursive: true });
      writeFlushed(join(draft, path), text);
    }
    const parts = new Set(files.map(({ path }) => path.split('/')[0]));
    for (const part of [...parts].reverse()) {
      if (isThere(join(folder, part))) renameSync(join(folder, part), join(replaced, part));
      renameSync(join(draft, part), join(folder, part));
    }
  } catch (error) {
    throw diskFault(error, 'write', folder);
  } finally {
    for (const place of [draft, replaced]) remove(place);
  }
}

/** Takes away what is not needed any more, if it can: the fault that kept it from being made is the one to tell of. */
function remove(path: string): void {
  try {
    rmSync(path, { recursive: true, force: true });
  } catch {}
}

/** Whether anything stands there, a broken link too. */
function isThere(path: string): boolean {
  return lstatSync(path, { throwIfNoEntry: false }) !== undefined;
}
