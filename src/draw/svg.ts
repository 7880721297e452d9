import type { OutlineElement } from '../outline/shape.ts';
import { callouts } from './callouts.ts';
import { checkDrawing, type Drawing, VIEW_NOTE } from './drawing.ts';
import { largestRadius } from './elementMeasure.ts';
import { elementText } from './elementText.ts';
import { hatchPattern, inkClass, inkColor } from './hatch.ts';
import { shortDecimal as n, plainDecimal } from './plainDecimal.ts';
import { markupText } from './plainText.ts';
import { quantityText } from './quantityText.ts';
import { roundDown } from './roundDown.ts';
import { type Fact, titleBlock } from './titleBlock.ts';

const MARGIN = 8;
const VIEW_SIDE = 84;
const COLUMN_WIDTH = 32;
const LABEL_PITCH = 6;
const FONT_SIZE = 3;
const LINE_PITCH = 1.4 * FONT_SIZE;
const INK = '#1d2328';

/** Everything on the sheet in millimetres, y down; the enlarged view is `scale` times true size. */
interface Sheet {
  width: number;
  radiusMm: number;
  scale: number;
  viewTop: number;
  viewHeight: number;
  trueTop: number;
  trueHeight: number;
  blockTop: number;
}

/**
 * The drawing as one SVG sheet. Width, height and viewBox are millimetres, so 1 user unit is 1 mm on paper.
 *
 * The group `true-size` holds the outline itself: one even-odd `<path data-element data-weight>` an element, in
 * millimetres with the origin on the beam axis and y up, which the group's `translate(…) scale(1 -1)` turns into the
 * sheet's y down; `data-origin` and the paths' attributes tell `readSvg` what is the outline. They are the only `<path>`s of the file. Above it the same paths are shown enlarged through `<use>`,
 * with hatches and labels, for reading only. The same drawing always gives the same text; there is no script.
 *
 * @throws RimwrightError `input` where `checkDrawing` does
 */
