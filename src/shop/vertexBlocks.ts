import type { Boundary } from './boundary.ts';

export const VERTICES_PER_BLOCK = 16;

/** Circles around runs of consecutive vertices: block k holds the vertices from 16 k on. */
export interface VertexBlocks {
  count: number;
  x: Float64Array;
  y: Float64Array;
  radiusM: Float64Array;
  /** Of the circles that hold the edges from these vertices as well. */
  edgesRadiusM: Float64Array;
}

/** Vertices that follow each other lie close together, so a search can pass over whole blocks that are out of its reach. */
export function vertexBlocks(b: Boundary): VertexBlocks {
  const count = Math.ceil(b.count / VERTICES_PER_BLOCK);
  const blocks = {
    count,
    x: new Float64Array(count),
    y: new Float64Array(count),
    radiusM: new Float64Array(count),
    edgesRadiusM: new Float64Array(count),
  };
  for (let block = 0; block < count; block++) {
    const first = block * VERTICES_PER_BLOCK;
    const end = Math.min(b.count, first + VERTICES_PER_BLOCK);
    let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity];
    for (let i = first; i < end; i++) {
      minX = Math.min(minX, b.x[i]);
      maxX = Math.max(maxX, b.x[i]);
      minY = Math.min(minY, b.y[i]);
      maxY = Math.max(maxY, b.y[i]);
    }
    blocks.x[block] = (minX + maxX) / 2;
    blocks.y[block] = (minY + maxY) / 2;
    blocks.radiusM[block] = Math.hypot(maxX - minX, maxY - minY) / 2;
    let reachM = blocks.radiusM[block];
    for (let i = first; i < end; i++) {
      const j = b.next[i];
      const [dx, dy] = [b.x[j] - blocks.x[block], b.y[j] - blocks.y[block]];
      reachM = Math.max(reachM, Math.sqrt(dx * dx + dy * dy));
    }
    blocks.edgesRadiusM[block] = reachM;
  }
  return blocks;
}
