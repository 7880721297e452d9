import { callouts } from '../draw/callouts.ts';
import { VIEW_NOTE } from '../draw/drawing.ts';
import { largestRadius } from '../draw/elementMeasure.ts';
import { hatchPattern, inkClass, inkColor } from '../draw/hatch.ts';
import { shortDecimal as n, plainDecimal } from '../draw/plainDecimal.ts';
import { markupText } from '../draw/plainText.ts';
import { quantityText } from '../draw/quantityText.ts';
import { roundDown } from '../draw/roundDown.ts';
import type { ReportDesign, ReportInput } from './reportInput.ts';
import { type ZoneCircles, zoneCircles } from './zoneCircles.ts';

const VIEW_SIDE = 300;
const COLUMN_X = 316;
const WIDTH = 440;
const BAR_ROOM = 30;
const MOST_CIRCLES = 10;

/** What the figure shows, measured once. Lengths in metres, `scale` in page units per micrometre. */
interface View {
  anchor: string;
  centreY: number;
  height: number;
  scale: number;
  zones: ZoneCircles;
  offsetM: number;
}

/**
 * A design's outline to scale as inline SVG, with the disc in which the particle may be and Fresnel-zone circles, and a
 * caption that says what they are. Coordinates are rounded to 0.01 µm.
 *
 * @param anchor the design's id in the page, from which the ids inside are made
 */
export function outlineFigure(design: ReportDesign, input: ReportInput, anchor: string): string {
  const view = measure(design, input, anchor);
  const { centreY, height, scale } = view;
  const hatchId = (index: number) => `${anchor}-hatch-${index + 1}`;
  return [
    '<figure class="outline">',
    `<svg viewBox="0 0 ${WIDTH} ${n(height + BAR_ROOM)}" role="img" aria-labelledby="${anchor}-picture">`,
    `<title id="${anchor}-picture">Outline of design ${markupText(design.id)}, to scale</title>`,
    `<defs>${design.elements.map(({ weight }, e) => hatchPattern(hatchId(e), e, weight, n(1.6 / scale))).join('')}</defs>`,
    `<g transform="translate(${VIEW_SIDE / 2} ${n(centreY)}) scale(${n(scale)} ${n(-scale)})" stroke-width="${n(0.8 / scale)}">`,
    ...design.elements.map(
      ({ weight, rings }, e) =>
        `<path class="${inkClass(weight)}" fill-rule="evenodd" fill="url(#${hatchId(e)})" stroke="${inkColor(weight)}" d="${rings.map(ringPath).join('')}"/>`,
    ),
    ...view.zones.radiiM.map((radiusM) => `<circle class="zone" r="${n(1e6 * radiusM)}"/>`),
    input.offsetM > 0 ? `<circle class="offset" r="${n(1e6 * input.offsetM)}"/>` : '',
    '</g>',
    `<path class="axis" d="M${VIEW_SIDE / 2 - 5} ${n(centreY)}h10M${VIEW_SIDE / 2} ${n(centreY - 5)}v10"/>`,
    zoneLabels(view),
    callouts(design.elements, {
      centreX: VIEW_SIDE / 2,
      centreY,
      unitsPerMetre: 1e6 * scale,
      columnX: COLUMN_X,
      top: 0,
      bottom: height,
      fontSize: 12,
      hatchScale: scale,
      hatchId,
    }),
    scaleBar(view),
    '</svg>',
    `<figcaption>${caption(view)}</figcaption>`,
    '</figure>',
  ].join('\n');
}

function measure({ elements, distanceM }: ReportDesign, input: ReportInput, anchor: string): View {
  const { wavelengthMediumM, offsetM } = input;
  const radiusM = Math.max(largestRadius(elements), offsetM);
  const height = Math.max(VIEW_SIDE, 24 * elements.length);
  return {
    anchor,
    centreY: height / 2,
    height,
    scale: (0.48 * VIEW_SIDE) / (1e6 * radiusM),
    zones: zoneCircles(wavelengthMediumM, distanceM, 1.02 * radiusM, MOST_CIRCLES),
    offsetM,
  };
}

function ringPath(ring: Float64Array): string {
  const points = Array.from(
    { length: ring.length / 2 },
    (_, k) => `${plainDecimal(1e6 * ring[2 * k], 2)} ${plainDecimal(1e6 * ring[2 * k + 1], 2)}`,
  );
  return `M${points.join('L')}Z`;
}

/** Names the innermost and the outermost circle, where there is room. */
function zoneLabels({ zones: { step, radiiM }, scale, centreY }: View): string {
  const places = radiiM
    .map((radiusM, k) => ({ multiple: (k + 1) * step, radius: 1e6 * scale * radiusM }))
    .filter((place, k) => (k === 0 && place.radius > 24) || (k > 0 && k === radiiM.length - 1));
  return places
    .map(
      ({ multiple, radius }) =>
        `<text class="zone-name" x="${VIEW_SIDE / 2}" y="${n(centreY - radius + 10)}" font-size="10" text-anchor="middle">${zoneName(multiple)}</text>`,
    )
    .join('\n');
}

/** No-break spaces keep the equation on one line. */
function zoneName(multiple: number): string {
  return `η\u00a0=\u00a0${multiple === 1 ? '' : multiple}π`;
}

function scaleBar({ scale, height }: View): string {
  const barUm = roundDown(80 / scale);
  const y = height + 16;
  return (
    `<path class="bar" d="M4 ${n(y - 4)}v8M4 ${n(y)}h${n(barUm * scale)}m0 -4v8"/>` +
    `<text x="${n(barUm * scale + 12)}" y="${n(y + 4)}" font-size="12">${quantityText(barUm * 1e-6, 'm')}</text>`
  );
}

function caption({ zones, offsetM }: View): string {
  const disc =
    offsetM > 0
      ? ` Dashed disc: the particle may be anywhere within ${quantityText(offsetM, 'm')} of the axis.`
      : '';
  return `${VIEW_NOTE} ${circlesText(zones)}${disc}`;
}

function circlesText({ step, radiiM }: ZoneCircles): string {
  if (radiiM.length === 0) return 'The outline lies within the first Fresnel zone.';
  if (radiiM.length === 1) return `Thin circle: Fresnel zone of a particle on the axis, ${zoneName(step)}.`;
  const last = radiiM.length > 2 ? ` to ${radiiM.length * step}π` : '';
  return `Thin circles: Fresnel zones of a particle on the axis, ${zoneName(step)}, ${2 * step}π${last}.`;
}
