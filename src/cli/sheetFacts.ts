import { quantityText } from '../draw/quantityText.ts';
import type { Fact } from '../draw/titleBlock.ts';
import type { OutlineElement } from '../outline/shape.ts';
import type { EdgeSensitivity } from '../score/edgeSensitivity.ts';
import type { ShopRules } from '../shop/shopRules.ts';

/** Edges that a drawing names as critical. */
const MOST_EDGES = 3;

/** What a drawing says of the shop's sheet and of how true its edges are. */
export function shopFacts(shop: ShopRules | null): Fact[] {
  if (shop === null) return [{ label: 'Sheet', text: 'as agreed with the shop: the brief names none' }];
  const { title, edgeToleranceM, insideCornerRadiusM, outsideCornerRadiusM, kerfM } = shop;
  const corners = [
    `inside ${quantityText(insideCornerRadiusM, 'm')}`,
    `outside ${quantityText(outsideCornerRadiusM, 'm')}`,
  ];
  return [
    { label: 'Sheet', text: title },
    { label: 'Edges', text: `± ${quantityText(edgeToleranceM, 'm')}, unless agreed otherwise` },
    { label: 'Smallest corner radii as cut', text: corners.join(', ') },
    ...(kerfM > 0
      ? [
          {
            label: 'Kerf',
            text: `${quantityText(kerfM, 'm')}, to be allowed for: edges are drawn where they shall be`,
          },
        ]
      : []),
  ];
}

/** Sentences on the edges that matter most: by how much the reading changes as they move. */
export function criticalEdges(
  sensitivities: readonly EdgeSensitivity[],
  elements: readonly OutlineElement[],
  toleranceM: number,
): string[] {
  const stepM = toleranceM > 0 ? toleranceM : 1e-6;
  return sensitivities.slice(0, MOST_EDGES).map(({ element, ring, perMetre }, k) => {
    const rings = elements[element].rings;
    const percent = `${signed(100 * perMetre * stepM)} %`;
    const name = `${edgeName(rings[ring])}${elements.length > 1 ? ` of element ${element + 1}` : ''}`;
    const what = `an opening wider by ${quantityText(stepM, 'm')} at ${name} changes the reading by ${percent}`;
    return k === 0 ? `Critical edge: ${what}` : `Next: ${what}`;
  });
}

function signed(value: number): string {
  const text = value.toPrecision(2);
  return value < 0 ? text.replace('-', '−') : `+${text}`;
}

/** An edge by its radius, where it is a circle about the axis; else by the point farthest from there. */
function edgeName(points: Float64Array): string {
  let [least, most, at] = [Number.POSITIVE_INFINITY, 0, 0];
  for (let i = 0; i < points.length; i += 2) {
    const radius = Math.hypot(points[i], points[i + 1]);
    if (radius > most) [most, at] = [radius, i];
    least = Math.min(least, radius);
  }
  if (most - least < 1e-3 * most) return `the edge of radius ${quantityText(most, 'm')}`;
  const [x, y] = [points[at], points[at + 1]].map((metres) => (1e3 * metres).toFixed(4));
  return `the edge through (${x}, ${y}) mm`;
}
