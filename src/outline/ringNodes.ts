import type { LegendreRules } from '../numeric/gaussLegendre.ts';
import type { NodeDensity } from './boundaryNodes.ts';

/**
 * Quadrature nodes [x, y, dx, dy] along closed polygons, Gauss–Legendre on every edge.
 * On a straight edge x dy − y dx is constant, so only the phase along it counts.
 */
export function ringNodes(
  rings: readonly Float64Array[],
  density: NodeDensity,
  rules: LegendreRules,
): Float64Array {
  const nodes: number[] = [];
  for (const ring of rings) {
    const n = ring.length;
    for (let i = 0; i < n; i += 2) {
      const j = (i + 2) % n;
      addEdge(nodes, ring[i], ring[i + 1], ring[j], ring[j + 1], density, rules);
    }
  }
  return Float64Array.from(nodes);
}

/** Gauss–Legendre nodes that an edge wants beyond 2 + perRadian · phase, over perRadian, once its phase is several radians. */
const EXTRA = 3.3;

function addEdge(
  nodes: number[],
  x0: number,
  y0: number,
  x1: number,
  y1: number,
  { kappa, offsetM, perRadian }: NodeDensity,
  rules: LegendreRules,
): void {
  const dx = x1 - x0;
  const dy = y1 - y0;
  const length = Math.hypot(dx, dy);
  if (length === 0) return;
  // ρ² is a parabola along the edge; past its vertex it rises again, so both branches count.
  const start = (x0 * dx + y0 * dy) / length;
  const end = start + length;
  const run = start * end < 0 ? start * start + end * end : Math.abs(end * end - start * start);
  const phase = kappa * (run + 2 * offsetM * length);
  // A few radians want more nodes each than many do.
  const count = 2 + Math.ceil(perRadian * phase * (1 + EXTRA / (1 + phase)));
  const { nodes: places, weights } = rules.rule(count);
  for (let k = 0; k < places.length; k++) {
    const t = (1 + places[k]) / 2;
    const weight = weights[k] / 2;
    nodes.push(x0 + t * dx, y0 + t * dy, dx * weight, dy * weight);
  }
}