export function drawSvg(drawing: Drawing): string {
  checkDrawing(drawing);
  const { elements } = drawing;
  const sheet = layOut(elements);
  const { markup: block, bottom } = titleBlock(blockFacts(drawing, sheet), [VIEW_NOTE, ...drawing.notes], {
    left: MARGIN,
    top: sheet.blockTop,
    width: sheet.width - 2 * MARGIN,
  });
  const height = bottom + MARGIN;
  const size = `${n(sheet.width)} ${n(height)}`;
  return [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<svg xmlns="http://www.w3.org/2000/svg" width="${n(sheet.width)}mm" height="${n(height)}mm" viewBox="0 0 ${size}" font-family="sans-serif" font-size="${FONT_SIZE}" fill="${INK}">`,
    `<title>${markupText(drawing.title)}</title>`,
    '<defs>',
    ...elements.map((element, e) => hatchPattern(hatchId(e), e, element.weight, n(0.5 / sheet.scale))),
    '</defs>',
    `<rect width="${n(sheet.width)}" height="${n(height)}" fill="#ffffff"/>`,
    enlargedView(elements, sheet),
    trueSizeFigure(elements, sheet),
    block,
    '</svg>',
    '',
  ].join('\n');
}

function hatchId(index: number): string {
  return `hatch-${index + 1}`;
}

function layOut(elements: readonly OutlineElement[]): Sheet {
  const radiusMm = 1e3 * largestRadius(elements);
  const viewTop = MARGIN + LINE_PITCH;
  const viewHeight = Math.max(VIEW_SIDE, LABEL_PITCH * elements.length);
  const trueTop = viewTop + viewHeight + 3 * LINE_PITCH;
  const trueHeight = 2 * Math.max(9, radiusMm + 5);
  return {
    width: Math.max(2 * MARGIN + VIEW_SIDE + COLUMN_WIDTH, 2 * MARGIN + 2 * radiusMm + 90),
    radiusMm,
    scale: viewScale((0.48 * VIEW_SIDE) / radiusMm),
    viewTop,
    viewHeight,
    trueTop,
    trueHeight,
    blockTop: trueTop + trueHeight + LINE_PITCH,
  };
}

/** The enlarged view's scale: a round number to 1, or 1 to a whole number, not above `largest`. */
function viewScale(largest: number): number {
  return largest >= 1 ? roundDown(largest, [1, 1.5, 2, 3, 4, 5, 6, 8]) : 1 / Math.ceil(1 / largest);
}

function enlargedView(elements: readonly OutlineElement[], sheet: Sheet): string {
  const { scale, viewTop, viewHeight } = sheet;
  const [x, y] = [MARGIN + VIEW_SIDE / 2, viewTop + viewHeight / 2];
  const bar = roundDown(24 / scale);
  const layout = {
    centreX: x,
    centreY: y,
    unitsPerMetre: 1e3 * scale,
    columnX: MARGIN + VIEW_SIDE + 2,
    top: viewTop,
    bottom: viewTop + viewHeight,
    fontSize: FONT_SIZE,
    hatchScale: scale,
    hatchId,
  };
  return [
    `<g id="enlarged-view">`,
    text(MARGIN, MARGIN + 1, `${scale < 1 ? 'Reduced' : 'Enlarged'} ${scaleText(scale)}, for reading only`),
    `<g transform="translate(${n(x)} ${n(y)}) scale(${n(scale)} ${n(-scale)})" stroke-width="${n(0.15 / scale)}">`,
    ...elements.map(
      ({ weight }, e) =>
        `<use href="#element-${e + 1}" class="${inkClass(weight)}" fill="url(#${hatchId(e)})" stroke="${inkColor(weight)}"/>`,
    ),
    '</g>',
    cross(x, y, 0, 2),
    callouts(elements, layout),
    scaleBar(MARGIN, viewTop + viewHeight + LINE_PITCH, bar * scale, quantityText(bar * 1e-3, 'm')),
    '</g>',
  ].join('\n');
}

function trueSizeFigure(elements: readonly OutlineElement[], sheet: Sheet): string {
  const { radiusMm, trueTop, trueHeight } = sheet;
  const y = trueTop + trueHeight / 2;
  const x = MARGIN + trueHeight / 2;
  return [
    `<g id="true-size" data-origin="axis" transform="translate(${n(x)} ${n(y)}) scale(1 -1)">`,
    ...elements.map(
      (element, e) =>
        `<path id="element-${e + 1}" data-element="${e + 1}" data-weight="${element.weight}" fill-rule="evenodd" d="${pathData(element)}"/>`,
    ),
    '</g>',
    cross(x, y, radiusMm + 1, radiusMm + 4),
    text(x + trueHeight / 2 + 4, y - 2, 'True size 1 : 1'),
    scaleBar(x + trueHeight / 2 + 4, y + 3, 10, '10 mm: measure it to check a print'),
  ].join('\n');
}

/** Ten decimals: a rounding of 5e-11 mm at most. */
function pathData({ rings }: OutlineElement): string {
  return rings
    .map((ring) => {
      const points = Array.from(
        { length: ring.length / 2 },
        (_, k) => `${plainDecimal(1e3 * ring[2 * k], 10)} ${plainDecimal(1e3 * ring[2 * k + 1], 10)}`,
      );
      return `M ${points.join(' L ')} Z`;
    })
    .join(' ');
}

/** What the title block states of every drawing, and its own facts between them. */
function blockFacts({ title, distanceM, elements, facts, hash }: Drawing, sheet: Sheet): Fact[] {
  return [
    { label: 'Title', text: title },
    { label: 'Distance, particle to mask', text: quantityText(distanceM, 'm') },
    { label: 'Design', text: hash },
    { label: 'Unit', text: 'millimetre' },
    { label: 'Scale', text: `small figure ${scaleText(1)}, large view ${scaleText(sheet.scale)}` },
    ...facts,
    ...elements.map((element, e) => ({
      label: `Element ${e + 1}`,
      text: elementText(element),
    })),
  ];
}

function text(x: number, y: number, content: string): string {
  return `<text x="${n(x)}" y="${n(y)}">${markupText(content)}</text>`;
}

/** Four strokes towards (x, y), from `outer` to `inner` away from it; a full cross where `inner` is 0. */
function cross(x: number, y: number, inner: number, outer: number): string {
  const strokes = [
    [1, 0],
    [0, 1],
    [-1, 0],
    [0, -1],
  ].map(
    ([dx, dy]) =>
      `<line x1="${n(x + inner * dx)}" y1="${n(y + inner * dy)}" x2="${n(x + outer * dx)}" y2="${n(y + outer * dy)}"/>`,
  );
  return `<g class="centre-mark" stroke="${INK}" stroke-width="0.1">${strokes.join('')}</g>`;
}

function scaleBar(x: number, y: number, length: number, label: string): string {
  const ends = [x, x + length].map(
    (end) => `<line x1="${n(end)}" y1="${n(y - 1)}" x2="${n(end)}" y2="${n(y + 1)}"/>`,
  );
  return [
    `<g class="scale-bar" stroke="${INK}" stroke-width="0.3">${ends.join('')}<line x1="${n(x)}" y1="${n(y)}" x2="${n(x + length)}" y2="${n(y)}"/></g>`,
    text(x + length + 2, y + 1, label),
  ].join('\n');
}

function scaleText(scale: number): string {
  return scale >= 1 ? `${plainDecimal(scale, 1)} : 1` : `1 : ${plainDecimal(1 / scale, 0)}`;
}
