import { dirname } from 'node:path';
import type { Dimension } from '../base/quantity.ts';
import { formatQuantity } from '../base/quantity.ts';
import { countText, percentText } from '../draw/quantityText.ts';
import { briefToJson } from '../run/briefJson.ts';
import { chooseDesign } from '../run/chooseDesign.ts';
import { csvText } from '../run/csvText.ts';
import { jsonText } from '../run/jsonText.ts';
import { openBrief } from '../run/openBrief.ts';
import { replaceTolerances } from '../run/readTolerances.ts';
import { prepareFolder } from '../run/resultsFolder.ts';
import { readingWarnings } from '../run/warnings.ts';
import { refuseExisting, writeWhole } from '../run/writeWhole.ts';
import type { ToleranceRow, Yield } from '../run/yieldOf.ts';
import { yieldOf } from '../run/yieldOf.ts';
import type { BuildGain } from '../score/buildJudge.ts';
import type { ToleranceName } from '../score/tolerances.ts';
import { durationText } from './durationText.ts';
import { EXIT } from './exit.ts';
import { uninterrupted } from './interrupt.ts';
import { note, noteDefaults, print, printWrapped, warn } from './notes.ts';
import { readDistance, readShare } from './quantityOptions.ts';
import { workersOf } from './searching.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  outline?: string;
  design?: string;
  distance?: string;
  tolerance: string[];
  gain?: BuildGain;
  builds: number;
  seed: number;
  inFull?: true;
  atLeast?: string;
  exact?: true;
  workers?: number;
  csv?: string;
  force?: true;
  quiet?: true;
  json?: true;
}

/** The yield that tolerances are tightened for, unless the user says otherwise. */
const WANTED = 0.95;

/** Runs `rimwright yield` and gives its exit code. */
export async function run(place: string, options: Options): Promise<number> {
  const { csv, builds, seed, gain, quiet = false } = options;
  const distanceM = await readDistance(options.distance);
  const atLeast = await readShare(options.atLeast, '--at-least');
  if (csv !== undefined) {
    prepareFolder(dirname(csv));
    if (!options.force) refuseExisting([csv]);
  }
  const opened = await openBrief(place);
  const { brief } = opened;
  const { given, warnings: ofResults } = chooseDesign(opened, options);
  const tolerances = await replaceTolerances(brief.tolerances, options.tolerance, '--tolerance');
  const isReplaced = (line: string) =>
    options.tolerance.some((text) => line.startsWith(`tolerances.${text.split('=')[0].trim()}:`));
  if (!quiet) {
    noteDefaults([...brief.defaults, ...brief.toleranceDefaults.filter((line) => !isReplaced(line))]);
  }
  const fields = options.exact ? 'exact' : 'far';
  const found = await yieldOf(brief.task, given, tolerances, {
    ...{ builds, seed, distanceM, fields, wanted: atLeast ?? WANTED, workers: workersOf(options) },
    inFull: options.inFull ?? false,
    ...(gain && { gain }),
    ...(!quiet && { onProgress: progressLines() }),
  });
  const { worsts, warnings: ofBuilds, ...result } = found;
  const warnings = [
    ...ofResults,
    ...ofBuilds,
    ...readingWarnings(brief.task, fields, [{ radiusM: found.radius_m, distanceM: found.distance_m }]),
  ];
  warn(warnings);
  if (csv !== undefined) {
    const rows = [...worsts].map((worst, i) => [i + 1, Number(worst.toPrecision(10)), worst <= found.target]);
    const file = { path: csv, text: csvText([['build', 'worst', 'meets'], ...rows]) };
    uninterrupted(() => writeWhole([file], options.force ?? false));
    note(`Written to ${csv}`);
  }
  if (options.json) print(jsonText({ fields, ...result, brief: briefToJson(brief), warnings }));
  else printYield(found, given.file);
  return atLeast !== null && found.yield < atLeast ? EXIT.target : EXIT.done;
}

/** Milliseconds between two lines of progress. */
const LINE_INTERVAL = 10_000;

