import { layOut } from './boundary.ts';
import type { Corner } from './cornerRadii.ts';
import { tightestCorners } from './cornerRadii.ts';
import type { Width } from './narrowest.ts';
import { narrowest } from './narrowest.ts';

/** What a shop asks of an outline. Lengths and places in metres. */
export interface OutlineMeasures {
  /** Narrowest place of the openings; null without rings. */
  smallestOpening: Width | null;
  /** Narrowest bar of sheet between openings, in a notch of one opening or across an island; null where there is none. */
  smallestWeb: Width | null;
  /** Where an opening's boundary turns to the left: a convex corner of the opening. */
  tightestInsideCorner: Corner | null;
  /** Where it turns to the right: a corner of sheet that pokes into the opening. */
  tightestOutsideCorner: Corner | null;
  /** Pieces of sheet that hang in an opening: clockwise rings. */
  islands: number;
  /** Separate openings: counter-clockwise rings. */
  pieces: number;
  /** Centre of the largest island. */
  islandAt: [x: number, y: number] | null;
}

/**
 * Measures an outline, sharp polygon or polygonised curve. `narrowest` and `tightestCorners` say how widths and corners are
 * defined.
 *
 * About 0.1 ms for 200 vertices; the work grows at worst as the square of their number.
 *
 * @param rings closed polygons [x0, y0, x1, y1, …] in metres, the last point not repeated, the opening to the left of
 *   every edge (outer rings counter-clockwise, islands clockwise); rings that do not cross
 * @throws RimwrightError `input` for a coordinate that is not finite, or a ring of fewer than three different points
 */
export function measureOutline(rings: readonly Float64Array[]): OutlineMeasures {
  const boundary = layOut(rings);
  const { opening, web } = narrowest(boundary);
  const corners = tightestCorners(boundary);
  const islands = boundary.rings.filter(({ areaM2 }) => areaM2 < 0);
  const largest = islands.reduce((a, b) => (b.areaM2 < a.areaM2 ? b : a), islands[0]);
  return {
    smallestOpening: opening,
    smallestWeb: web,
    tightestInsideCorner: corners.inside,
    tightestOutsideCorner: corners.outside,
    islands: islands.length,
    pieces: boundary.rings.length - islands.length,
    islandAt: largest?.centre ?? null,
  };
}
