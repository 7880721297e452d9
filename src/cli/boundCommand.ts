import { inputError } from '../base/errors.ts';
import { formatQuantity } from '../base/quantity.ts';
import { areaText, countText, percentText, timeText } from '../draw/quantityText.ts';
import type { BoundJson } from '../run/bound.ts';
import { boundDistances, boundGains, boundsOf } from '../run/bound.ts';
import { briefToJson } from '../run/briefJson.ts';
import { jsonText } from '../run/jsonText.ts';
import { openBrief } from '../run/openBrief.ts';
import { LEAST_GAIN } from '../score/correction.ts';
import { EXIT } from './exit.ts';
import { noteDefaults, print, printWrapped } from './notes.ts';
import { readDistance } from './quantityOptions.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

interface Options {
  distance?: string;
  gain?: string;
  json?: true;
}

/** Largest gain that may be asked for. */
const LARGEST_GAIN = 100;

/** Runs `rimwright bound` and gives its exit code: 1 where no mask at all keeps the target. */
export async function run(place: string, options: Options): Promise<number> {
  const distance = await readDistance(options.distance);
  const asked = readGains(options.gain);
  const { brief } = await openBrief(place);
  const { task } = brief;
  if (!options.json) noteDefaults(brief.defaults);
  const bounds = await boundsOf(
    task,
    distance === null ? boundDistances(task) : [distance],
    asked ?? boundGains(task),
  );
  if (options.json) print(jsonText({ brief: briefToJson(brief), bounds }));
  else printBounds(bounds, task.target.correction);
  return bounds.some(({ any }) => any !== null) ? EXIT.done : EXIT.target;
}

function printBounds(bounds: readonly BoundJson[], correction: number): void {
  printWrapped(
    `Least detector area over gain at which any mask reads within ${percentText(correction)} everywhere, proven by linear programming:`,
  );
  print('');
  const hasStar = bounds.some(({ star }) => star !== undefined);
  print(table(hasStar ? [...COLUMNS, STAR] : COLUMNS, bounds));
  print('');
  const error = Math.max(...bounds.flatMap(({ any, star }) => [any?.error ?? 0, star?.error ?? 0]));
  printWrapped(
    `Units of λz. ${hasStar ? ABOUT_STAR : ABOUT_PLANE} Up to ${countText(error)} has been taken off for the finite size of cells and tables; ` +
      `a mask that the program found comes within ${percentText(largestGap(bounds))} of each bound. ` +
      `"none" means that no mask within the radius keeps the target at that gain.`,
  );
}

/** How far the masks found lie above their bounds, at most. */
function largestGap(bounds: readonly BoundJson[]): number {
  const gaps = bounds.flatMap(({ any, star }) =>
    [any, star ?? null].map((least) =>
      least === null ? 0 : least.mask.areaOverFloor / least.areaOverFloor - 1,
    ),
  );
  return Math.max(...gaps);
}

const NONE = 'none';

const COLUMNS: readonly Column<BoundJson>[] = [
  { title: ['distance'], cell: ({ distance_m }) => formatQuantity(distance_m, 'length', 3) },
  { title: ['radius', 'within'], cell: ({ radius_m }) => formatQuantity(radius_m, 'length', 3) },
  { title: ['gain'], cell: ({ gain }) => countText(gain) },
  { title: ['any mask', 'λz'], cell: ({ any }) => (any === null ? NONE : overFloor(any.areaOverFloor)) },
  { title: ['area'], cell: ({ any }) => (any === null ? '' : areaText(any.area_m2)) },
  { title: ['time'], cell: ({ any }) => (any === null ? '' : timeText(any.time_s)) },
];

const STAR: Column<BoundJson> = {
  title: ['star', 'λz'],
  cell: ({ star }) => (star ? overFloor(star.areaOverFloor) : NONE),
};

const ABOUT_STAR = `"Star" holds for outlines that every ray from the axis leaves just once: discs, ramps, Fourier boundaries.`;

const ABOUT_PLANE =
  'Polarised light or a flight has a direction: masks are taken on cells of the plane, with no bound of their own for stars.';

function overFloor(value: number): string {
  return value.toFixed(value < 10 ? 4 : 2);
}

/** `--gain "0.5, 1, 2"`, null where it is left out. */
function readGains(text: string | undefined): number[] | null {
  if (text === undefined) return null;
  const gains = text.split(',').map((part) => Number(part.trim() === '' ? Number.NaN : part));
  if (gains.length <= 40 && gains.every((gain) => gain >= LEAST_GAIN && gain <= LARGEST_GAIN)) return gains;
  const expected = `gains from ${LEAST_GAIN} to ${LARGEST_GAIN}, such as "0.5, 1, 2"`;
  throw inputError([{ key: '--gain', found: JSON.stringify(text.slice(0, 60)), expected }]);
}
