import { resolve } from 'node:path';
import { RimwrightError } from '../base/errors.ts';
import type { Path, Report } from './briefReport.ts';
import { readTextFile } from './readTextFile.ts';

/** A table of 100 000 rows of full digits. */
const MOST_BYTES = 20_000_000;

/**
 * Reads a file that the brief names. What is wrong with it goes to the report: at the brief's key where it cannot be opened,
 * else with the file's own lines.
 *
 * @param name as the brief writes it, seen from `folder`
 * @returns undefined where there is a mistake
 */
export function readNamedFile<T>(
  name: string,
  path: Path,
  report: Report,
  folder: string,
  read: (text: string, file: string) => T,
): T | undefined {
  try {
    return read(openNamed(name, path, report, folder), name);
  } catch (error) {
    if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
    report.adopt(error.problems);
    return undefined;
  }
}

function openNamed(name: string, path: Path, report: Report, folder: string): string {
  try {
    return readTextFile(resolve(folder, name), MOST_BYTES);
  } catch (error) {
    if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
    const [{ found, expected }] = error.problems;
    report.refuse(path, `${expected}, seen from the brief's folder`, `${JSON.stringify(name)}, ${found}`);
    throw new RimwrightError('input', '', []);
  }
}
