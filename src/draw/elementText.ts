import type { OutlineElement } from '../outline/shape.ts';
import { elementArea } from './elementMeasure.ts';
import { areaText, percentText, quantityText, weightText } from './quantityText.ts';

/** An element's weight and area in words, and its plane and part of the light where they are its own. */
export function elementText(element: OutlineElement, inWords = weightText): string {
  const place = elementPlaceText(element);
  return [`weight ${inWords(element.weight)}`, `open area ${areaText(elementArea(element))}`, ...place].join(
    ', ',
  );
}

/** Empty for an element in the design's plane that has all of the light. */
export function elementPlaceText({
  distanceM,
  share,
}: Pick<OutlineElement, 'distanceM' | 'share'>): string[] {
  return [
    ...(distanceM === undefined ? [] : [`${quantityText(distanceM, 'm')} from the particle`]),
    ...(share === undefined ? [] : [`${percentText(share)} of the light`]),
  ];
}
