import type { OutlineElement } from '../outline/shape.ts';
import { layOut } from './boundary.ts';
import { measureOutline } from './measureOutline.ts';
import type { Rings } from './offset.ts';
import { difference, offset, openings, union } from './offset.ts';
import type { Side } from './rolling.ts';
import { NEAR, narrowPlaces, rolled } from './rolling.ts';
import type { ShopRules } from './shopRules.ts';
import { stitch } from './stitch.ts';
import { WIDTH_SLACK } from './widthMisfit.ts';

/** Vertices that turn by less are points on a curve, radians. */
const CURVE_TURN = 0.1;

/** Share of half the least width that a body must hold a disc of to be a slot, and not the rest of a corner. */
const SLOT_SHARE = 0.7;

/**
 * What a shop makes of a drawn outline: convex corners of the opening rounded to its inside radius, but no less than half the kerf
 * (the cutter is round), reflex ones to its outside radius, vertices on its grid. Slots and webs narrower than the rounding are
 * as round at their ends as they are wide, down to the least width that the shop cuts; what is narrower still is gone.
 * Outlines with nothing sharper come back vertex by vertex.
 *
 * @param elements as for `inspectOutline`, with rings that do not cross
 * @returns the same elements; one of which nothing is left has no rings
 * @throws RimwrightError `input` as `measureOutline`
 */
export function asCut(elements: readonly OutlineElement[], rules: ShopRules): OutlineElement[] {
  return elements.map(({ curves: _, rings, ...element }) => ({ ...element, rings: cutRings(rings, rules) }));
}

/** As `asCut`, for one element. */
export function cutRings(rings: Rings, rules: ShopRules): readonly Float64Array[] {
  const opened = rounded(rings, insideRadius(rules), rules.smallestOpeningM, 1);
  const closed = rounded(opened, rules.outsideCornerRadiusM, rules.smallestWebM, -1);
  return rules.gridM === 0 ? closed : closed.map((ring) => onGrid(ring, rules.gridM)).filter(hasArea);
}

/** Radius in a convex corner of an opening, metres. */
export function insideRadius({ insideCornerRadiusM, kerfM }: ShopRules): number {
  return Math.max(insideCornerRadiusM, kerfM / 2);
}

function rounded(rings: Rings, radiusM: number, leastM: number, side: Side): Rings {
  if (radiusM === 0 || rings.length === 0 || isRoundAlready(rings, radiusM, side)) return rings;
  const result = rolled(rings, radiusM, side);
  const slotRadiusM = (leastM / 2) * (1 - 2 * WIDTH_SLACK);
  if (slotRadiusM >= radiusM || narrowPlaces(rings, result, side).length === 0) return result.rings;
  // Regions that share edges are apart by a hair before they are laid over each other, which spares rounding hard decisions.
  const hairM = (NEAR / 2) * radiusM;
  const finer = rolled(rings, slotRadiusM, side).rings;
  const between =
    side > 0
      ? difference(finer, offset(result.rings, hairM))
      : difference(offset(result.rings, -hairM), finer);
  const slots = openings(between).filter((own) => offset(own, -SLOT_SHARE * slotRadiusM).length > 0);
  if (slots.length === 0) return result.rings;
  const grown = offset(slots.flat(), 2 * hairM);
  const whole = side > 0 ? union(result.rings, grown) : difference(result.rings, grown);
  return stitch(layOut(rings), rings, whole, 3 * hairM).rings;
}

/** Whether the plain measures leave a disc nothing to round: most outlines of curves. */
function isRoundAlready(rings: Rings, radiusM: number, side: Side): boolean {
  const { turnRad, count } = layOut(rings);
  for (let i = 0; i < count; i++) if (side * turnRad[i] > CURVE_TURN) return false;
  const measures = measureOutline(rings);
  const corner = side > 0 ? measures.tightestInsideCorner : measures.tightestOutsideCorner;
  const width = side > 0 ? measures.smallestOpening : measures.smallestWeb;
  const isWide = width === null || width.widthM >= 2 * radiusM * (1 + WIDTH_SLACK);
  return isWide && (corner === null || corner.radiusM >= radiusM * (1 + WIDTH_SLACK));
}

/** A ring with its vertices on a grid, each once. */
export function onGrid(ring: Float64Array, gridM: number): Float64Array {
  const points: number[] = [];
  for (let i = 0; i < ring.length; i += 2) {
    const [x, y] = [ring[i], ring[i + 1]].map((value) => Math.round(value / gridM) * gridM);
    const isAgain = points.length > 0 && points.at(-2) === x && points.at(-1) === y;
    if (!isAgain) points.push(x, y);
  }
  if (points.length > 2 && points[0] === points.at(-2) && points[1] === points.at(-1)) points.length -= 2;
  return Float64Array.from(points);
}

function hasArea(ring: Float64Array): boolean {
  return ring.length >= 6;
}
