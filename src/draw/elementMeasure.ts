import { ringArea, ringsRadius } from '../outline/area.ts';
import type { OutlineElement } from '../outline/shape.ts';

/** Area of an element's openings, m²: outer rings less holes. */
export function elementArea(element: OutlineElement): number {
  return element.rings.reduce((sum, ring) => sum + ringArea(ring), 0);
}

/** Largest distance of any vertex from the axis, metres. */
export function largestRadius(elements: readonly OutlineElement[]): number {
  return ringsRadius(elements.flatMap(({ rings }) => rings));
}
