import { dirname } from 'node:path';
import { presetsFolder } from '../base/presetsFolder.ts';
import { formatQuantity } from '../base/quantity.ts';
import { countText, percentText } from '../draw/quantityText.ts';
import { loadIndexModel } from '../optics/shelf.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { jsonText } from '../run/jsonText.ts';
import { openBrief } from '../run/openBrief.ts';
import type { Response, ResponsePoint } from '../run/response.ts';
import { responseOf } from '../run/response.ts';
import { responseCsv } from '../run/responseCsv.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { readingWarnings } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import { shortCount } from './designColumns.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { note, noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDiameters, readDistance } from './quantityOptions.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  outline?: string;
  design?: string;
  unit?: LengthUnit;
  distance?: string;
  from: string;
  to: string;
  count: number;
  material: string;
  exact?: true;
  csv?: string;
  force?: true;
  json?: true;
}

/** Runs `rimwright response` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const { csv, count, material } = options;
  const distance = await readDistance(options.distance);
  const [fromM, toM] = await readDiameters(options.from, options.to);
  if (csv !== undefined) {
    prepareFolder(dirname(csv));
    if (!options.force) refuseExisting([csv]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { task } = brief;
  const { given, warnings: ofResults } = chooseDesign(opened, options);
  const index = loadIndexModel('materials', material, presetsFolder());
  const spheres = { fromM, toM, count, index, material };
  const fields = options.exact ? 'exact' : 'far';
  const response = responseOf(task, given, spheres, distance, fields);
  const ends = [fromM, toM].map((diameterM) => ({ diameterM, index, material }));
  // The brief's own particles count too: they calibrate the gain.
  const all = { ...task, particles: [...task.particles, ...ends] };
  const outline = { radiusM: response.radius_m, distanceM: response.distance_m };
  const warnings = [...ofResults, ...readingWarnings(all, fields, [outline])];
  if (csv !== undefined) {
    const file = { path: csv, text: responseCsv(response) };
    uninterrupted(() => writeWhole([file], options.force ?? false));
    note(`Written to ${csv}`);
  }
  if (!options.json) noteDefaults(brief.defaults);
  warn(warnings);
  if (options.json) print(jsonText({ fields, ...response, brief, warnings }));
  else printResponse(response, given.file);
  return EXIT.done;
}

function printResponse(response: Response, file: string): void {
  const { points, gain, material, distance_m } = response;
  printWrapped(
    `${file}, ${formatQuantity(distance_m, 'length')} behind spheres of ${material}, ` +
      `gain ${countText(gain)} from the brief's particles:`,
  );
  print('');
  print(table(COLUMNS, points));
  print('');
  printWrapped(rangesText(response));
}

/** `The target of 1 % holds from 0.2 µm to 1.1 µm and from 2 µm to 3 µm.` */
function rangesText({ holds, target, points }: Response): string {
  const inLength = (metres: number) => formatQuantity(metres, 'length', 3);
  const [from, to] = [points[0], points[points.length - 1]].map(({ diameter_m }) => inLength(diameter_m));
  if (holds.length === 0) {
    return `The target of ${percentText(target)} holds for none of these diameters, ${from} to ${to}.`;
  }
  const runs = holds.map(([least, most]) =>
    least === most ? `at ${inLength(least)}` : `from ${inLength(least)} to ${inLength(most)}`,
  );
  return `The target of ${percentText(target)} holds ${runs.join(', ')} (of the ${points.length} diameters tried).`;
}

const COLUMNS: readonly Column<ResponsePoint>[] = [
  { title: ['diameter'], cell: ({ diameter_m }) => formatQuantity(diameter_m, 'length', 3) },
  { title: ['extinction', 'µm²'], cell: ({ extinction_m2 }) => shortCount(extinction_m2 * 1e12) },
  { title: ['reading', 'µm²'], cell: ({ reading_m2 }) => shortCount(reading_m2 * 1e12) },
  { title: ['over gain', 'µm²'], cell: ({ calibrated_m2 }) => shortCount(calibrated_m2 * 1e12) },
  { title: ['correction', 'least %'], cell: ({ correction }) => countText(100 * correction.least) },
  { title: ['most', '%'], cell: ({ correction }) => countText(100 * correction.most) },
  { title: ['target'], cell: ({ holds }) => (holds ? 'held' : 'no') },
];
