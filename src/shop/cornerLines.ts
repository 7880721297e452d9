import type { Boundary } from './boundary.ts';
import { FACING_COSINE } from './facing.ts';
import type { VertexBlocks } from './vertexBlocks.ts';
import { VERTICES_PER_BLOCK } from './vertexBlocks.ts';

/** Radians: vertices that turn by less are points on a curve, where the lines upright on the edges beside them do. */
const SHALLOW_TURN = 0.1;

/**
 * Visits the lines that stand upright on an edge at a convex corner and end inside an edge that faces it, in the
 * opening (side 1) or the sheet (side −1). They are the shortest where a taper is cut off blunt.
 *
 * @param isFrom edges that lines are wanted from (see `narrowest`)
 * @param limitM lines as long as that are of no use, metres
 */
export function visitCornerLines(
  b: Boundary,
  blocks: VertexBlocks,
  isFrom: (fromX: number, fromY: number, toX: number, toY: number) => boolean,
  limitM: (side: 1 | -1) => number,
  visit: (side: 1 | -1, lengthM: number, middleX: number, middleY: number) => void,
): void {
  const { count, x, y, tx, ty, turnRad, previous, next } = b;
  for (let p = 0; p < count; p++) {
    if (Math.abs(turnRad[p]) <= SHALLOW_TURN) continue;
    if (!isFrom(x[p], y[p], x[next[p]], y[next[p]])) continue;
    const side = turnRad[p] > 0 ? 1 : -1;
    for (const edge of [p, previous[p]]) {
      const ux = -side * ty[edge];
      const uy = side * tx[edge];
      const { hit, lengthM } = firstHit(b, blocks, p, ux, uy, limitM(side));
      if (hit < 0 || lengthM <= b.touchM || tx[edge] * tx[hit] + ty[edge] * ty[hit] > -FACING_COSINE)
        continue;
      visit(side, lengthM, x[p] + (lengthM / 2) * ux, y[p] + (lengthM / 2) * uy);
    }
  }
}

/**
 * The edge that a ray from vertex p meets first, within a length, or −1; the edges at p do not count. A ray that leaves an acute
 * corner the wrong way meets backs alone, which do not face it.
 */
function firstHit(
  b: Boundary,
  blocks: VertexBlocks,
  p: number,
  ux: number,
  uy: number,
  mostM: number,
): { hit: number; lengthM: number } {
  const { x, y, next, previous, count, touchM } = b;
  let hit = -1;
  let lengthM = mostM;
  for (let block = 0; block < blocks.count; block++) {
    const toBlockX = blocks.x[block] - x[p];
    const toBlockY = blocks.y[block] - y[p];
    const reachM = blocks.edgesRadiusM[block];
    const along = ux * toBlockX + uy * toBlockY;
    if (Math.abs(ux * toBlockY - uy * toBlockX) > reachM) continue;
    if (along - reachM >= lengthM || along + reachM < -touchM) continue;
    const end = Math.min(count, (block + 1) * VERTICES_PER_BLOCK);
    for (let i = block * VERTICES_PER_BLOCK; i < end; i++) {
      const j = next[i];
      const from = ux * (y[i] - y[p]) - uy * (x[i] - x[p]);
      const to = ux * (y[j] - y[p]) - uy * (x[j] - x[p]);
      if (from < 0 === to < 0 || i === p || i === previous[p]) continue;
      const share = from / (from - to);
      const at = ux * (x[i] + share * (x[j] - x[i]) - x[p]) + uy * (y[i] + share * (y[j] - y[i]) - y[p]);
      if (at > -touchM && at < lengthM) {
        hit = i;
        lengthM = at;
      }
    }
  }
  return { hit, lengthM };
}
