import { dirname } from 'node:path';
import { formatQuantity } from '../base/quantity.ts';
import { countText } from '../draw/quantityText.ts';
import type { LengthUnit } from '../outline/files/lengthUnit.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { designToJson } from '../run/designJson.ts';
import type { GivenDesign } from '../run/givenDesign.ts';
import { jsonText } from '../run/jsonText.ts';
import type { OutlineJudge } from '../run/judgeOutline.ts';
import { judgeOutline } from '../run/judgeOutline.ts';
import { openBrief } from '../run/openBrief.ts';
import type { RankedDesign } from '../run/ranking.ts';
import type { ReadingSummary } from '../run/readings.ts';
import { listReadings, summariseReadings } from '../run/readings.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { roughReadings } from '../run/roughReadings.ts';
import { scoreGiven } from '../run/scoreGiven.ts';
import { traceFlight } from '../run/traceFlight.ts';
import { readingWarnings } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import { shortCount } from './designColumns.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { note, noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDistance, readPosition, readRoughness } from './quantityOptions.ts';
import { printRough } from './roughText.ts';
import { scoreText } from './scoreText.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  outline?: string;
  design?: string;
  unit?: LengthUnit;
  distance?: string;
  position?: string;
  exact?: true;
  trace?: string;
  force?: true;
  rough?: string;
  outlines: number;
  seed: number;
  json?: true;
}

/** Runs `rimwright reading` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const distance = await readDistance(options.distance);
  const position = await readPosition(options.position);
  const roughness = await readRoughness(options.rough);
  if (options.trace !== undefined) {
    prepareFolder(dirname(options.trace));
    if (!options.force) refuseExisting([options.trace]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { task } = brief;
  const { given, warnings: ofResults } = chooseDesign(opened, options);
  const wanted = options.exact ? 'exact' : 'far';
  const judged = judgeOutline(task, given, distance, position, wanted);
  const { judge, distanceM, fields } = judged;
  // At one place there is no worst and no mean over places: the scores are left out.
  const design = position === null ? scoreGiven(task, given, judged) : null;
  const warnings = [...ofResults, ...readingWarnings(task, wanted, [judged])];
  const places = position === null ? undefined : Float64Array.from(position);
  const gain = design?.scores.gain ?? 1;
  const { outlines, seed } = options;
  const rough =
    roughness && roughReadings(judged, given.elements, { ...roughness, outlines, seed }, gain, position);
  if (options.trace !== undefined) {
    const text = traceFlight(judge, given.elements, distanceM, places);
    const file = { path: options.trace, text };
    uninterrupted(() => writeWhole([file], options.force ?? false));
    note(`Written to ${file.path}`);
  }
  if (!options.json) noteDefaults(brief.defaults);
  warn(warnings);
  if (options.json) {
    const readings = listReadings(judge, given.elements, distanceM, places);
    const scored = design && designToJson(design);
    print(jsonText({ fields, readings, ...(rough && { rough }), design: scored, brief, warnings }));
    return EXIT.done;
  }
  printReadings(given, judged, position, design);
  if (rough !== null) printRough(rough);
  if (design !== null) {
    print('');
    printWrapped(scoreText(design, task));
  }
  return EXIT.done;
}

/** Prints a table with one row for each particle and wavelength. */
function printReadings(
  given: GivenDesign,
  { judge, distanceM }: OutlineJudge,
  position: [x: number, y: number] | null,
  design: RankedDesign | null,
): void {
  const places = position === null ? undefined : Float64Array.from(position);
  const summaries = summariseReadings(judge, given.elements, distanceM, places);
  const where = position?.map((metres) => formatQuantity(metres, 'length')).join(', ');
  const [{ places: count }] = summaries;
  const at = where !== undefined ? `at ${where}` : count > 1 ? `at ${count} places` : 'on the axis';
  printWrapped(`${given.file}, ${formatQuantity(distanceM, 'length')} behind the particle, which is ${at}:`);
  print('');
  const gain = judge.task.target.gain === 'free' ? design?.scores.gain : undefined;
  print(`${table([...columnsAt(where), ...worstColumns(where, gain)], summaries)}`);
}

function columnsAt(where: string | undefined): Column<ReadingSummary>[] {
  const at = where === undefined ? 'on axis' : 'there';
  return [
    {
      title: ['particle'],
      cell: ({ first: { particle } }) =>
        `${formatQuantity(particle.diameter_m, 'length', 3)} ${particle.material}`,
      align: 'left',
      flexible: true,
    },
    {
      title: ['light', 'nm'],
      cell: ({ first }) => String(Number((first.wavelength_m * 1e9).toPrecision(5))),
    },
    { title: ['extinction', 'µm²'], cell: ({ first }) => shortCount(first.extinction_m2 * 1e12) },
    { title: ['reading', at, 'µm²'], cell: ({ first }) => shortCount(first.reading_m2 * 1e12) },
    { title: ['correction', at, '%'], cell: ({ first }) => countText(100 * first.correction) },
  ];
}

/** What is farthest from the extinction over all places, and what is left of it once the gain is taken out. */
function worstColumns(where: string | undefined, gain: number | undefined): Column<ReadingSummary>[] {
  if (where !== undefined) return [];
  const farthest = ({ leastRatio, mostRatio }: ReadingSummary, from: number) =>
    Math.abs(mostRatio - from) > Math.abs(leastRatio - from) ? mostRatio : leastRatio;
  const columns: Column<ReadingSummary>[] = [
    { title: ['worst', 'place', '%'], cell: (summary) => countText(100 * (farthest(summary, 1) - 1)) },
  ];
  if (gain !== undefined) {
    columns.push({
      title: ['with', 'gain', '%'],
      cell: (summary) => countText(100 * (farthest(summary, gain) / gain - 1)),
    });
  }
  return columns;
}
