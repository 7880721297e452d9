import { dirname } from 'node:path';
import { areaText, quantityText, timeText } from '../draw/quantityText.ts';
import { designToJson } from '../run/designJson.ts';
import { jsonText } from '../run/jsonText.ts';
import type { RankedDesign } from '../run/ranking.ts';
import { smallestToJson } from '../run/results.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { smallest } from '../run/search.ts';
import { diffusionWarning, fieldsWarning, outlineOf, present } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import type { Measure } from '../score/aim.ts';
import { measureOf } from '../score/aim.ts';
import { EXIT } from './exit.ts';
import { designTable, printNearest } from './front.ts';
import { interruptible, uninterrupted } from './interrupt.ts';
import { note, print, printWrapped, warn } from './notes.ts';
import { printEnding } from './printEnding.ts';
import type { SearchingOptions } from './searching.ts';
import { openForSearch, withProgress } from './searching.ts';

interface Options extends SearchingOptions {
  by: Measure;
  out?: string;
  force?: true;
}

/** Runs `rimwright smallest` and gives its exit code. */
export async function run(place: string, { by, out, force, ...options }: Options): Promise<number> {
  const { brief } = await openForSearch(place, options);
  if (out !== undefined) {
    prepareFolder(dirname(out));
    if (!force) refuseExisting([out]);
  }
  const result = await interruptible((signal) =>
    withProgress(brief, options, signal, null, (course) => smallest(brief, by, course)),
  );
  const { design, nearest, misses } = result;
  const shown = design ?? nearest;
  const warnings = present(
    shown ? [fieldsWarning(brief.task, [shown]), diffusionWarning(brief.task, [outlineOf(shown)])] : [],
  );
  if (out !== undefined && design !== null) {
    const text = jsonText(designToJson(design));
    uninterrupted(() => writeWhole([{ path: out, text }], force ?? false));
    if (!options.quiet) note(`Written to ${out}`);
  }
  warn(warnings);
  if (options.json) print(jsonText(smallestToJson(brief, result, warnings)));
  else {
    if (shown !== null) print(`${designTable([shown])}\n\n`);
    if (design !== null)
      printWrapped(`The smallest by ${by} that meets the target: ${measureText(design, by)}.`);
    else printNearest(nearest && { design: nearest, misses }, brief.task, result.stopped);
    printEnding(brief, result);
  }
  return design === null ? EXIT.target : EXIT.done;
}

/** A design's measure in words: `area 0.0166 mm²`. */
function measureText({ scores }: RankedDesign, by: Measure): string {
  const value = measureOf(scores, by);
  switch (by) {
    case 'radius':
      return `radius ${quantityText(value, 'm')}`;
    case 'area':
      return `area ${areaText(value)}`;
    case 'cost':
      return `area over gain ${areaText(value)}`;
    case 'time':
      return `time ${timeText(value)}`;
  }
}
