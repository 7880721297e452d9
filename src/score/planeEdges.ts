import type { LegendreRules } from '../numeric/gaussLegendre.ts';
import type { NodeDensity } from '../outline/boundaryNodes.ts';
import { boundaryNodes } from '../outline/boundaryNodes.ts';
import type { Segment } from '../outline/segment.ts';
import type { PlaneGrid } from './planeGrid.ts';

/** A line along which a mask's open share changes: by `step` more on its left. */
interface Edge {
  step: number;
  segment: Segment;
}

/** Changes of the open share below this are the solver's rounding. */
const LEAST_STEP = 1e-7;

/**
 * A mask of cells as boundary nodes, ready to be read: a reading is linear in the tangents, so each edge counts by its step, and
 * only all of them together make closed loops.
 *
 * @param shares open share of each cell, 0 to 1
 */
export function planeNodes(
  grid: PlaneGrid,
  shares: Float64Array,
  density: NodeDensity,
  rules: LegendreRules,
): Float64Array {
  const parts = [...arcs(grid, shares), ...spokes(grid, shares)].map(({ step, segment }) => {
    const nodes = boundaryNodes([[segment]], density, rules);
    for (let i = 0; i < nodes.length; i += 4) {
      nodes[i + 2] *= step;
      nodes[i + 3] *= step;
    }
    return nodes;
  });
  const all = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    all.set(part, at);
    at += part.length;
  }
  return all;
}

/** Between neighbouring annuli, and at the rim. */
function arcs(grid: PlaneGrid, shares: Float64Array): Edge[] {
  const { radiusM, pieces, first } = grid;
  const edges: Edge[] = [];
  for (let a = 0; a < pieces.length; a++) {
    const radius = radiusM * Math.sqrt((a + 1) / pieces.length);
    const outer = pieces[a + 1] ?? 1;
    // All ends of pieces on either side, as shares of the wedge; in whole numbers, for equal ones to be one.
    const all = pieces[a] * outer;
    const ends = new Set<number>();
    for (let i = 1; i <= pieces[a]; i++) ends.add(i * outer);
    for (let i = 1; i <= outer; i++) ends.add(i * pieces[a]);
    let from = 0;
    let begun = 0;
    let before = 0;
    for (const end of [...ends].sort((p, q) => p - q)) {
      const middle = (from + end) / 2;
      const inside = shares[first[a] + Math.floor(middle / outer)];
      const outside = a + 1 < pieces.length ? shares[first[a + 1] + Math.floor(middle / pieces[a])] : 0;
      const step = inside - outside;
      if (Math.abs(step - before) > LEAST_STEP) {
        edges.push(...arcImages(grid, radius, begun / all, from / all, before));
        begun = from;
        before = step;
      }
      from = end;
    }
    edges.push(...arcImages(grid, radius, begun / all, 1, before));
  }
  return edges;
}

function arcImages(grid: PlaneGrid, radius: number, from: number, to: number, step: number): Edge[] {
  if (Math.abs(step) <= LEAST_STEP || from === to) return [];
  return imagesOfAzimuth(grid, from, to).map(([start, end]) => ({
    step,
    segment: { kind: 'arc', centre: [0, 0], radius, from: start, to: end },
  }));
}

/** Between neighbouring pieces of one annulus, joined where several annuli have the same. */
function spokes(grid: PlaneGrid, shares: Float64Array): Edge[] {
  const { pieces, first, mirrors } = grid;
  const edges: Edge[] = [];
  let open = new Map<number, { step: number; since: number }>();
  for (let a = 0; a <= pieces.length; a++) {
    const now = new Map<number, { step: number; since: number }>();
    const count = pieces[a] ?? 0;
    // The wedge's last end is a mirror, or where half a turn leads from.
    for (let i = 1; i <= (mirrors ? count - 1 : count); i++) {
      const step = shares[first[a] + i - 1] - shares[first[a] + (i % count)];
      if (Math.abs(step) <= LEAST_STEP) continue;
      const place = i / count;
      const held = open.get(place);
      const goesOn = held !== undefined && Math.abs(held.step - step) <= LEAST_STEP;
      now.set(place, goesOn ? held : { step, since: a });
    }
    for (const [place, held] of open) {
      if (now.get(place) !== held) edges.push(...spokeImages(grid, place, held.since, a, held.step));
    }
    open = now;
  }
  return edges;
}

/** Inwards: the piece before it in azimuth, whose share is `step` larger, lies on the left of that. */
function spokeImages(grid: PlaneGrid, place: number, since: number, until: number, step: number): Edge[] {
  const { radiusM, pieces } = grid;
  const [inner, outer] = [since, until].map((annulus) => radiusM * Math.sqrt(annulus / pieces.length));
  return imagesOfAzimuth(grid, place, place).map(([azimuth], image) => {
    const [cos, sin] = [Math.cos(azimuth), Math.sin(azimuth)];
    return {
      // In a mirror what was before comes after.
      step: image < 2 ? step : -step,
      segment: { kind: 'line', from: [outer * cos, outer * sin], to: [inner * cos, inner * sin] },
    };
  });
}

/** Where images of a part of the wedge begin and end, in azimuth: the part itself, half a turn on, and both in the mirror. */
function imagesOfAzimuth(
  { axisRad, wedgeRad, mirrors }: PlaneGrid,
  from: number,
  to: number,
): [from: number, to: number][] {
  const [start, end] = [wedgeRad * from, wedgeRad * to];
  const turned: [number, number][] = [
    [start, end],
    [start + Math.PI, end + Math.PI],
  ];
  const all: [number, number][] = mirrors
    ? [...turned, [-end, -start], [Math.PI - end, Math.PI - start]]
    : turned;
  return all.map(([p, q]) => [axisRad + p, axisRad + q]);
}
