import type { Boundary } from './boundary.ts';
import { visitCornerLines } from './cornerLines.ts';
import { FACING_COSINE, faces, opensTo } from './facing.ts';
import { VERTICES_PER_BLOCK, vertexBlocks } from './vertexBlocks.ts';

/** The narrowest place of the opening or of the sheet, in the middle of its width. */
export interface Width {
  widthM: number;
  at: [x: number, y: number];
}

/** What is looked for: without limits, the narrowest place of all. */
interface NarrowSearch {
  /** Only widths below these count. */
  openingM: number;
  webM: number;
  /** Edges that widths are measured from: one of each set that the outline's symmetry makes alike is enough. */
  isFrom: (fromX: number, fromY: number, toX: number, toY: number) => boolean;
}

const EVERYTHING: NarrowSearch = { openingM: Infinity, webM: Infinity, isFrom: () => true };

/**
 * Finds the narrowest opening and the narrowest web.
 *
 * A width is a straight line across the opening (or across the sheet) that meets no other boundary on its way, stands
 * upright on one side, on an edge or within the fan of normals of a reflex vertex, and ends at a side that faces it. The
 * shortest such line ends at a vertex or starts at a corner, and only these are tried: polygons are exact, but for narrow
 * ends that a corner half hides; inscribed polygons of smooth curves are off in second order of the edge length.
 *
 * A tip whose sides face each other has the width 0, and so has a web where the boundary touches itself. No ring is wider
 * than 4 · area / perimeter, the inscribed circle of a triangle and of every regular polygon.
 *
 * A rough rim reads low: lines upright on the flanks of its teeth cut across obliquely, shorter by the cosine of the slope.
 *
 * Every edge is paired with every vertex within reach: n² steps at worst.
 */
export function narrowest(b: Boundary, search = EVERYTHING): { opening: Width | null; web: Width | null } {
  const { count, x, y, tx, ty, lengthM, turnRad, next, previous, touchM } = b;
  const blocks = vertexBlocks(b);
  let opening: Width | null = null;
  let web: Width | null = null;
  let { openingM, webM } = search;

  const keep = (side: 1 | -1, widthM: number, atX: number, atY: number) => {
    if (side > 0 && widthM < openingM) {
      opening = { widthM, at: [atX, atY] };
      openingM = widthM;
    } else if (side < 0 && widthM < webM) {
      web = { widthM, at: [atX, atY] };
      webM = widthM;
    }
  };
  const keepLine = (side: 1 | -1, widthM: number, px: number, py: number, q: number) => {
    const isLess = widthM < (side > 0 ? openingM : webM);
    if (isLess && isFree(b, px, py, x[q], y[q])) keep(side, widthM, (px + x[q]) / 2, (py + y[q]) / 2);
  };

  for (const { areaM2, perimeterM, centre } of b.rings) {
    keep(areaM2 < 0 ? -1 : 1, (4 * Math.abs(areaM2)) / perimeterM, ...centre);
  }
  for (let i = 0; i < count; i++) {
    const isTip = Math.PI - Math.abs(turnRad[i]) < Math.acos(FACING_COSINE);
    if (isTip) keep(turnRad[i] > 0 ? 1 : -1, 0, x[i], y[i]);
  }
  visitCornerLines(b, blocks, search.isFrom, (side) => (side > 0 ? openingM : webM), keep);

  for (let i = 0; i < count; i++) {
    const ax = x[i];
    const ay = y[i];
    if (!search.isFrom(ax, ay, x[next[i]], y[next[i]])) continue;
    const ux = tx[i];
    const uy = ty[i];
    const length = lengthM[i];
    const turn = turnRad[i];
    const before = previous[i];
    const after = next[i];
    // The fan of a vertex that turns by more than a right angle reaches behind its edge.
    const isAcute = Math.abs(turn) > Math.PI / 2;

    for (let block = 0; block < blocks.count; block++) {
      const leftM = isAcute ? Math.max(openingM, webM) : openingM;
      const rightM = isAcute ? leftM : webM;
      const toBlockX = blocks.x[block] - ax;
      const toBlockY = blocks.y[block] - ay;
      const radius = blocks.radiusM[block];
      const height = ux * toBlockY - uy * toBlockX;
      if (height - radius >= leftM || -height - radius >= rightM) continue;
      // Only the strip upright on the edge counts, and the fan: ahead of the edge before, behind this one.
      const along = ux * toBlockX + uy * toBlockY;
      if (along - radius > length + touchM) continue;
      const alongBefore = tx[before] * toBlockX + ty[before] * toBlockY;
      if (along + radius < -touchM && alongBefore + radius < 0) continue;

      const end = Math.min(count, (block + 1) * VERTICES_PER_BLOCK);
      for (let q = block * VERTICES_PER_BLOCK; q < end; q++) {
        const dx = x[q] - ax;
        const dy = y[q] - ay;
        const s = ux * dy - uy * dx;
        if (s >= leftM || -s >= rightM) continue;
        const t = ux * dx + uy * dy;
        if (t > length + touchM || q === i || q === after) continue;
        if (Math.abs(s) <= touchM && t >= -touchM) {
          keep(-1, 0, x[q], y[q]);
        } else if (t >= -touchM) {
          const side = s > 0 ? 1 : -1;
          const vx = -side * uy;
          const vy = side * ux;
          const leaves =
            (t > touchM || opensTo(b, i, vx, vy, side)) &&
            (t < length - touchM || opensTo(b, after, vx, vy, side));
          if (leaves && faces(b, q, -vx, -vy, side)) keepLine(side, Math.abs(s), ax + t * ux, ay + t * uy, q);
        } else if (turn !== 0 && q !== before && dx * tx[before] + dy * ty[before] >= 0) {
          const side = turn < 0 ? 1 : -1;
          const d = Math.sqrt(dx * dx + dy * dy);
          if (faces(b, q, -dx / d, -dy / d, side)) keepLine(side, d, ax, ay, q);
        }
      }
    }
  }
  return { opening, web };
}

/** Whether no edge crosses the line from P to Q between its ends. */
function isFree(b: Boundary, px: number, py: number, qx: number, qy: number): boolean {
  const { x, y, next } = b;
  const dx = qx - px;
  const dy = qy - py;
  for (let i = 0; i < b.count; i++) {
    const j = next[i];
    const from = dx * (y[i] - py) - dy * (x[i] - px);
    const to = dx * (y[j] - py) - dy * (x[j] - px);
    // A vertex on the line belongs to one side, so that a line through it is still crossed.
    if (from < 0 === to < 0) continue;
    const share = from / (from - to);
    const crossX = x[i] + share * (x[j] - x[i]) - px;
    const crossY = y[i] + share * (y[j] - y[i]) - py;
    const along = (crossX * dx + crossY * dy) / (dx * dx + dy * dy);
    if (along > 1e-6 && along < 1 - 1e-6) return false;
  }
  return true;
}
