import { ringArea } from '../outline/area.ts';
import { cutRings, onGrid } from './asCut.ts';
import { bridged } from './bridges.ts';
import type { ShopReport } from './inspect.ts';
import { inspectOutline, lengthText, placeText } from './inspect.ts';
import { measureOutline } from './measureOutline.ts';
import type { Rings } from './offset.ts';
import { difference, offset, openings, union } from './offset.ts';
import type { Side } from './rolling.ts';
import { rolled } from './rolling.ts';
import type { ShopRules } from './shopRules.ts';
import { smallestWidth } from './smallestWidth.ts';
import { WIDTH_SLACK } from './widthMisfit.ts';

/** An outline that a shop can cut, near one that it may not be able to. */
export interface Mended {
  rings: readonly Float64Array[];
  /** What was changed, and where: sentences without full stop. */
  changes: string[];
  /** Area that only one of the two outlines covers, m². */
  differenceM2: number;
  /** The shop's word on the mended outline; where that does not fit, it could not be mended. */
  report: ShopReport;
}

/** Files hold coordinates to a nanometre. */
const FILE_GRID_M = 1e-9;

/** Rounds of mending; widening one place may narrow another. */
const ROUNDS = 8;

/** Widths are mended to this much more than the shop's least. */
const ROOM = 1.01;

/**
 * Beyond this area, in squares of the least width, or where it holds a disc of this radius, in least widths, what a disc does not reach
 * is a slot and not the rest of a corner; that of a right angle has 0.05 and 0.09.
 */
const BODY = { area: 0.3, radius: 0.2 };

/** Vertices of a disc that is set into a neck. */
const DISC_VERTICES = 96;

/**
 * The nearest outline that a shop can cut: islands get bridges, slots and webs that are too narrow are widened or given up, whichever
 * changes less area, corners are rounded as the shop would round them, vertices set on its grid.
 *
 * @param rings one element, as for `inspectOutline`, that do not cross
 * @throws RimwrightError `input` as `measureOutline`
 */
export function mend(rings: Rings, rules: ShopRules): Mended {
  const changes: string[] = [];
  let now: Rings = rings;
  for (let round = 0; round < ROUNDS; round++) {
    const hung = bridged(now, rules);
    if (hung.bridges > 0)
      changes.push(
        `${hung.bridges} bridges, ${lengthText(hung.widthM)} wide, hold what would fall out around ${placeText(measureOutline(now).islandAt ?? [0, 0])}`,
      );
    const opened = widened(hung.rings, 1, rules.smallestOpeningM, changes);
    const webbed = widened(opened, -1, rules.smallestWebM, changes);
    const isSettled = webbed === now;
    now = webbed;
    if (isSettled || now.length === 0) break;
  }
  const cut = cutRings(now, rules);
  const rounded =
    cut === rings || rules.gridM > 0
      ? cut
      : cut.map((ring) => onGrid(ring, FILE_GRID_M)).filter(({ length }) => length >= 6);
  if (cut !== now) changes.push(...roundingText(now, rounded));
  const report = inspectOutline([{ rings: rounded }], rules);
  const differenceM2 = rounded === rings ? 0 : symmetricDifference(rings, rounded);
  return { rings: rounded, changes, differenceM2, report };
}

/** Area that one of two regions covers and the other does not, m². */
function symmetricDifference(a: Rings, b: Rings): number {
  return areaOf(difference(a, b)) + areaOf(difference(b, a));
}

/** The outline with its narrowest openings (side 1) or webs (side −1) mended; itself where all are wide enough. */
function widened(rings: Rings, side: Side, leastM: number, changes: string[]): Rings {
  if (rings.length === 0) return rings;
  const quick = measureOutline(rings);
  const guess = side > 0 ? quick.smallestOpening : quick.smallestWeb;
  const width = smallestWidth(rings, side, guess, leastM);
  if (width === null || width.widthM >= leastM * (1 - WIDTH_SLACK)) return rings;
  const what = side > 0 ? 'opening' : 'web';
  const told = `${what} of ${lengthText(width.widthM)} at ${placeText(width.at)}`;
  const bodies = narrowBodies(rings, side, leastM);
  if (bodies.length === 0) {
    changes.push(`the ${told} is widened to ${lengthText(leastM * ROOM)}`);
    return together(rings, [disc(width.at, (leastM / 2) * ROOM)], side);
  }
  let now: Rings = rings;
  let wider = 0;
  let gone = 0;
  const byM = Math.max(((leastM - width.widthM) / 2) * ROOM, leastM * WIDTH_SLACK);
  for (const body of bodies) {
    const grown = offset(body, byM);
    const with_ = together(now, grown, side);
    const without = together(now, offset(body, leastM * WIDTH_SLACK), side > 0 ? -1 : 1);
    const isNearer = Math.abs(areaOf(with_) - areaOf(now)) <= Math.abs(areaOf(without) - areaOf(now));
    now = isNearer ? with_ : without;
    if (isNearer) wider++;
    else gone++;
  }
  if (wider > 0) changes.push(`${countText(wider, what)} widened, the ${told}`);
  if (gone > 0) changes.push(`${countText(gone, what)} given up, the ${told}`);
  return now;
}

/** What a disc of the least width does not reach, corners left aside, piece by piece. */
function narrowBodies(rings: Rings, side: Side, leastM: number): Float64Array[][] {
  const radiusM = (leastM / 2) * (1 - WIDTH_SLACK);
  const reached = rolled(rings, radiusM, side);
  const hairM = leastM * 1e-4;
  const left =
    side > 0
      ? difference(rings, offset(reached.rings, hairM))
      : difference(offset(reached.rings, -hairM), rings);
  const pieces = openings(left);
  // A whole ring that is gone is no rest of a corner, however small.
  if (reached.lost.length > 0) return pieces;
  return pieces.filter(
    (own) => areaOf(own) > BODY.area * leastM ** 2 || offset(own, -BODY.radius * leastM).length > 0,
  );
}

/** Adds to the opening (side 1), or takes from it. */
function together(rings: Rings, piece: Rings, side: Side): Float64Array[] {
  return side > 0 ? union(rings, piece) : difference(rings, piece);
}

function disc([x, y]: readonly [number, number], radiusM: number): Float64Array {
  const ring = new Float64Array(2 * DISC_VERTICES);
  for (let k = 0; k < DISC_VERTICES; k++) {
    const phi = (2 * Math.PI * k) / DISC_VERTICES;
    ring[2 * k] = x + radiusM * Math.cos(phi);
    ring[2 * k + 1] = y + radiusM * Math.sin(phi);
  }
  return ring;
}

function roundingText(before: Rings, after: Rings): string[] {
  const share = areaOf(after) / areaOf(before) - 1;
  return [
    `corners are rounded as the shop would round them, ${Number((100 * share).toPrecision(2))} % in area`,
  ];
}

function countText(count: number, what: string): string {
  return count === 1 ? `a narrow ${what} is` : `${count} narrow ${what}s are`;
}

function areaOf(rings: Rings): number {
  return rings.reduce((sum, ring) => sum + ringArea(ring), 0);
}
