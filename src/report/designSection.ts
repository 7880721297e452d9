import { markupText } from '../draw/plainText.ts';
import { areaText, countText, percentText, quantityText, timeText } from '../draw/quantityText.ts';
import { worstOf } from '../score/scores.ts';
import { designNotes } from './designNotes.ts';
import { shopText } from './designTable.ts';
import { outlineFigure } from './outlineFigure.ts';
import type { ReportDesign, ReportInput } from './reportInput.ts';
import { textList } from './textList.ts';

/** A design's own part of the report: picture, scores, notes, and what the shop should mind. */
export function designSection(design: ReportDesign, input: ReportInput, anchor: string): string {
  const { scores } = design;
  return [
    `<article id="${anchor}" aria-labelledby="${anchor}-name">`,
    `<h3 id="${anchor}-name">${markupText(design.id)} <span class="family">${markupText(design.family)}</span></h3>`,
    '<div class="beside">',
    outlineFigure(design, input, anchor),
    '<div>',
    scoreList(design),
    '<h4>Notes</h4>',
    textList(designNotes(design, input.targetCorrection), 'Nothing to add.'),
    '<h4>Machinability</h4>',
    `<p>Fits the shop: ${shopText(scores.shop.fits)}.</p>`,
    textList(scores.shop.notes, ''),
    '</div></div>',
    '</article>',
  ].join('\n');
}

function scoreList({ rank, distanceM, elements, scores, meetsTarget, asDrawn }: ReportDesign): string {
  const rows: [name: string, value: string][] = [
    ['Rank', rank === 1 ? '1 (front)' : String(rank)],
    ['Meets the target', meetsTarget ? 'yes' : 'no'],
    ['Distance', quantityText(distanceM, 'm')],
    ['Radius', quantityText(scores.radius_m, 'm')],
    ['Elements', String(elements.length)],
    ['Gain', scores.gain.toFixed(3)],
    [asDrawn ? 'Worst correction, as cut' : 'Worst correction', percentText(worstOf(scores))],
    ...(asDrawn ? [['Worst correction, as drawn', percentText(asDrawn.worst)] as [string, string]] : []),
    ...certifiedRows(scores),
    ['RMS correction', percentText(scores.correction.rms)],
    ...populationRow(scores),
    ['Lobe ratio', countText(scores.lobe.ratio)],
    ['Required SNR', countText(scores.snr.required)],
    ['Time', timeText(scores.snr.time_s)],
    ['Area', areaText(scores.area_m2)],
    ['Area over floor', countText(scores.areaOverFloor)],
    ...leastRow(scores),
  ];
  return `<dl>${rows.map(([name, value]) => `<div><dt>${name}</dt><dd>${value}</dd></div>`).join('')}</dl>`;
}

/** What any mask would need at that distance, of that gain and worst correction. */
function leastRow({ areaOverFloor, leastAreaOverFloor: least }: ReportDesign['scores']): [string, string][] {
  if (least === undefined) return [];
  return [
    ['Least of any mask', `${countText(least)}, exceeded by ${percentText(areaOverFloor / least - 1)}`],
  ];
}

/** Where the worst was found, and what the samples alone would say. */
function certifiedRows({ correction: { worst, certifiedAt } }: ReportDesign['scores']): [string, string][] {
  if (certifiedAt === undefined) return [];
  const { diameter_m, material, wavelength_m, depth_m, position_m } = certifiedAt;
  const [x, y, z] = [...position_m, depth_m].map((metres) =>
    quantityText(Math.round(metres * 1e9) / 1e9, 'm'),
  );
  const particle = `${quantityText(diameter_m, 'm')} of ${material}`;
  const light = `${quantityText(wavelength_m, 'm')} light`;
  return [
    ['Worst of the samples', percentText(worst)],
    ['Worst found for', `${markupText(particle)} in ${light}, at x ${x}, y ${y}, z ${z}`],
  ];
}

function populationRow({ correction: { population } }: ReportDesign['scores']): [string, string][] {
  return population === undefined ? [] : [['Correction of the mean over the sizes', percentText(population)]];
}
