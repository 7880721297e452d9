import { ringArea } from '../outline/area.ts';
import type { Boundary } from './boundary.ts';
import { layOut } from './boundary.ts';
import type { Rings } from './offset.ts';
import { offset } from './offset.ts';
import type { Departure, Stitched } from './stitch.ts';
import { stitch } from './stitch.ts';

/**
 * What the arcs' chords leave standing, over the radius; a corner that turns by less than 0.04 is a point on a curve. Its
 * rounding would take away 3e-6 r².
 */
export const NEAR = 2e-4;

/** A stretch of boundary that turns by more has sides that face each other: within 15° of parallel where the disc touches them. */
const SLOT_TURN = (165 * Math.PI) / 180;

/** Which way a disc rolls: in the opening (side 1), so that its convex corners are rounded, or in the sheet (side −1). */
export type Side = 1 | -1;

/** What a rolling disc leaves. */
export interface Rolled extends Stitched {
  /** Around all places of its centre, or in the sheet around all others. */
  centres: Float64Array[];
}

/**
 * All that a disc can reach that stays within the opening (side 1: the opening in the sense of morphology), or all that it cannot
 * reach from the sheet (side −1: the closing). Corners are rounded to its radius, and what is narrower than the disc goes: an
 * offset there and back (Serra, Image Analysis and Mathematical Morphology, 1982, chapter II). Where the disc reaches
 * everything, vertices stay as they are.
 *
 * @param rings closed polygons in metres that do not cross, the opening to the left of every edge
 * @param radiusM above 0
 * @throws RimwrightError `input` for a coordinate that is not finite, or a ring of fewer than three different points
 */
export function rolled(rings: Rings, radiusM: number, side: Side): Rolled {
  if (rings.length === 0) return { rings: [], departures: [], lost: [], centres: [] };
  const centres = offset(rings, -side * radiusM);
  const result = offset(centres, side * radiusM);
  return { ...stitch(layOut(rings), rings, result, NEAR * radiusM), centres };
}

/**
 * Whether somewhere a disc cannot pass from one part to another, though it reaches everything there: a short neck, which rolling
 * leaves as it is.
 *
 * @param result of `rolled`
 */
export function isParted(rings: Rings, { centres }: Rolled, radiusM: number): boolean {
  const leastM2 = (NEAR * radiusM) ** 2;
  return [1, -1].some((sense) => {
    const count = (of: Rings) => of.filter((ring) => sense * ringArea(ring) > leastM2).length;
    return count(centres) !== count(rings);
  });
}

/**
 * Where a disc cannot pass though it is no mere corner: in the opening (side 1) a slot, in the sheet a web. What was cut off is a corner
 * as long as its sides do not face each other, and a slot where they do, where a whole ring is gone, or where the
 * cut runs from one ring to another.
 *
 * @param result of `rolled`
 * @returns the middle of each such place: of what is gone, or of the line where it was cut off
 */
export function narrowPlaces(rings: Rings, { departures, lost }: Stitched, side: Side): [number, number][] {
  if (rings.length === 0) return [];
  const b = layOut(rings);
  const ringOf = (edge: number) => b.rings.findIndex(({ first, end }) => edge >= first && edge < end);
  const places = lost.map((ring) => b.rings[ring].centre);
  for (const { from, to } of departures) {
    // A ring of arcs alone: it was cut off all around.
    if (from === null || to === null) continue;
    const isSlot = ringOf(from.edge) !== ringOf(to.edge) || mostTurned(b, { from, to }, side) > SLOT_TURN;
    if (isSlot) places.push([(from.x + to.x) / 2, (from.y + to.y) / 2]);
  }
  return places;
}

/** The most that any stretch of the boundary between two feet turns, radians. */
function mostTurned(b: Boundary, { from, to }: Departure, side: Side): number {
  if (from === null || to === null) return 0;
  let turned = 0;
  let most = 0;
  for (let i = from.edge; i !== to.edge; ) {
    i = b.next[i];
    turned = Math.max(0, turned + side * b.turnRad[i]);
    most = Math.max(most, turned);
  }
  return most;
}
