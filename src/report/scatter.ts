import { plainDecimal } from '../draw/plainDecimal.ts';
import { markupText } from '../draw/plainText.ts';
import { areaText, percentText, timeText } from '../draw/quantityText.ts';
import { worstOf } from '../score/scores.ts';
import { type LogAxis, logAxis } from './logAxis.ts';
import { markerPath } from './markers.ts';
import type { ReportDesign, ReportInput } from './reportInput.ts';

const WIDTH = 480;
const HEIGHT = 340;
const LEFT = 62;
const RIGHT = 30;
const TOP = 16;
const BOTTOM = 46;
const MARKER_AREA = 70;
/** Up to this many points carry their design's id. */
const MOST_NAMES = 12;

/** What the level axis counts: time where every design has one, else area over gain. */
interface Cost {
  title: string;
  of: (design: ReportDesign) => number;
  text: (value: number) => string;
}

interface Point {
  design: ReportDesign;
  anchor: string;
  x: number;
  y: number;
}

/**
 * Worst correction against time (against area over gain where a design has no time), both axes logarithmic, as inline
 * SVG; every point links to its design's section. Empty text where there is nothing to plot.
 *
 * @param anchors ids in the page, one a design
 */
export function scatter(input: ReportInput, anchors: readonly string[]): string {
  const cost = costOf(input.designs);
  const shown = input.designs
    .map((design, k) => ({ design, anchor: anchors[k] }))
    .filter(({ design }) => isPlottable(cost.of(design)) && isPlottable(worstOf(design.scores)));
  if (shown.length === 0) return '';
  const target = isPlottable(input.targetCorrection) ? [input.targetCorrection] : [];
  const across = logAxis(
    shown.map(({ design }) => cost.of(design)),
    [LEFT, WIDTH - RIGHT],
  );
  const up = logAxis(
    [...shown.map(({ design }) => worstOf(design.scores)), ...target],
    [HEIGHT - BOTTOM, TOP],
  );
  const points = shown.map(({ design, anchor }) => ({
    design,
    anchor,
    x: across.place(cost.of(design)),
    y: up.place(worstOf(design.scores)),
  }));
  const families = [...new Set(shown.map(({ design }) => design.family))];
  const left = input.designs.length - shown.length;
  return [
    '<figure class="scatter">',
    `<svg viewBox="0 0 ${WIDTH} ${HEIGHT}" role="group" aria-labelledby="scatter-title scatter-text">`,
    `<title id="scatter-title">Worst correction against ${cost.title}</title>`,
    '<desc id="scatter-text">One mark a design, on logarithmic axes; lower and farther left is better. The table below holds the same numbers.</desc>',
    levelAxis(across, cost),
    uprightAxis(up),
    ...target.map((value) => `<path class="target" d="M${LEFT} ${n(up.place(value))}H${WIDTH - RIGHT}"/>`),
    ...points.map((point) => mark(point, families.indexOf(point.design.family), cost)),
    points.length <= MOST_NAMES ? names(points, target.map(up.place)) : '',
    '</svg>',
    `<figcaption>${legend(families, target)}<p>Each mark leads to its design. Filled: meets the target. Hollow: does not. Lower and farther left is better.${left > 0 ? ` Not shown, for want of a finite positive value: ${left}.` : ''}</p></figcaption>`,
    '</figure>',
  ].join('\n');
}

function isPlottable(value: number): boolean {
  return Number.isFinite(value) && value > 0;
}

function costOf(designs: readonly ReportDesign[]): Cost {
  const timeOf = (design: ReportDesign) => design.scores.snr.time_s ?? Number.NaN;
  if (designs.every((design) => isPlottable(timeOf(design)))) {
    return { title: 'time for one measurement', of: timeOf, text: timeText };
  }
  return { title: 'area over gain', of: ({ scores }) => scores.area_m2 / scores.gain, text: areaText };
}

