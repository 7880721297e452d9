import type { OutlineElement } from '../outline/shape.ts';
import { inkClass, inkColor } from './hatch.ts';
import { labelPoint } from './labelPoint.ts';
import { shortDecimal as n } from './plainDecimal.ts';
import { weightText } from './quantityText.ts';

/** Where a figure stands on its page, and where its labels go. Lengths in user units of the page. */
export interface CalloutLayout {
  /** The beam axis. */
  centreX: number;
  centreY: number;
  /** Page units per metre. */
  unitsPerMetre: number;
  /** Left edge of the column of labels, and the height over which it spreads. */
  columnX: number;
  top: number;
  bottom: number;
  fontSize: number;
  /** Scale of the group that the element's hatch was made for, so that the swatch shows the same hatch. */
  hatchScale: number;
  hatchId: (index: number) => string;
}

/** SVG markup of one label an element (`1: weight +1`), with a swatch of its hatch and a line to the opening it names. */
export function callouts(elements: readonly OutlineElement[], layout: CalloutLayout): string {
  const { centreX, centreY, unitsPerMetre, top, bottom } = layout;
  const anchors = elements.map((element, index) => {
    const [x, y] = labelPoint(element);
    return { index, weight: element.weight, x: centreX + unitsPerMetre * x, y: centreY - unitsPerMetre * y };
  });
  // From the top down, and from the left where two are level: then lines from one level row do not cross.
  anchors.sort((a, b) => a.y - b.y || a.x - b.x);
  const pitch = (bottom - top) / anchors.length;
  return anchors.map((anchor, row) => callout(anchor, top + (row + 0.5) * pitch, layout)).join('\n');
}

interface Anchor {
  index: number;
  weight: number;
  x: number;
  y: number;
}

function callout({ index, weight, x, y }: Anchor, labelY: number, layout: CalloutLayout): string {
  const { columnX, fontSize: em, hatchScale } = layout;
  const swatch = `width="${n((1.6 * em) / hatchScale)}" height="${n(em / hatchScale)}"`;
  const ink = `class="${inkClass(weight)}" stroke="${inkColor(weight)}"`;
  return [
    `<line class="leader" x1="${n(x)}" y1="${n(y)}" x2="${n(columnX - 0.4 * em)}" y2="${n(labelY)}" stroke="#1d2328" stroke-width="${n(0.06 * em)}"/>`,
    `<circle class="leader-end" cx="${n(x)}" cy="${n(y)}" r="${n(0.2 * em)}" fill="#1d2328"/>`,
    `<g transform="translate(${n(columnX)} ${n(labelY + 0.5 * em)}) scale(${n(hatchScale)} ${n(-hatchScale)})">` +
      `<rect ${swatch} fill="url(#${layout.hatchId(index)})" ${ink} stroke-width="${n((0.06 * em) / hatchScale)}"/></g>`,
    `<text x="${n(columnX + 2.1 * em)}" y="${n(labelY + 0.35 * em)}" font-size="${n(em)}">${index + 1}: weight ${weightText(weight)}</text>`,
  ].join('\n');
}
