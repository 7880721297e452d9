import { formatQuantity } from '../base/quantity.ts';
import { countText } from '../draw/quantityText.ts';
import type { RoughPlace, RoughReading, RoughResult } from '../run/roughReadings.ts';
import { print, printWrapped } from './notes.ts';
import type { Column } from './table.ts';
import { table } from './table.ts';

/** Prints what rough edges do: one row for each particle and wavelength, at its worst place. */
export function printRough(rough: RoughResult): void {
  const { outlines, redrawn, places, readings, worst } = rough;
  const rms = formatQuantity(rough.rms_m, 'length');
  const length = formatQuantity(rough.correlation_m, 'length');
  const where = places > 1 ? `where it is worst of ${places} places` : 'at the one place';
  const again = redrawn === 0 ? '' : ` (${redrawn} more were thrown away: their edges met)`;
  print('');
  printWrapped(
    `Edges of ${rms} rms, correlated over ${length}, in ${outlines} outlines${again}: the correction ${where}, ` +
      `mean ± standard deviation, and the closed estimate for small roughness.`,
  );
  print('');
  print(table(COLUMNS, readings));
  print('');
  const gain = worst.gain === 1 ? '' : `, gain ${countText(worst.gain)} taken out`;
  printWrapped(
    `Worst correction over all of these${gain}: ${percent(worst.smooth)} % smooth, ` +
      `${percent(worst.mean)} ± ${percent(worst.spread)} % rough, ${percent(worst.largest)} % at the most.`,
  );
}

const percent = (ratio: number) => countText(100 * ratio);
const measured = ({ mean, spread }: { mean: number; spread: number }) =>
  `${percent(mean)} ± ${percent(spread)}`;
const at = (cell: (place: RoughPlace) => string) => (reading: RoughReading) => cell(reading.worst);

const COLUMNS: readonly Column<RoughReading>[] = [
  {
    title: ['particle'],
    cell: ({ particle }) => `${formatQuantity(particle.diameter_m, 'length', 3)} ${particle.material}`,
    align: 'left',
    flexible: true,
  },
  {
    title: ['light', 'nm'],
    cell: (reading) => String(Number((reading.wavelength_m * 1e9).toPrecision(5))),
  },
  { title: ['smooth', '%'], cell: at(({ smooth }) => percent(smooth)) },
  { title: ['rough', '%'], cell: at(measured) },
  { title: ['estimate', '%'], cell: at(({ estimate }) => measured(estimate)) },
];
