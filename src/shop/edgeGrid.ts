import type { Boundary } from './boundary.ts';

/** A place on a boundary. */
export interface Foot {
  edge: number;
  /** From the edge's first vertex, metres. */
  alongM: number;
  x: number;
  y: number;
}

/** Most cells along a side. */
const MOST_CELLS = 128;

/**
 * Finds the place of a boundary next to a point, where one lies within `reachM`: edges are listed by the cells of a square grid
 * that they come near.
 *
 * @returns null beyond that
 */
export function edgeGrid(b: Boundary, reachM: number): (x: number, y: number) => Foot | null {
  const { count, x, y, tx, ty, lengthM, next } = b;
  let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity];
  for (let i = 0; i < count; i++) {
    minX = Math.min(minX, x[i]);
    maxX = Math.max(maxX, x[i]);
    minY = Math.min(minY, y[i]);
    maxY = Math.max(maxY, y[i]);
  }
  const side = Math.max(maxX - minX, maxY - minY) + 2 * reachM;
  const across = Math.max(1, Math.min(MOST_CELLS, Math.floor(Math.sqrt(count)), Math.floor(side / reachM)));
  const cellM = side / across;
  const column = (value: number) =>
    Math.min(across - 1, Math.max(0, Math.floor((value - minX + reachM) / cellM)));
  const row = (value: number) =>
    Math.min(across - 1, Math.max(0, Math.floor((value - minY + reachM) / cellM)));
  const cells: number[][] = Array.from({ length: across * across }, () => []);
  for (let i = 0; i < count; i++) {
    const j = next[i];
    const [left, right] = [column(Math.min(x[i], x[j]) - reachM), column(Math.max(x[i], x[j]) + reachM)];
    const [bottom, top] = [row(Math.min(y[i], y[j]) - reachM), row(Math.max(y[i], y[j]) + reachM)];
    for (let r = bottom; r <= top; r++) {
      for (let c = left; c <= right; c++) cells[r * across + c].push(i);
    }
  }

  return (px, py) => {
    let best: Foot | null = null;
    let bestM = reachM;
    for (const i of cells[row(py) * across + column(px)]) {
      const dx = px - x[i];
      const dy = py - y[i];
      const alongM = Math.min(lengthM[i], Math.max(0, dx * tx[i] + dy * ty[i]));
      const offM = Math.hypot(dx - alongM * tx[i], dy - alongM * ty[i]);
      if (offM > bestM || (best !== null && offM === bestM)) continue;
      bestM = offM;
      best = { edge: i, alongM, x: x[i] + alongM * tx[i], y: y[i] + alongM * ty[i] };
    }
    return best;
  };
}
