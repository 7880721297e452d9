/** Colours after Okabe & Ito (2008), told apart by people with any common colour blindness: blue adds, orange subtracts. */
const PLUS_INK = '#0b5f99';
const MINUS_INK = '#a8480f';

/** Strokes on a tile of 4 by 4 units; the angle turns the whole pattern. */
const KINDS = [
  { angle: 45, marks: '<line x1="0" y1="2" x2="4" y2="2"/>' },
  { angle: -45, marks: '<line x1="0" y1="2" x2="4" y2="2"/>' },
  { angle: 0, marks: '<circle cx="2" cy="2" r="0.6"/>' },
  { angle: 0, marks: '<line x1="0" y1="2" x2="4" y2="2"/>' },
  { angle: 90, marks: '<line x1="0" y1="2" x2="4" y2="2"/>' },
  { angle: 45, marks: '<line x1="0" y1="2" x2="4" y2="2"/><line x1="2" y1="0" x2="2" y2="4"/>' },
];

/** `ink-plus` or `ink-minus`: the class by which a page may give the colours other values. */
export function inkClass(weight: number): string {
  return weight < 0 ? 'ink-minus' : 'ink-plus';
}

/** The colour of an element's edge and hatch. */
export function inkColor(weight: number): string {
  return weight < 0 ? MINUS_INK : PLUS_INK;
}

/**
 * An SVG `<pattern>` that tells one element from the others without colour.
 *
 * @param id unique in the document
 * @param index the element's place, from 0; six hatches, then from the start again
 * @param unit size of one of the four units of a tile, in the user units of what is filled
 */
export function hatchPattern(id: string, index: number, weight: number, unit: string): string {
  const { angle, marks } = KINDS[index % KINDS.length];
  const ink = inkColor(weight);
  return (
    `<pattern id="${id}" width="4" height="4" patternUnits="userSpaceOnUse" patternTransform="scale(${unit}) rotate(${angle})">` +
    `<g class="${inkClass(weight)}" fill="${ink}" stroke="${ink}" stroke-width="0.6">` +
    `<rect width="4" height="4" fill-opacity="0.16" stroke="none"/>${marks}</g></pattern>`
  );
}
