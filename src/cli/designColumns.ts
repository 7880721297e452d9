import { countText, timeText } from '../draw/quantityText.ts';
import type { RankedDesign } from '../run/ranking.ts';
import type { Scores } from '../score/scores.ts';
import { worstOf } from '../score/scores.ts';
import type { Column } from './table.ts';

/** Columns that every table of designs shares. */
export const DESIGN_COLUMNS = {
  distance: { title: ['dist.', 'mm'], cell: ({ distanceM }) => countText(1e3 * distanceM) },
  radius: { title: ['radius', 'µm'], cell: ({ scores }) => countText(1e6 * scores.radius_m) },
  gain: { title: ['gain'], cell: ({ scores }) => scores.gain.toFixed(3) },
  worst: { title: ['worst', '%'], cell: ({ scores }) => percentCell(worstOf(scores)) },
  rms: { title: ['rms', '%'], cell: ({ scores }) => countText(100 * scores.correction.rms) },
  lobe: { title: ['lobe', '%'], cell: ({ scores }) => countText(100 * scores.lobe.ratio) },
  snr: { title: ['SNR'], cell: ({ scores }) => shortCount(scores.snr.required) },
  time: { title: ['time'], cell: ({ scores }) => timeText(scores.snr.time_s) },
  area: { title: ['area', 'mm²'], cell: ({ scores }) => shortCount(scores.area_m2 * 1e6) },
  overFloor: { title: ['area/', 'floor'], cell: ({ scores }) => countText(scores.areaOverFloor) },
  overLeast: { title: ['area/', 'least'], cell: ({ scores }) => overLeastText(scores) },
} satisfies Record<string, Column<RankedDesign>>;

/** How much more area over gain a design has than it is proven to need, as a factor. */
function overLeastText({ areaOverFloor, leastAreaOverFloor }: Scores): string {
  return leastAreaOverFloor === undefined ? '–' : (areaOverFloor / leastAreaOverFloor).toFixed(3);
}

/** Four significant digits, so that a correction just beyond a target of 1 % does not look like one that keeps it. */
export function percentCell(ratio: number): string {
  const percent = 100 * ratio;
  return percent !== 0 && (percent < 1e-3 || percent >= 1e4)
    ? shortCount(percent)
    : String(Number(percent.toPrecision(4)));
}

/** Three significant digits; large and small numbers as `1.12e5`, which takes less room than powers of ten. */
export function shortCount(value: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-3 || size >= 1e5)) return value.toExponential(2).replace('e+', 'e');
  return countText(value);
}

/** Whether the shop can cut a design, as tables say it. */
export function shopColumn(hasShop: boolean): Column<RankedDesign> {
  return { title: ['shop'], cell: ({ shop }) => (!hasShop ? '–' : shop.fits ? 'fits' : 'no') };
}

/** Marks the designs that meet the target. */
export const MEETS_COLUMN: Column<RankedDesign> = {
  title: ['target'],
  cell: ({ meetsTarget }) => (meetsTarget ? 'met' : 'no'),
};
