import type { Brief } from '../run/brief.ts';
import type { RankedDesign } from '../run/ranking.ts';
import type { Nearest } from '../run/results.ts';
import type { SearchResult } from '../run/search.ts';
import type { Task } from '../score/task.ts';
import { DESIGN_COLUMNS, MEETS_COLUMN } from './designColumns.ts';
import { missText } from './missText.ts';
import { print, printWrapped } from './notes.ts';
import { table } from './table.ts';

/** Prints the front of a search as a table, and where nothing meets the target, what stands in the way. */
export function printFront(
  { task }: Brief,
  { designs, stopped }: SearchResult,
  nearest: Nearest | null,
): void {
  const shown = designs.length === 0 && nearest !== null ? [nearest.design] : designs;
  if (shown.length > 0) print(`${designTable(shown)}\n\n`);
  const meeting = designs.filter(({ meetsTarget }) => meetsTarget).length;
  if (meeting > 0) {
    const shop = task.shop === null ? '' : `, and the shop (${task.shop.name}) can cut all of them`;
    const meet = meeting === 1 ? 'meets' : 'meet';
    printWrapped(`${meeting} of ${designs.length} designs ${meet} the target${shop}.`);
  } else printNearest(nearest, task, stopped);
}

/** One row a design. */
export function designTable(designs: readonly RankedDesign[]): string {
  const { distance, radius, gain, worst, lobe, snr, time, overFloor, overLeast } = DESIGN_COLUMNS;
  const isBounded = designs.some(({ scores }) => scores.leastAreaOverFloor !== undefined);
  const columns = [distance, radius, gain, worst, lobe, snr, time, isBounded ? overLeast : overFloor];
  const name = {
    title: ['design'],
    cell: ({ id }: RankedDesign) => id,
    align: 'left' as const,
    flexible: true,
  };
  return table([name, ...columns, MEETS_COLUMN], designs);
}

/** Says how near a search came to a target that no design meets, and which limits of the brief stand in the way. */
export function printNearest(nearest: Nearest | null, task: Task, stopped: boolean): void {
  if (nearest === null) {
    const time = stopped ? ' before the search was stopped' : '';
    printWrapped(`No design meets the target: none within the limits of the brief was found${time}.`);
    return;
  }
  const { design, misses } = nearest;
  printWrapped(`No design meets the target. The nearest is ${design.id}; in its way stand:`);
  for (const miss of misses) printWrapped(missText(miss, design, task), '  - ');
}
