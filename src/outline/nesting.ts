import { reversedArcLoop } from './arcLoop.ts';
import { ringArea } from './area.ts';
import { orientation } from './orientation.ts';
import type { OutlineElement } from './shape.ts';

interface Box {
  left: number;
  bottom: number;
  right: number;
  top: number;
}

/**
 * Gives rings the sense of rotation that their nesting asks for: the outermost run counter-clockwise, the holes in them
 * clockwise, pieces inside holes counter-clockwise again. A ring that runs the right way is handed back as it is.
 *
 * @param rings flat [x0, y0, x1, y1, …], any length unit; no two of them cross or touch
 */
export function orientByNesting(rings: readonly Float64Array[]): Float64Array[] {
  const boxes = rings.map(boxOf);
  return rings.map((ring, k) => {
    const around = rings.filter((other, j) => j !== k && isInside(ring[0], ring[1], other, boxes[j]));
    const isHole = around.length % 2 === 1;
    return ringArea(ring) > 0 === isHole ? reversed(ring) : ring;
  });
}

/** An element whose rings have the sense that their nesting asks for (see `orientByNesting`), and their exact curves as well. */
export function orientElement(element: OutlineElement): OutlineElement {
  const { rings, curves } = element;
  const oriented = orientByNesting(rings);
  if (curves === undefined) return { ...element, rings: oriented };
  return {
    ...element,
    rings: oriented,
    curves: curves.map((loop, r) => (oriented[r] === rings[r] ? loop : reversedArcLoop(loop))),
  };
}

/** An opening: the ring around it, and the holes directly within. */
export interface Opening {
  outer: Float64Array;
  holes: Float64Array[];
}

/**
 * Puts every hole to the opening that it is in.
 *
 * @param rings as `orientByNesting` leaves them
 */
export function openingsOf(rings: readonly Float64Array[]): Opening[] {
  const outers = rings
    .filter((ring) => ringArea(ring) > 0)
    .map((outer) => ({ outer, holes: [] as Float64Array[], area: ringArea(outer), box: boxOf(outer) }));
  for (const hole of rings.filter((ring) => ringArea(ring) <= 0)) {
    const around = outers.filter(({ outer, box }) => isInside(hole[0], hole[1], outer, box));
    around.sort((a, b) => a.area - b.area)[0]?.holes.push(hole);
  }
  return outers.map(({ outer, holes }) => ({ outer, holes }));
}

/** Whether a point that is not on the ring lies within it. */
export function isWithin(ring: Float64Array, x: number, y: number): boolean {
  return isInside(x, y, ring, boxOf(ring));
}

/** A ray to the right meets the ring an odd number of times. */
function isInside(x: number, y: number, ring: Float64Array, box: Box): boolean {
  if (x < box.left || x > box.right || y < box.bottom || y > box.top) return false;
  let inside = false;
  for (let i = 0, j = ring.length - 2; i < ring.length; j = i, i += 2) {
    const [fromY, toY] = [ring[j + 1], ring[i + 1]];
    if (fromY > y === toY > y) continue;
    const side = orientation(ring[j], fromY, ring[i], toY, x, y);
    if (side > 0 === toY > fromY) inside = !inside;
  }
  return inside;
}

function boxOf(ring: Float64Array): Box {
  const box = { left: Infinity, bottom: Infinity, right: -Infinity, top: -Infinity };
  for (let i = 0; i < ring.length; i += 2) {
    box.left = Math.min(box.left, ring[i]);
    box.right = Math.max(box.right, ring[i]);
    box.bottom = Math.min(box.bottom, ring[i + 1]);
    box.top = Math.max(box.top, ring[i + 1]);
  }
  return box;
}

/** The same points the other way round, from the same first point. */
function reversed(ring: Float64Array): Float64Array {
  const count = ring.length / 2;
  return ring.map((_, i) => ring[2 * ((count - (i >> 1)) % count) + (i & 1)]);
}
