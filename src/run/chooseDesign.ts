import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { isDeepStrictEqual } from 'node:util';
import { inputError } from '../base/errors.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import type { Brief } from './brief.ts';
import { briefToJson } from './briefJson.ts';
import type { GivenDesign } from './givenDesign.ts';
import type { OpenedBrief } from './openBrief.ts';
import { readDesignFile } from './readDesignFile.ts';
import { readTextFile } from './readTextFile.ts';
import { slug } from './slug.ts';

/** The folder of results folders, seen from where the command is run. */
const RESULTS = 'results';
const MOST_BYTES = 20_000_000;

/** How a user names a design: a file, a file and an id, or the id alone of a design in the brief's own results. */
export interface DesignChoice {
  outline?: string;
  design?: string;
  /** Of a drawing that states none. */
  unit?: LengthUnit;
}

export interface ChosenDesign {
  given: GivenDesign;
  /** What the user should know of the results that it came from. */
  warnings: string[];
}

/**
 * Opens the design that a user names.
 *
 * @param results where results folders are
 * @throws RimwrightError `input` where neither is named, for results that are not there, or as `readDesignFile`
 */
export function chooseDesign(
  opened: OpenedBrief,
  { outline, design, unit }: DesignChoice,
  results = RESULTS,
): ChosenDesign {
  if (outline !== undefined) {
    const given = readDesignFile(outline, design, unit);
    return { given, warnings: [...(given.notes ?? [])] };
  }
  if (design === undefined) {
    const expected = "--outline FILE, or --design ID for a design of the brief's own results";
    throw inputError([{ key: '--outline', found: 'no outline', expected }]);
  }
  const folder = join(results, slug(opened.brief.title));
  const front = join(folder, 'front.json');
  if (!existsSync(front)) {
    const expected = `the results of rimwright search ${opened.file}, or --outline FILE with the design ${JSON.stringify(design)}`;
    throw inputError([{ file: front, found: 'no such file', expected }]);
  }
  const given = { ...readDesignFile(front, design), file: `${front}#${design}` };
  const warnings = [otherBriefWarning(front, opened), laterRunWarning(folder)];
  return { given, warnings: warnings.filter((warning) => warning !== null) };
}

/** Where a front was searched for another task than the brief's: which parts of it differ. */
function otherBriefWarning(front: string, { brief, file }: OpenedBrief): string | null {
  const { brief: stored } = JSON.parse(readTextFile(front, MOST_BYTES)) as { brief?: Partial<Brief> };
  const own = JSON.parse(JSON.stringify(briefToJson(brief).task)) as Record<string, unknown>;
  const theirs = (stored?.task ?? {}) as unknown as Record<string, unknown>;
  const differing = Object.keys(own).filter((key) => !isDeepStrictEqual(own[key], theirs[key]));
  if (differing.length === 0) return null;
  return `${front} was made from another brief than ${file} is now: ${differing.join(', ')} ${differing.length === 1 ? 'differs' : 'differ'}`;
}

function laterRunWarning(folder: string): string | null {
  let run = 1;
  while (existsSync(join(`${folder}-${run + 1}`, 'front.json'))) run++;
  if (run === 1) return null;
  return `${folder} is the first of ${run} runs: --outline ${join(`${folder}-${run}`, 'front.json')} takes the last`;
}
