import { ringArea, ringsRadius } from '../outline/area.ts';
import { layOut } from './boundary.ts';
import type { Rings } from './offset.ts';
import { difference, openings } from './offset.ts';
import type { ShopRules } from './shopRules.ts';

/** Bridges of an island: three hold it in its plane, whatever pushes. Common practice, no source. */
export const BRIDGES = 3;

/** A bridge is this much wider than the smallest web, so that rounding and grid leave it wide enough. */
export const BRIDGE_ROOM = 1.01;

/** Directions tried for the first bridge, over the angle between two. */
const DIRECTIONS = 8;

/** An outline whose islands hang on bridges. */
export interface Bridged {
  rings: readonly Float64Array[];
  /** How many bridges were drawn in; 0 where nothing falls out. */
  bridges: number;
  widthM: number;
  /** What they take from the opening, m². */
  areaM2: number;
}

/**
 * Draws straight bridges from every island that would fall out to the sheet around its opening: three an island, in even
 * directions from its centre, turned so that they cover the least area. They run to the rim of the opening, over other islands on
 * their way.
 *
 * @param rings as for `measureOutline`
 * @returns the rings themselves where islands are held or there are none
 */
export function bridged(rings: Rings, rules: ShopRules): Bridged {
  const widthM = rules.smallestWebM * BRIDGE_ROOM;
  const nothing = { rings, bridges: 0, widthM, areaM2: 0 };
  if (rules.islands === 'held' || rings.every((ring) => ringArea(ring) > 0)) return nothing;
  let bridges = 0;
  const parted = openings(rings).flatMap((own) => {
    let left = own;
    for (const island of own.slice(1)) {
      left = leastPart(left, island, widthM);
      bridges += BRIDGES;
    }
    return left;
  });
  return { rings: parted, bridges, widthM, areaM2: areaOf(rings) - areaOf(parted) };
}

/** An opening without the strips that hold one island, in the direction where they take least. */
function leastPart(opening: Rings, island: Float64Array, widthM: number): Float64Array[] {
  const [x, y] = layOut([island]).rings[0].centre;
  const reachM = 2 * ringsRadius(opening) + 2 * Math.hypot(x, y);
  const turn = (2 * Math.PI) / BRIDGES;
  let best: Float64Array[] = [];
  let most = -Infinity;
  for (let k = 0; k < DIRECTIONS; k++) {
    const first = (k * turn) / DIRECTIONS;
    let left: Float64Array[] = [...opening];
    for (let n = 0; n < BRIDGES; n++)
      left = difference(left, [strip(x, y, first + n * turn, reachM, widthM)]);
    const area = areaOf(left);
    // Of equal ones the first: a ring has no best direction.
    if (area <= most * (1 + 1e-9)) continue;
    best = left;
    most = area;
  }
  return best;
}

/** From a point outwards. */
function strip(x: number, y: number, direction: number, lengthM: number, widthM: number): Float64Array {
  const [ux, uy] = [Math.cos(direction), Math.sin(direction)];
  const corner = (along: number, across: number) => [
    x + along * ux - across * widthM * uy,
    y + along * uy + across * widthM * ux,
  ];
  const corners = [corner(0, -0.5), corner(lengthM, -0.5), corner(lengthM, 0.5), corner(0, 0.5)];
  return Float64Array.from(corners.flat());
}

function areaOf(rings: Rings): number {
  return rings.reduce((sum, ring) => sum + ringArea(ring), 0);
}
