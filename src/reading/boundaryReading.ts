import type { RadialTable } from './radialTable.ts';

/**
 * Quadrature nodes along closed rings, four numbers a node: x, y, and the tangent times the weight, dx, dy, all in metres.
 * The opening lies to the left of the direction of travel: ∮ (x dy − y dx)/2 is the area.
 */
export type BoundaryNodes = Float64Array;

/**
 * The reading of an outline, m²: ∮ G dφ around its rings for a particle at (px, py).
 *
 * Holds for rings of any shape, holes (opposite sense of rotation), several pieces and a particle outside.
 * A node beyond the table's radius gives NaN.
 */
export function boundaryReading(table: RadialTable, nodes: BoundaryNodes, px: number, py: number): number {
  return table.twofold === null
    ? unpolarisedReading(table, nodes, px, py)
    : polarisedReading(table, table.twofold, nodes, px, py);
}

function unpolarisedReading(table: RadialTable, nodes: BoundaryNodes, px: number, py: number): number {
  const { mean, cells, cellsPerM2 } = table;
  let sum = 0;
  for (let i = 0; i < nodes.length; i += 4) {
    const x = nodes[i] - px;
    const y = nodes[i + 1] - py;
    const position = (x * x + y * y) * cellsPerM2;
    // Past the last cell there is no number, so the sum becomes NaN.
    const cell = position < cells ? position | 0 : cells;
    const t = position - cell;
    const c = cell << 2;
    const value = mean[c] + t * (mean[c + 1] + t * (mean[c + 2] + t * mean[c + 3]));
    sum += value * (x * nodes[i + 3] - y * nodes[i + 2]);
  }
  return sum;
}

function polarisedReading(
  table: RadialTable,
  twofold: Float64Array,
  nodes: BoundaryNodes,
  px: number,
  py: number,
): number {
  const { mean, cells, cellsPerM2, axis } = table;
  let sum = 0;
  for (let i = 0; i < nodes.length; i += 4) {
    const x = nodes[i] - px;
    const y = nodes[i + 1] - py;
    const position = (x * x + y * y) * cellsPerM2;
    const cell = position < cells ? position | 0 : cells;
    const t = position - cell;
    const c = cell << 2;
    const even = mean[c] + t * (mean[c + 1] + t * (mean[c + 2] + t * mean[c + 3]));
    const odd = twofold[c] + t * (twofold[c + 1] + t * (twofold[c + 2] + t * twofold[c + 3]));
    // ρ² cos 2(φ − φ₀) in Cartesian coordinates
    const turn = (x * x - y * y) * axis[0] + 2 * x * y * axis[1];
    sum += (even + odd * turn) * (x * nodes[i + 3] - y * nodes[i + 2]);
  }
  return sum;
}
