import {
  type SymbolType,
  symbol,
  symbolCircle,
  symbolCross,
  symbolDiamond,
  symbolSquare,
  symbolStar,
  symbolTriangle,
  symbolWye,
} from 'd3-shape';

const SHAPES: readonly SymbolType[] = [
  symbolCircle,
  symbolSquare,
  symbolTriangle,
  symbolDiamond,
  symbolCross,
  symbolStar,
  symbolWye,
];

/**
 * SVG path data, around the origin, of the mark that stands for a family of outlines: shapes, so that no one needs colours.
 *
 * @param index the family's place, from 0; seven shapes, then from the start again
 * @param area in square user units
 */
export function markerPath(index: number, area: number): string {
  const path = symbol(SHAPES[index % SHAPES.length], area)() ?? '';
  return path.replace(/-?\d+\.\d+(e-\d+)?/g, (number) => String(Number(Number(number).toFixed(2))));
}