function n(value: number): string {
  return plainDecimal(value, 1);
}

function levelAxis({ ticks, place }: LogAxis, cost: Cost): string {
  const y = HEIGHT - BOTTOM;
  const marks = ticks.map(
    (tick) =>
      `<path class="grid" d="M${n(place(tick))} ${TOP}V${y}"/><text x="${n(place(tick))}" y="${y + 16}" text-anchor="middle">${cost.text(tick)}</text>`,
  );
  const middle = n((LEFT + WIDTH - RIGHT) / 2);
  return `${marks.join('')}<path class="frame" d="M${LEFT} ${y}H${WIDTH - RIGHT}"/><text class="axis-name" x="${middle}" y="${HEIGHT - 8}" text-anchor="middle">${capital(cost.title)}</text>`;
}

function uprightAxis({ ticks, place }: LogAxis): string {
  const marks = ticks.map(
    (tick) =>
      `<path class="grid" d="M${LEFT} ${n(place(tick))}H${WIDTH - RIGHT}"/><text x="${LEFT - 6}" y="${n(place(tick) + 4)}" text-anchor="end">${percentText(tick)}</text>`,
  );
  const middle = n((TOP + HEIGHT - BOTTOM) / 2);
  return `${marks.join('')}<path class="frame" d="M${LEFT} ${TOP}V${HEIGHT - BOTTOM}"/><text class="axis-name" transform="translate(12 ${middle}) rotate(-90)" text-anchor="middle">Worst correction</text>`;
}

function mark({ design, anchor, x, y }: Point, family: number, cost: Cost): string {
  const { id, family: name, meetsTarget, scores } = design;
  const words = `${id}, ${name}: worst correction ${percentText(worstOf(scores))}, ${cost.title} ${cost.text(cost.of(design))}, ${meetsTarget ? 'meets' : 'does not meet'} the target`;
  return `<a href="#${anchor}" aria-label="${markupText(words)}"><title>${markupText(words)}</title><path class="mark ${meetsTarget ? 'good' : 'miss'}" transform="translate(${n(x)} ${n(y)})" d="${markerPath(family, MARKER_AREA)}"/></a>`;
}

/** Ids beside the points, or below those near the target's line; one that would stand on an earlier one is left out. */
function names(points: readonly Point[], lines: readonly number[]): string {
  const placed: { x: number; y: number }[] = [];
  return points
    .map(({ design, x, y: markY }) => {
      const y = lines.some((line) => Math.abs(line - markY) < 16) ? markY + 16 : markY;
      const id = design.id.length > 14 ? `${design.id.slice(0, 13)}…` : design.id;
      const isRight = x + 14 + 7 * id.length < WIDTH - RIGHT;
      if (placed.some((other) => Math.abs(other.x - x) < 7 * id.length + 12 && Math.abs(other.y - y) < 13))
        return '';
      placed.push({ x, y });
      return `<text class="halo" aria-hidden="true" x="${n(x + (isRight ? 10 : -10))}" y="${n(y + 4)}" text-anchor="${isRight ? 'start' : 'end'}">${markupText(id)}</text>`;
    })
    .join('');
}

function legend(families: readonly string[], target: readonly number[]): string {
  const items = families.map(
    (family, k) =>
      `${sample(`<path class="mark good" d="${markerPath(k, MARKER_AREA)}"/>`)} ${markupText(family)}`,
  );
  const lines = target.map(
    (value) => `${sample('<path class="target" d="M-8 0h16"/>')} target, ${percentText(value)}`,
  );
  return `<ul class="legend">${[...items, ...lines].map((item) => `<li>${item}</li>`).join('')}</ul>`;
}

function sample(content: string): string {
  return `<svg viewBox="-8 -8 16 16" width="16" height="16" aria-hidden="true">${content}</svg>`;
}

function capital(text: string): string {
  return text[0].toUpperCase() + text.slice(1);
}
