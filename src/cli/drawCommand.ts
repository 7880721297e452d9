import { extname, join } from 'node:path';
import { inputError } from '../base/errors.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import type { GivenDesign } from '../run/givenDesign.ts';
import { openBrief } from '../run/openBrief.ts';
import { readDesignFile } from '../run/readDesignFile.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { writeWhole } from '../run/writeWhole.ts';
import { SEARCH_FINENESS } from '../score/fineness.ts';
import { Judge } from '../score/judge.ts';
import type { FileFormat } from './designDrawing.ts';
import { drawGiven, FILE_FORMATS, givenDrawing } from './designDrawing.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { print, warn } from './notes.ts';
import { oneOf } from './optionRules.ts';
import { readDistance } from './quantityOptions.ts';

interface Options {
  design?: string;
  unit?: LengthUnit;
  distance?: string;
  out: string;
  formats: string;
  force?: true;
}

/** Runs `rimwright draw` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const formats = readFormats(options.formats);
  const chosen = await readDistance(options.distance);
  const { given, judge } = await openDesign(place, options);
  const distanceM = chosen ?? given.distanceM;
  if (distanceM === null) {
    const expected = 'a distance, such as --distance "20 mm"';
    throw inputError([{ file: place, found: 'an outline without a distance', expected }]);
  }
  const drawing = givenDrawing(given, distanceM, judge);
  const files = formats.map((format) => ({
    path: join(options.out, `${given.id}.${format}`),
    text: drawGiven(format, drawing, given),
  }));
  const isApart = given.elements.some(
    ({ distanceM: own, share }) => own !== undefined || share !== undefined,
  );
  if (isApart && formats.some((format) => format !== 'json')) {
    warn(['elements in planes of their own, or behind a beam splitter: only JSON keeps that']);
  }
  prepareFolder(options.out);
  uninterrupted(() => writeWhole(files, options.force ?? false));
  for (const { path } of files) print(path);
  return EXIT.done;
}

/** The design of a file; with an id, `place` may also be the brief in whose results it is, which then judges it. */
async function openDesign(
  place: string,
  { design, unit }: Options,
): Promise<{ given: GivenDesign; judge: Judge | null }> {
  if (design === undefined || extname(place).toLowerCase() === '.json') {
    const given = readDesignFile(place, design, unit);
    warn(given.notes ?? []);
    return { given, judge: null };
  }
  const opened = await openBrief(place);
  const { given, warnings } = chooseDesign(opened, { design });
  warn(warnings);
  return { given, judge: new Judge(opened.brief.task, SEARCH_FINENESS) };
}

function readFormats(text: string): FileFormat[] {
  const known = oneOf('--formats', FILE_FORMATS);
  return [...new Set(text.split(',').map((word) => known(word.trim())))];
}
