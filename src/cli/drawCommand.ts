import { join } from 'node:path';
import { inputError } from '../base/errors.ts';
import { readDesignFile } from '../run/readDesignFile.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { writeWhole } from '../run/writeWhole.ts';
import type { DrawingFormat } from './designDrawing.ts';
import { DRAWING_FORMATS, drawAs, givenDrawing } from './designDrawing.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { print } from './notes.ts';
import { oneOf } from './optionRules.ts';
import { readDistance } from './quantityOptions.ts';

interface Options {
  distance?: string;
  out: string;
  formats: string;
  force?: true;
}

/** Runs `rimwright draw` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const formats = readFormats(options.formats);
  const chosen = await readDistance(options.distance);
  const given = readDesignFile(place);
  const distanceM = chosen ?? given.distanceM;
  if (distanceM === null) {
    const expected = 'a distance, such as --distance "20 mm"';
    throw inputError([{ file: place, found: 'an outline without a distance', expected }]);
  }
  const drawing = givenDrawing(given, distanceM);
  const files = formats.map((format) => ({
    path: join(options.out, `${given.id}.${format}`),
    text: drawAs(format, drawing),
  }));
  prepareFolder(options.out);
  uninterrupted(() => writeWhole(files, options.force ?? false));
  for (const { path } of files) print(path);
  return EXIT.done;
}

function readFormats(text: string): DrawingFormat[] {
  const known = oneOf('--formats', DRAWING_FORMATS);
  return [...new Set(text.split(',').map((word) => known(word.trim())))];
}
