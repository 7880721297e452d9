import type { LegendreRules } from '../numeric/gaussLegendre.ts';
import type { Segment } from './segment.ts';
import { isClosed, pointOn } from './segment.ts';
import type { Loop } from './shape.ts';

/** How densely a boundary is sampled. */
export interface NodeDensity {
  /** Phase in radians per m² of ρ²: κ of the distance and the shortest wavelength. */
  kappa: number;
  /** Farthest that the particle's axis may be from the outline's, metres. */
  offsetM: number;
  /** Nodes per radian of phase beyond the fixed ones; 0.45 errs by 1e-4 of the extinction or less, 0.9 by 1e-6 on polygons. */
  perRadian: number;
  /** Least number of nodes on a segment. */
  least: number;
}

const PROBES = 8;

/**
 * Quadrature nodes [x, y, dx, dy] for a set of loops: evenly spaced on smooth closed curves, Gauss–Legendre on the rest.
 * The number on each segment follows the phase that runs along it.
 */
export function boundaryNodes(
  loops: readonly Loop[],
  density: NodeDensity,
  rules: LegendreRules,
): Float64Array {
  const counts: number[] = [];
  let total = 0;
  for (const loop of loops) {
    for (const segment of loop) {
      const count = nodeCount(segment, density);
      counts.push(count);
      total += count;
    }
  }
  const nodes = new Float64Array(4 * total);
  const point = new Float64Array(4);
  let at = 0;
  let next = 0;
  for (const loop of loops) {
    for (const segment of loop) {
      const count = counts[next++];
      const rule = isClosed(segment) ? null : rules.rule(count);
      for (let i = 0; i < count; i++) {
        const t = rule ? (1 + rule.nodes[i]) / 2 : i / count;
        const weight = rule ? rule.weights[i] / 2 : 1 / count;
        pointOn(segment, t, point);
        nodes[at++] = point[0];
        nodes[at++] = point[1];
        nodes[at++] = point[2] * weight;
        nodes[at++] = point[3] * weight;
      }
    }
  }
  return nodes;
}

/** Nodes for one segment: the phase κ|r − p|² that passes along it, for the worst particle place p, sets their number. */
function nodeCount(segment: Segment, density: NodeDensity): number {
  const { kappa, offsetM, perRadian, least } = density;
  const point = new Float64Array(4);
  if (segment.kind === 'polar' && isClosed(segment)) {
    // One fold is probed, five times for each of its finest waves; every fold gets the same whole number of nodes.
    const probes = Math.max(8 * PROBES, 5 * (segment.waves ?? 0));
    const step = (2 * Math.PI) / (segment.folds * probes);
    let own = 0;
    let largest = 0;
    let slopes = 0;
    let bends = 0;
    segment.squared(segment.from - step / 2, point);
    for (let i = 0; i < probes; i++) {
      const before = point[1];
      segment.squared(segment.from + (i + 0.5) * step, point);
      own = Math.max(own, Math.abs(point[1]));
      largest = Math.max(largest, point[0]);
      slopes += point[1] ** 2;
      bends += ((point[1] - before) / step) ** 2;
    }
    // Carson's rule (1922): a phase that runs at up to B, and changes its pace at the rate ω, takes the bandwidth B + ω.
    // This ω is a root mean square; half as much again covers the highest harmonics that count.
    const pace = slopes > 0 ? 1.5 * Math.sqrt(bends / slopes) : 0;
    const perTurn = 2 * Math.PI * (kappa * own + pace + 2 * kappa * offsetM * Math.sqrt(largest));
    const perFold = Math.ceil((least + perRadian * perTurn) / segment.folds);
    // The area is a mean of ρ², exact from one node more than it has waves.
    return segment.folds * Math.max(perFold, 4, (segment.waves ?? 0) + 2);
  }
  let phase = 0;
  let before = 0;
  let farthest = 0;
  let length = 0;
  for (let i = 0; i <= PROBES; i++) {
    pointOn(segment, i / PROBES, point);
    const squared = point[0] * point[0] + point[1] * point[1];
    if (i > 0) phase += Math.abs(squared - before) * kappa;
    before = squared;
    farthest = Math.max(farthest, squared);
    length = Math.max(length, Math.hypot(point[2], point[3]));
  }
  // An offset particle adds the phase 2κ p·r; the azimuth seen from the particle must be resolved as well.
  phase += 2 * kappa * offsetM * Math.min(length, 2 * Math.sqrt(farthest) * Math.PI);
  // An arc bends by its own angle, which for a small one is far more than what it spans as seen from the axis.
  const turn = segment.kind === 'arc' ? Math.abs(segment.to - segment.from) : length / Math.sqrt(farthest);
  // Along a ramp or an arc about the axis the phase runs evenly; elsewhere its pace changes, which takes some more.
  const isEven = segment.kind === 'polar' || (segment.kind === 'arc' && Math.hypot(...segment.centre) === 0);
  const bend = isEven ? Math.max(0.25, turn / Math.PI) : 0.25 + turn / Math.PI;
  return Math.ceil(least * Math.min(1, bend) + perRadian * phase);
}