function progressLines(): (read: number, of: number) => void {
  const start = performance.now();
  let last = start;
  return (read, of) => {
    const now = performance.now();
    if (now - last < LINE_INTERVAL) return;
    last = now;
    note(`${read} of ${of} builds read in full, ${durationText((now - start) / 1000)}`);
  };
}

function printYield(found: Yield, file: string): void {
  const { builds, target, worst, near, surface, readings, gain, tolerances } = found;
  const [low, high] = found.interval.map(shareText);
  const calibrated = gain.is === 'recalibrated' ? 'calibrated each' : 'with the gain of the drawing';
  printWrapped(
    `${file}, ${formatQuantity(found.distance_m, 'length')} behind the particle: of ${builds} builds, ${calibrated}, ` +
      `${shareText(found.yield)} read within ${percentText(target)} over the whole brief (95 % interval ${low} to ${high}). ` +
      `The drawing itself reads within ${percentText(found.drawing)}, half of the builds within ${percentText(worst.median)}, ` +
      `95 % of them within ${percentText(worst.most95)}.`,
  );
  print('');
  print(table(COLUMNS, tolerances));
  print('');
  const most = tolerances.toSorted((p, q) => q.worst.total - p.worst.total).at(0);
  const spoils =
    most === undefined
      ? ''
      : `What spoils most is ${most.name}, with ${tenths(most.worst.total)} % of the variance of the worst correction. `;
  printWrapped(spoils + needsText(found));
  printWrapped(
    near === null
      ? `Every build was read in full, at ${readings} readings each; shares are of a surface.`
      : `Each build is judged on ${readings} readings, by a polynomial surface through ${surface.fitted} builds that were read in full; ` +
          `against ${surface.checked} others its worst correction errs by ${percentText(surface.error.rms)} rms, ` +
          `${percentText(surface.error.largest)} at most. Of the ${near.builds} builds that it puts so near the target, ` +
          `${near.read} were read in full: ${near.changed} came out otherwise.`,
  );
}

function needsText({ wanted, togetherNeeded, yield: share, drawing, target }: Yield): string {
  const goal = shareText(wanted);
  if (drawing > target) return 'The drawing itself misses the target: no tolerance mends that.';
  if (share >= wanted) return `The yield is ${goal} or more: no tolerance has to be tightened for it.`;
  if (togetherNeeded === null || togetherNeeded === 0) return `No tolerance, however tight, gives ${goal}.`;
  return `All tolerances together, each times ${countText(togetherNeeded)}, give ${goal}.`;
}

/** A share of builds or of variance, to a tenth of a percent, and more digits near none and all. */
function shareText(share: number): string {
  const isEdge = Math.min(share, 1 - share) < 0.001;
  return `${Number((100 * share).toFixed(isEdge ? 3 : 1))} %`;
}

/** What each tolerance is measured in; `noise` is over gain times the smallest extinction. */
const DIMENSIONS: Record<ToleranceName, Dimension | null> = {
  edge: 'length',
  kerf: 'length',
  place: 'length',
  distance: 'length',
  tilt: 'angle',
  wavelength: 'length',
  index: null,
  size: 'ratio',
  noise: 'ratio',
};

function sizeText(name: ToleranceName, law: ToleranceRow['law'], size: number): string {
  const dimension = DIMENSIONS[name];
  const text = dimension === null ? countText(size) : formatQuantity(size, dimension, 3);
  return law === 'limits' ? `± ${text}` : `${text} rms`;
}

function neededText({ name, law, size, needed }: ToleranceRow): string {
  if (needed === null) return 'none will do';
  return needed === size ? 'as it is' : sizeText(name, law, needed);
}

const tenths = (share: number) => (100 * Math.max(0, share)).toFixed(1);

const COLUMNS: readonly Column<ToleranceRow>[] = [
  { title: ['tolerance'], cell: ({ name }) => name, align: 'left' },
  { title: ['', 'size'], cell: ({ name, law, size }) => sizeText(name, law, size) },
  { title: ['share, %', 'alone'], cell: ({ worst }) => tenths(worst.alone) },
  { title: ['', 'in all'], cell: ({ worst }) => tenths(worst.total) },
  { title: ['yield, %', 'without'], cell: ({ without }) => tenths(without) },
  { title: ['needed', 'alone'], cell: neededText },
];
