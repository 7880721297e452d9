import { randomUUID } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fsyncSync,
  linkSync,
  openSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { diskFault } from './diskFault.ts';

/** A file to be written. */
export interface TextFile {
  path: string;
  /** Its content: a text, or bytes as they are. */
  text: string | Uint8Array;
}

/**
 * Writes files so that each is there as a whole or not at all: all go to the disk under names of their own first, and only
 * then take their places. Their folders must exist.
 *
 * @param replace whether files of those names may be replaced
 * @throws RimwrightError `input` where a file is in the way, `machine` where the disk fails; no file is left half-written
 */
export function writeWhole(files: readonly TextFile[], replace: boolean): void {
  if (!replace) refuseExisting(files.map(({ path }) => path));
  const drafts = files.map(({ path, text }) => ({ path, text, draft: draftName(path) }));
  try {
    for (const { path, text, draft } of drafts) {
      try {
        writeFlushed(draft, text);
      } catch (error) {
        throw diskFault(error, 'write', path);
      }
    }
    for (const { path, draft } of drafts) publish(draft, path, replace);
  } finally {
    for (const { draft } of drafts) rmSync(draft, { force: true });
  }
}

/** @throws RimwrightError `input` that names every path at which something stands already */
export function refuseExisting(paths: readonly string[]): void {
  const problems = paths
    .filter((path) => existsSync(path))
    .map((file) => ({
      file,
      found: 'a file of that name',
      expected: 'a new name, or --force to replace it',
    }));
  if (problems.length > 0) throw inputError(problems);
}

/** Writes a file and waits until the disk has it. */
export function writeFlushed(path: string, text: string | Uint8Array): void {
  const file = openSync(path, 'wx');
  try {
    writeFileSync(file, text);
    fsyncSync(file);
  } finally {
    closeSync(file);
  }
}

function draftName(path: string): string {
  return join(dirname(path), `.${basename(path).slice(0, 60)}.${randomUUID().slice(0, 8)}.tmp`);
}

function publish(draft: string, path: string, replace: boolean): void {
  try {
    if (replace) {
      renameSync(draft, path);
      return;
    }
    // Unlike a rename, a link never takes the place of a file that came in the meantime.
    linkSync(draft, path);
  } catch (error) {
    const { code = '' } = error as NodeJS.ErrnoException;
    // Some file systems know no links.
    if (!replace && ['EPERM', 'ENOTSUP', 'EOPNOTSUPP', 'ENOSYS'].includes(code)) {
      refuseExisting([path]);
      renameSync(draft, path);
      return;
    }
    if (!replace && code === 'EEXIST') refuseExisting([path]);
    throw diskFault(error, 'write', path);
  }
}
