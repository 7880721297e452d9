import { markupText } from '../draw/plainText.ts';
import { countText, timeText } from '../draw/quantityText.ts';
import { worstOf } from '../score/scores.ts';
import type { ReportDesign } from './reportInput.ts';

interface Column {
  title: string;
  cell: (design: ReportDesign) => string;
}

const COLUMNS: readonly Column[] = [
  { title: 'Rank', cell: ({ rank }) => String(rank) },
  { title: 'Family', cell: ({ family }) => markupText(family) },
  { title: 'Distance, mm', cell: ({ distanceM }) => countText(1e3 * distanceM) },
  { title: 'Radius, µm', cell: ({ scores }) => countText(1e6 * scores.radius_m) },
  { title: 'Gain', cell: ({ scores }) => scores.gain.toFixed(3) },
  { title: 'Worst correction, %', cell: ({ scores }) => finePercent(worstOf(scores)) },
  { title: 'RMS correction, %', cell: ({ scores }) => countText(100 * scores.correction.rms) },
  { title: 'Lobe ratio', cell: ({ scores }) => countText(scores.lobe.ratio) },
  { title: 'Required SNR', cell: ({ scores }) => countText(scores.snr.required) },
  { title: 'Time', cell: ({ scores }) => timeText(scores.snr.time_s) },
  { title: 'Area over floor', cell: ({ scores }) => countText(scores.areaOverFloor) },
  { title: 'Area over least', cell: ({ scores }) => overLeast(scores) },
  { title: 'Fits the shop', cell: ({ scores }) => shopText(scores.shop.fits) },
  { title: 'Meets target', cell: ({ meetsTarget }) => (meetsTarget ? 'yes' : 'no') },
];

/** A dash where no bound is known. */
function overLeast({ areaOverFloor, leastAreaOverFloor: least }: ReportDesign['scores']): string {
  return least === undefined ? '–' : (areaOverFloor / least).toFixed(3);
}

/** Four digits, so that a correction just beyond the target does not look like one that keeps it. */
function finePercent(ratio: number): string {
  return String(Number((100 * ratio).toPrecision(4)));
}

/**
 * One row a design, its id leading to its section.
 *
 * @param anchors ids in the page, one a design
 */
export function designTable(designs: readonly ReportDesign[], anchors: readonly string[]): string {
  const head = ['Design', ...COLUMNS.map(({ title }) => title)].map(
    (title) => `<th scope="col">${title}</th>`,
  );
  const rows = designs.map((design, k) => {
    const cells = COLUMNS.map(({ cell }) => `<td>${cell(design)}</td>`);
    const id = `<th scope="row"><a href="#${anchors[k]}">${markupText(design.id)}</a></th>`;
    return `<tr>${id}${cells.join('')}</tr>`;
  });
  return [
    '<div class="scroll" role="region" aria-labelledby="table-caption" tabindex="0">',
    '<table>',
    '<caption id="table-caption">The designs and what they cost</caption>',
    `<thead><tr>${head.join('')}</tr></thead>`,
    `<tbody>${rows.join('\n')}</tbody>`,
    '</table>',
    '</div>',
    '<p class="small">Area over floor is area over gain, divided by wavelength times distance; area over least is the same beside the least that any mask is proven to need. On a small screen the table moves sideways.</p>',
  ].join('\n');
}

/** How a table says whether the shop can cut a design. */
export function shopText(fits: boolean | null): string {
  return fits === null ? 'no shop named' : fits ? 'yes' : 'no';
}
