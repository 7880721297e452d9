import { isAbsolute, join } from 'node:path';
import type { Problem } from '../base/errors.ts';
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
  const file = isAbsolute(name) ? name : join(folder, name);
  let text: string;
  try {
    text = readTextFile(file, MOST_BYTES);
  } catch (error) {
    const [{ found, expected }] = problemsOf(error);
    report.refuse(path, `${expected}, seen from the brief's folder`, `${JSON.stringify(name)}, ${found}`);
    return undefined;
  }
  try {
    return read(text, file);
  } catch (error) {
    report.adopt(problemsOf(error));
    return undefined;
  }
}

/** The user's mistakes; any other error goes on. */
function problemsOf(error: unknown): readonly Problem[] {
  if (!(error instanceof RimwrightError) || error.code !== 'input') throw error;
  return error.problems;
}
